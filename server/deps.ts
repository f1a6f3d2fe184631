import type { Logger } from 'pino';
import type { Config } from './config.ts';
import type { Db, Sqlite } from './db/client.ts';
import type { MailTransport } from './outside/mail-transport.ts';
import type { PaymentService } from './outside/payment-service.ts';

/** What the server's code gets from outside itself. Clock, ids and chance are here so that tests and the simulator can set them. */
export interface Deps {
  db: Db;
  sqlite: Sqlite;
  config: Config;
  clock: { now(): number };
  newId: () => string;
  /** A whole number from 0 up to, not including, `max`; unguessable in production. */
  randomInt: (max: number) => number;
  payments: PaymentService;
  mail: MailTransport;
  log: Logger;
}
