import { eq } from 'drizzle-orm';
import { dayOf, instantAt } from '../../shared/domain/days.ts';
import { farms, notificationChoices } from '../db/schema/index.ts';
import { inWrite, SYSTEM, type Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { digestOf, isWorthTelling } from '../queries/digest.ts';
import { type Listener, listeners } from '../queries/notifications.ts';
import { queueMail } from '../services/mail-templates.ts';

/** Queues each person's daily mail once its hour has come; where nothing is open, the day passes without one. */
export function sendDigests(deps: Deps): void {
  const farm = deps.db.select().from(farms).get();
  if (!farm) return;
  const today = dayOf(deps.clock.now(), farm.timeZone);
  const due = listeners(deps.db).filter(
    ({ choices: { digestHour, lastDigestOn } }) =>
      digestHour !== null &&
      lastDigestOn !== today &&
      instantAt(today, digestHour * 60, farm.timeZone) <= deps.clock.now(),
  );
  for (const listener of due) inWrite(deps, SYSTEM, (write) => sendOne(write, listener, today));
}

function sendOne(write: Write, { choices, person }: Listener, today: string): void {
  const digest = digestOf(write.tx, { userId: person.id, role: person.role }, choices.mutedKinds, write.now);
  if (isWorthTelling(digest)) queueMail(write, 'digest', person.email, { userId: person.id });
  write.tx
    .update(notificationChoices)
    .set({ lastDigestOn: today })
    .where(eq(notificationChoices.userId, person.id))
    .run();
}
