import { Router, type Response } from 'express';
import { sendPage } from '../web/page.ts';
import type { Inbox, Mail } from './inbox.ts';
import { attachmentUrl, inboxPage, linksIn, mailPage, missingPage } from './pages.ts';

/** Pages for people. */
export function mailPages(inbox: Inbox): Router {
  const router = Router();

  router.get('/', (_req, res) => sendPage(res, inboxPage(inbox.mails)));
  router.post('/clear', (_req, res) => {
    inbox.clear();
    res.redirect(303, '/');
  });
  router.get('/messages/:id', (req, res) => {
    const mail = inbox.find(req.params.id);
    if (mail === undefined) sendPage(res, missingPage(), 404);
    else sendPage(res, mailPage(inbox.mails, mail));
  });
  router.get('/messages/:id/html', (req, res) => sendMailHtml(res, inbox.find(req.params.id)));
  router.get('/messages/:id/attachments/:index', (req, res) => {
    const attachment = inbox.find(req.params.id)?.attachments[Number(req.params.index)];
    if (attachment === undefined) {
      sendPage(res, missingPage(), 404);
      return;
    }
    res
      .attachment(attachment.filename ?? 'attachment')
      .set('X-Content-Type-Options', 'nosniff')
      .type(attachment.contentType)
      .send(attachment.content);
  });
  return router;
}

/** The same as JSON, for tests and tools. */
export function mailApi(inbox: Inbox): Router {
  const router = Router();

  router.get('/api/messages', (_req, res) => res.json({ messages: inbox.mails.map(toJson) }));
  router.get('/api/messages/:id', (req, res) => {
    const mail = inbox.find(req.params.id);
    if (mail === undefined) res.status(404).json({ message: 'There is no such mail.' });
    else res.json(toJson(mail));
  });
  router.delete('/api/messages', (_req, res) => {
    inbox.clear();
    res.status(204).end();
  });
  return router;
}

/** A stranger's HTML: no script, nothing fetched from elsewhere, links open beside the page. */
function sendMailHtml(res: Response, mail: Mail | undefined): void {
  if (mail === undefined || mail.html === null) {
    sendPage(res, missingPage(), 404);
    return;
  }
  res
    .set({
      'Content-Security-Policy':
        "sandbox allow-popups allow-popups-to-escape-sandbox; default-src 'none'; img-src data:; style-src 'unsafe-inline'",
      'X-Content-Type-Options': 'nosniff',
      'Referrer-Policy': 'no-referrer',
    })
    .type('html')
    .send(`<base target="_blank">${mail.html}`);
}

function toJson(mail: Mail): object {
  const { attachments, ...rest } = mail;
  return {
    ...rest,
    links: [...new Set([...hrefsIn(mail.html ?? ''), ...linksIn(mail.text)])],
    attachments: attachments.map(({ filename, contentType, size }, index) => ({
      filename: filename ?? null,
      contentType,
      size,
      url: attachmentUrl(mail, index),
    })),
  };
}

function hrefsIn(markup: string): string[] {
  return [...markup.matchAll(/href="(https?:[^"]+)"/g)].map(([, address = '']) => address.replaceAll('&amp;', '&'));
}
