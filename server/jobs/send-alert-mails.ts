import { eq } from 'drizzle-orm';
import { farms, notificationChoices } from '../db/schema/index.ts';
import { inWrite, SYSTEM, type Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { type Listener, listeners, unheardAlerts } from '../queries/notifications.ts';
import { queueMail } from '../services/mail-templates.ts';

/** Alerts wait so long for others, so that what happens together comes in one mail. */
const GATHER_MS = 60_000;

/** Queues one mail with what each person did not hear of yet; what was heard and the mail are kept in one transaction. */
export function sendAlertMails(deps: Deps): void {
  if (deps.db.select({ id: farms.id }).from(farms).get() === undefined) return;
  const waiting = listeners(deps.db).filter(({ choices }) => choices.alertsAtOnce);
  for (const listener of waiting) inWrite(deps, SYSTEM, (write) => tell(write, listener));
}

function tell(write: Write, { choices, person }: Listener): void {
  const unheard = unheardAlerts(write.tx, choices);
  const [first] = unheard;
  if (!first || first.announcedAt > write.now - GATHER_MS) return;
  queueMail(write, 'alerts', person.email, { alertIds: unheard.map(({ id }) => id) });
  write.tx
    .update(notificationChoices)
    .set({ heardUpTo: unheard.at(-1)?.announcement ?? choices.heardUpTo })
    .where(eq(notificationChoices.userId, person.id))
    .run();
}
