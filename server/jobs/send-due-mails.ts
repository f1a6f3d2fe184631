import { and, asc, eq, gt, isNull, lte } from 'drizzle-orm';
import { outboxMails } from '../db/schema/index.ts';
import type { Deps } from '../deps.ts';
import { renderMail } from '../services/mail-templates.ts';

const HOUR = 3_600_000;
const FIRST_RETRY = 5000;
/** A mail server may be away for a weekend; older news help nobody. */
const GIVE_UP_AFTER = 72 * HOUR;

/** Sends what the outbox holds; a failure is tried again later, after twice as long each time up to an hour. */
export async function sendDueMails(deps: Deps): Promise<void> {
  const now = deps.clock.now();
  const due = deps.db
    .select()
    .from(outboxMails)
    .where(
      and(
        isNull(outboxMails.sentAt),
        lte(outboxMails.nextAttemptAt, now),
        gt(outboxMails.createdAt, now - GIVE_UP_AFTER),
      ),
    )
    .orderBy(asc(outboxMails.createdAt))
    .limit(20)
    .all();
  for (const row of due) {
    const outcome = await attempt(deps, row);
    deps.db.update(outboxMails).set(outcome).where(eq(outboxMails.id, row.id)).run();
  }
}

async function attempt(deps: Deps, row: typeof outboxMails.$inferSelect) {
  const attempts = row.attempts + 1;
  try {
    await deps.mail.send({ id: row.id, to: row.toAddress, ...(await renderMail(deps, row)) });
    return { attempts, sentAt: deps.clock.now(), lastError: null, data: withoutToken(row.data) };
  } catch (error) {
    const lastError = error instanceof Error ? error.message : 'unknown';
    const nextAttemptAt = deps.clock.now() + Math.min(HOUR, FIRST_RETRY * 2 ** row.attempts);
    if (nextAttemptAt < row.createdAt + GIVE_UP_AFTER) deps.log.warn({ mail: row.id, attempts }, 'mail not sent yet');
    else deps.log.error({ mail: row.id, attempts, lastError }, 'mail given up');
    return { attempts, lastError, nextAttemptAt };
  }
}

/** Links to sign in by are secrets: once their mail is out, only their hash is kept. */
function withoutToken({ token: _token, ...rest }: Record<string, unknown>): Record<string, unknown> {
  return rest;
}
