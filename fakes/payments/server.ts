import { join } from 'node:path';
import express, { type Express } from 'express';
import { assetRoutes } from '../web/assets.ts';
import { browserUrl, listenHttp, type RunningFake } from '../web/listen.ts';
import { apiRoutes } from './api.ts';
import type { Payments } from './context.ts';
import { Deliveries } from './deliveries.ts';
import { eventRoutes } from './events-routes.ts';
import { payRoutes } from './pay-routes.ts';
import { expireDueSessions } from './sessions.ts';
import { PaymentStore } from './store.ts';

const EXPIRY_CHECK_MS = 1000;

export interface PaymentsOptions {
  host?: string;
  /** 0 takes any free port. */
  port?: number;
  apiKey?: string;
  webhookUrl?: string | null;
  webhookSecret?: string;
  /** Address under which browsers reach the payment page, where it is not the host and port listened on. */
  publicUrl?: string;
  /** Folder for the file that keeps everything over a restart; without it all is in memory. */
  dataDir?: string;
  /** Pauses before the second, third, … try of a webhook, ms. */
  retryDelaysMs?: readonly number[];
  now?: () => number;
}

export interface RunningPayments extends RunningFake<'http'> {
  /** Sends webhooks to another address from now on, for receivers that start after the stand-in. */
  sendWebhooksTo(url: string | null): void;
}

/** Starts the payment service's stand-in: JSON API, hosted payment page, and webhooks. */
export async function startPayments(options: PaymentsOptions = {}): Promise<RunningPayments> {
  const { host = '127.0.0.1', port = 4242, apiKey = 'sk_test_limestead', now = Date.now } = options;
  const store = new PaymentStore(options.dataDir === undefined ? null : join(options.dataDir, 'payments.json'));
  const deliveries = new Deliveries(store, {
    url: options.webhookUrl ?? null,
    secret: options.webhookSecret ?? 'whsec_limestead_demo',
    retryDelaysMs: options.retryDelaysMs ?? [300, 1000, 3000, 9000, 30_000],
    now,
  });
  let url = '';
  const payments: Payments = { store, deliveries, now, publicUrl: () => options.publicUrl ?? url };

  const listener = await listenHttp(createApp(payments, apiKey), host, port).catch((error: unknown) => {
    deliveries.close();
    throw error;
  });
  url = browserUrl(host, listener.port);
  const expiryCheck = setInterval(() => expireDueSessions(payments), EXPIRY_CHECK_MS);

  return {
    url,
    ports: { http: listener.port },
    sendWebhooksTo: (address) => deliveries.sendTo(address),
    close: async () => {
      clearInterval(expiryCheck);
      deliveries.close();
      await listener.close();
    },
  };
}

function createApp(payments: Payments, apiKey: string): Express {
  const app = express();
  app.disable('x-powered-by');
  app.set('query parser', 'extended');
  app.use((_req, _res, next) => {
    expireDueSessions(payments);
    next();
  });
  app.use('/v1', apiRoutes(payments, apiKey));
  app.use(assetRoutes(), payRoutes(payments), eventRoutes(payments));
  return app;
}
