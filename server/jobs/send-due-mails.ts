import { and, asc, eq, isNull, lt, lte } from 'drizzle-orm';
import { outboxMails } from '../db/schema/index.ts';
import type { Deps } from '../deps.ts';
import { renderMail } from '../services/mail-templates.ts';

const MAX_ATTEMPTS = 10;
const FIRST_RETRY = 5000;

/** Sends what the outbox holds; a failure is tried again later, each time after twice as long. */
export async function sendDueMails(deps: Deps): Promise<void> {
  const now = deps.clock.now();
  const due = deps.db
    .select()
    .from(outboxMails)
    .where(and(isNull(outboxMails.sentAt), lte(outboxMails.nextAttemptAt, now), lt(outboxMails.attempts, MAX_ATTEMPTS)))
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
    await deps.mail.send({ to: row.toAddress, ...(await renderMail(deps, row)) });
    return { attempts, sentAt: deps.clock.now(), lastError: null, data: withoutToken(row.data) };
  } catch (error) {
    const message = error instanceof Error ? error.message : 'unknown';
    deps.log.warn({ mail: row.id, attempts }, 'mail not sent yet');
    return { attempts, lastError: message, nextAttemptAt: deps.clock.now() + FIRST_RETRY * 2 ** row.attempts };
  }
}

/** Links to sign in by are secrets: once their mail is out, only their hash is kept. */
function withoutToken({ token: _token, ...rest }: Record<string, unknown>): Record<string, unknown> {
  return rest;
}
