import { randomInt, randomUUID } from 'node:crypto';
import { mkdirSync } from 'node:fs';
import type { Server } from 'node:http';
import path from 'node:path';
import { pino } from 'pino';
import { createApp } from './app.ts';
import { readConfig, type Config } from './config.ts';
import { openDatabase } from './db/client.ts';
import { migrateDatabase } from './db/migrate.ts';
import type { Deps } from './deps.ts';
import { startJobs } from './jobs/jobs.ts';
import { smtpTransport } from './outside/mail-transport.ts';
import { stripePayments } from './outside/payment-service.ts';
import { readSecrets } from './secrets.ts';

const SHUTDOWN_LIMIT = 10_000;

async function main(): Promise<void> {
  const config = readConfig(process.env);
  const deps = await openFarm(config);
  const { app } = createApp(deps, readSecrets(config.dataDir).sessionSecret);
  const stopJobs = startJobs(deps);

  const server = app.listen(config.port, config.host, (error?: Error) => {
    if (error) fail(error, config);
    deps.log.info(`Limestead answers at ${config.publicUrl}`);
  });
  for (const signal of ['SIGINT', 'SIGTERM'] as const) {
    process.once(signal, () => void shutDown(server, deps, stopJobs));
  }
}

async function openFarm(config: Config): Promise<Deps> {
  mkdirSync(config.dataDir, { recursive: true });
  const file = path.join(config.dataDir, 'limestead.sqlite');
  const { db, sqlite } = openDatabase(file);
  await migrateDatabase(db, sqlite, file, Date.now());
  return {
    db,
    sqlite,
    config,
    clock: { now: () => Date.now() },
    newId: () => randomUUID(),
    randomInt: (max) => randomInt(max),
    payments: stripePayments(config.stripe),
    mail: smtpTransport(config.smtpUrl, config.mailFrom),
    log: pino({ level: config.logLevel }),
  };
}

/** Stops taking requests, lets those under way finish, then closes the database. */
async function shutDown(server: Server, deps: Deps, stopJobs: () => Promise<void>): Promise<void> {
  deps.log.info('Finishing what is under way, then stopping.');
  const limit = setTimeout(() => process.exit(1), SHUTDOWN_LIMIT);
  server.closeIdleConnections();
  await new Promise((resolve) => server.close(resolve));
  await stopJobs();
  deps.sqlite.close();
  clearTimeout(limit);
}

function fail(error: Error, config: Config): never {
  const taken = 'code' in error && error.code === 'EADDRINUSE';
  console.error(taken ? `Port ${config.port} is taken. Stop what uses it, or set PORT to another one.` : error.message);
  process.exit(1);
}

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : error);
  process.exit(1);
});
