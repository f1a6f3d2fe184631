import { createTransport } from 'nodemailer';
import { describe, expect, it, onTestFinished } from 'vitest';
import { startMail, type MailOptions } from '../../../fakes/mail/server.ts';

const INVITATION = {
  from: 'Limestead Farm <farm@example.com>',
  to: 'Kai <kai@example.com>',
  subject: 'You are invited: Größe & <more>',
  text: 'Choose a password here: http://127.0.0.1:3000/invitations/abc?x=1&y=2.',
};

describe('mail stand-in', () => {
  it('when a mail with an attachment is sent, it is listed with its link and the attachment as sent', async () => {
    const { url, send } = await startPost();
    const invoice = Buffer.from([0x25, 0x50, 0x44, 0x46, 0x00, 0xff]);

    await send({ ...INVITATION, attachments: [{ filename: 'invoice.pdf', content: invoice }] });

    const [mail] = await listMails(url);
    expect(mail).toMatchObject({
      from: 'Limestead Farm <farm@example.com>',
      to: 'Kai <kai@example.com>',
      recipients: ['kai@example.com'],
      subject: INVITATION.subject,
      links: ['http://127.0.0.1:3000/invitations/abc?x=1&y=2'],
      attachments: [{ filename: 'invoice.pdf', contentType: 'application/pdf', size: 6 }],
    });
    const download = await fetch(`${url}${mail?.attachments[0]?.url}`);
    expect(download.headers.get('content-disposition')).toMatch(/^attachment; filename="?invoice\.pdf"?$/);
    expect(Buffer.from(await download.arrayBuffer())).toEqual(invoice);
  });

  it('when a mail is opened, its text is escaped and its address is a link', async () => {
    const { url, send } = await startPost();
    await send(INVITATION);
    const [mail] = await listMails(url);

    const page = await (await fetch(`${url}/messages/${mail?.id}`)).text();

    expect(page).toContain('You are invited: Größe &amp; &lt;more&gt;');
    expect(page).toContain('href="http://127.0.0.1:3000/invitations/abc?x=1&amp;y=2"');
  });

  it('when a mail has HTML, it is shown in a frame that can run no script', async () => {
    const { url, send } = await startPost();
    await send({ ...INVITATION, html: '<a href="http://127.0.0.1:3000/p/1">Plug</a><script>alert(1)</script>' });
    const [mail] = await listMails(url);

    const page = await (await fetch(`${url}/messages/${mail?.id}`)).text();
    const frame = await fetch(`${url}/messages/${mail?.id}/html`);

    expect(page).toMatch(/<iframe[^>]*sandbox="allow-popups allow-popups-to-escape-sandbox"/);
    expect(frame.headers.get('content-security-policy')).toMatch(/^sandbox allow-popups .*default-src 'none'/);
    expect(await frame.text()).toContain('<a href="http://127.0.0.1:3000/p/1">');
    expect(mail?.links).toContain('http://127.0.0.1:3000/p/1');
  });

  it('when several mails came, the newest is first, and deleting leaves none', async () => {
    const { url, send } = await startPost();
    await send({ ...INVITATION, subject: 'first' });
    await send({ ...INVITATION, subject: 'second', bcc: 'books@example.com' });

    const mails = await listMails(url);
    await fetch(`${url}/api/messages`, { method: 'DELETE' });

    expect(mails.map(({ subject }) => subject)).toEqual(['second', 'first']);
    expect(mails[0]?.recipients).toContain('books@example.com');
    expect(await listMails(url)).toEqual([]);
    expect(await (await fetch(url)).text()).toContain('No mail yet.');
  });

  it('when credentials are set, only who signs in with them may send', async () => {
    const { url, send } = await startPost({ credentials: { user: 'farm', pass: 'right' } });

    await expect(send(INVITATION)).rejects.toMatchObject({ responseCode: 530 });
    await expect(send(INVITATION, { user: 'farm', pass: 'wrong' })).rejects.toMatchObject({ code: 'EAUTH' });
    await send(INVITATION, { user: 'farm', pass: 'right' });

    expect(await listMails(url)).toHaveLength(1);
  });
});

interface ListedMail {
  id: string;
  subject: string;
  recipients: string[];
  links: string[];
  attachments: { url: string }[];
}

async function listMails(url: string): Promise<ListedMail[]> {
  const reply = await fetch(`${url}/api/messages`);
  // The stand-in's own JSON; the tests state what they rely on.
  return ((await reply.json()) as { messages: ListedMail[] }).messages;
}

async function startPost(options: MailOptions = {}) {
  const mail = await startMail({ smtpPort: 0, webPort: 0, ...options });
  onTestFinished(() => mail.close());

  async function send(message: Record<string, unknown>, auth?: { user: string; pass: string }): Promise<void> {
    const transport = createTransport({ host: '127.0.0.1', port: mail.ports.smtp, ...(auth && { auth }) });
    await transport.sendMail(message);
    transport.close();
  }
  return { url: mail.url, send };
}
