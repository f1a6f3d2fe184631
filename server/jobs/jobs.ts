import { lt } from 'drizzle-orm';
import { idempotencyKeys } from '../db/schema/index.ts';
import { inWrite, SYSTEM } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { deleteExpiredSessions } from '../http/session.ts';
import { forgetLoosePhotos } from '../services/reading-photos.ts';
import { forgetOldTries } from '../services/sign-in-slowdown.ts';
import { bookDosingDays } from './book-dosing.ts';
import { closeCheckouts } from './close-checkouts.ts';
import { expireHolds } from './expire-holds.ts';
import { keepDemands } from './keep-demands.ts';
import { raiseAlerts, raiseSlowAlerts } from './raise-alerts.ts';
import { importReadings } from './import-readings.ts';
import { sendAlertMails } from './send-alert-mails.ts';
import { sendDigests } from './send-digests.ts';
import { sendDueMails } from './send-due-mails.ts';
import { sendRefunds } from './send-refunds.ts';
import { shareCosts } from './share-costs.ts';

const SECOND = 1000;
const DAY = 86_400_000;

interface Job {
  name: string;
  everyMs: number;
  run: (deps: Deps) => void | Promise<void>;
}

const JOBS: readonly Job[] = [
  { name: 'send mails', everyMs: 2 * SECOND, run: sendDueMails },
  { name: 'import readings', everyMs: SECOND, run: importReadings },
  { name: 'expire holds', everyMs: 15 * SECOND, run: expireHolds },
  { name: 'close checkouts', everyMs: 15 * SECOND, run: closeCheckouts },
  { name: 'send refunds', everyMs: 3 * SECOND, run: sendRefunds },
  { name: 'delete expired sessions', everyMs: 3600 * SECOND, run: deleteExpiredSessions },
  { name: 'forget old request keys', everyMs: 3600 * SECOND, run: forgetOldRequestKeys },
  { name: 'forget old sign-in tries', everyMs: 3600 * SECOND, run: (deps) => inWrite(deps, SYSTEM, forgetOldTries) },
  { name: 'forget loose photos', everyMs: 3600 * SECOND, run: forgetLoosePhotos },
  { name: 'book steady dosing', everyMs: 600 * SECOND, run: bookDosingDays },
  { name: 'keep demands', everyMs: 10 * SECOND, run: keepDemands },
  { name: 'raise alerts', everyMs: 60 * SECOND, run: raiseAlerts },
  { name: 'raise slow alerts', everyMs: 3600 * SECOND, run: raiseSlowAlerts },
  { name: 'send alert mails', everyMs: 15 * SECOND, run: sendAlertMails },
  { name: 'send daily mails', everyMs: 60 * SECOND, run: sendDigests },
  { name: 'share costs', everyMs: 3600 * SECOND, run: shareCosts },
];

/** Starts the recurring work. @returns a stop that waits for what is running */
export function startJobs(deps: Deps): () => Promise<void> {
  const running = new Set<Promise<void>>();
  const timers = JOBS.map((job) => {
    let busy = false;
    return setInterval(() => {
      if (busy) return;
      busy = true;
      const run = runJob(job, deps).finally(() => {
        busy = false;
        running.delete(run);
      });
      running.add(run);
    }, job.everyMs);
  });
  return async () => {
    for (const timer of timers) clearInterval(timer);
    await Promise.all(running);
  };
}

async function runJob(job: Job, deps: Deps): Promise<void> {
  try {
    await job.run(deps);
  } catch (error) {
    deps.log.error({ err: error, job: job.name }, 'job failed');
  }
}

function forgetOldRequestKeys({ db, clock }: Deps): void {
  db.delete(idempotencyKeys)
    .where(lt(idempotencyKeys.at, clock.now() - 30 * DAY))
    .run();
}
