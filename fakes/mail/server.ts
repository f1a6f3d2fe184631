import express from 'express';
import { assetRoutes } from '../web/assets.ts';
import { browserUrl, listenHttp, type RunningFake } from '../web/listen.ts';
import { Inbox } from './inbox.ts';
import { mailApi, mailPages } from './routes.ts';
import { listenSmtp, type Credentials } from './smtp.ts';

export interface MailOptions {
  host?: string;
  /** Port of the SMTP server; 0 takes any free one. */
  smtpPort?: number;
  /** Port of the page that shows the mail; 0 takes any free one. */
  webPort?: number;
  /** Who may send; without it anyone may. */
  credentials?: Credentials | null;
  now?: () => number;
}

/** Starts the mail stand-in: an SMTP server that keeps what it gets, and a page that shows it. */
export async function startMail(options: MailOptions = {}): Promise<RunningFake<'smtp' | 'http'>> {
  const { host = '127.0.0.1', smtpPort = 2525, webPort = 8025, credentials = null, now = Date.now } = options;
  const inbox = new Inbox();

  const app = express();
  app.disable('x-powered-by');
  app.use(assetRoutes(), mailApi(inbox), mailPages(inbox));

  const smtp = await listenSmtp(inbox, { host, port: smtpPort, credentials, now });
  const web = await listenHttp(app, host, webPort).catch(async (error: unknown) => {
    await smtp.close();
    throw error;
  });

  return {
    url: browserUrl(host, web.port),
    ports: { smtp: smtp.port, http: web.port },
    close: async () => {
      await Promise.all([smtp.close(), web.close()]);
    },
  };
}
