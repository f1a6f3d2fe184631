import { randomInt, randomUUID } from 'node:crypto';
import { mkdirSync } from 'node:fs';
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
import { shutDownOnSignals } from './shut-down.ts';

async function main(): Promise<void> {
  const config = readConfig(process.env);
  const deps = await openFarm(config);
  const { app } = createApp(deps, readSecrets(config.dataDir).sessionSecret);
  const stopJobs = startJobs(deps);

  const server = app.listen(config.port, config.host, (error?: Error) => {
    if (error) fail(error, config);
    deps.log.info(`Limestead answers at ${config.publicUrl}`);
  });
  shutDownOnSignals({ server, log: deps.log, stopJobs, close: () => deps.sqlite.close() });
}

async function openFarm(config: Config): Promise<Deps> {
  // Password hashes and customers' addresses are in there: for the farm's own account only.
  mkdirSync(config.dataDir, { recursive: true, mode: 0o700 });
  const file = path.join(config.dataDir, 'limestead.sqlite');
  const { db, sqlite } = openDatabase(file);
  await migrateDatabase(sqlite, file, Date.now());
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

function fail(error: Error, config: Config): never {
  const taken = 'code' in error && error.code === 'EADDRINUSE';
  console.error(taken ? `Port ${config.port} is taken. Stop what uses it, or set PORT to another one.` : error.message);
  process.exit(1);
}

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : error);
  process.exit(1);
});
