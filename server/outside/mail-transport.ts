import nodemailer from 'nodemailer';

export interface Mail {
  /** Ours. A mail that is sent twice, after a crash between sending and noting it, bears the same one. */
  id: string;
  to: string;
  subject: string;
  text: string;
  html: string;
  attachments?: { filename: string; content: Buffer; contentType: string }[];
}

/** Sends one mail or throws. */
export interface MailTransport {
  send(mail: Mail): Promise<void>;
}

/** Milliseconds; a server that hangs must not keep the other mails waiting for minutes. */
const TIMEOUTS = { connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 30_000 };

/** Mail over SMTP, to whatever server `smtpUrl` names. */
export function smtpTransport(smtpUrl: string, from: string): MailTransport {
  const transport = nodemailer.createTransport({ url: smtpUrl, ...TIMEOUTS });
  const domain = /@([\w.-]+)/.exec(from)?.[1] ?? 'localhost';
  return {
    async send({ id, ...mail }) {
      await transport.sendMail({ from, messageId: `<${id}@${domain}>`, ...mail });
    },
  };
}
