import type { Server } from 'node:http';
import type { Logger } from 'pino';

const LIMIT = 10_000;
/** How often connections are looked at that a browser keeps open after its last answer. */
const IDLE_CHECK = 100;

interface Running {
  server: Server;
  log: Logger;
  /** Stops recurring work and waits for what is under way. */
  stopJobs: () => Promise<void>;
  /** Closes what requests and jobs use, once they are done. */
  close: () => void;
}

/**
 * Stops the process well on SIGINT or SIGTERM. The same signal again ends it at once; another one does not, since a
 * terminal and the parent process may each send their own.
 */
export function shutDownOnSignals(running: Running): void {
  const seen = new Set<NodeJS.Signals>();
  for (const signal of ['SIGINT', 'SIGTERM'] as const) {
    process.on(signal, () => {
      if (seen.has(signal)) process.exit(1);
      if (seen.size === 0) void shutDown(running);
      seen.add(signal);
    });
  }
}

async function shutDown({ server, log, stopJobs, close }: Running): Promise<void> {
  log.info('Finishing what is under way, then stopping.');
  const limit = setTimeout(() => process.exit(1), LIMIT);
  await finishRequests(server);
  await stopJobs();
  close();
  clearTimeout(limit);
}

/** Takes no new connections and lets requests under way finish; a connection ends as soon as nothing runs on it. */
export async function finishRequests(server: Server): Promise<void> {
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  const idle = setInterval(() => server.closeIdleConnections(), IDLE_CHECK);
  await closed;
  clearInterval(idle);
}
