import nodemailer from 'nodemailer';

export interface Mail {
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

/** Mail over SMTP, to whatever server `smtpUrl` names. */
export function smtpTransport(smtpUrl: string, from: string): MailTransport {
  const transport = nodemailer.createTransport(smtpUrl);
  return {
    async send(mail) {
      await transport.sendMail({ from, ...mail });
    },
  };
}
