import { and, asc, eq, gt, isNull } from 'drizzle-orm';
import type { NotificationChoices } from '../../shared/contracts/notifications.ts';
import { mayUse } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';
import { alerts, calendarFeeds, notificationChoices, users } from '../db/schema/index.ts';
import type { AlertRow } from './alerts.ts';

export type ChoicesRow = typeof notificationChoices.$inferSelect;

/** Nobody hears anything that they did not ask for. */
const NOTHING_CHOSEN = { alertsAtOnce: false, digestHour: null, mutedKinds: [], version: 1 };

export function choicesRow(db: Db, userId: string): ChoicesRow | undefined {
  return db.select().from(notificationChoices).where(eq(notificationChoices.userId, userId)).get();
}

export function showChoices(db: Db, userId: string): NotificationChoices {
  const { alertsAtOnce, digestHour, mutedKinds, version } = choicesRow(db, userId) ?? NOTHING_CHOSEN;
  const feed = db.select().from(calendarFeeds).where(eq(calendarFeeds.userId, userId)).get();
  return { alertsAtOnce, digestHour, mutedKinds, calendarSince: feed?.createdAt ?? null, version };
}

/** Someone who hears of the water by e-mail. */
export interface Listener {
  choices: ChoicesRow;
  person: typeof users.$inferSelect;
}

/** Everyone who chose something, still belongs to the farm and may see its water. */
export function listeners(db: Db): Listener[] {
  return db
    .select({ choices: notificationChoices, person: users })
    .from(notificationChoices)
    .innerJoin(users, eq(users.id, notificationChoices.userId))
    .where(isNull(users.disabledAt))
    .orderBy(asc(users.id))
    .all()
    .filter(({ person }) => mayUse(person.role, 'water.read'));
}

/** Open alerts that nobody knows of and that this person did not hear of yet, oldest first. */
export function unheardAlerts(db: Db, { heardUpTo, mutedKinds }: ChoicesRow): AlertRow[] {
  return db
    .select()
    .from(alerts)
    .where(and(gt(alerts.announcement, heardUpTo), isNull(alerts.closedAt), isNull(alerts.acknowledgedAt)))
    .orderBy(asc(alerts.announcement))
    .all()
    .filter(({ kind }) => !mutedKinds.includes(kind));
}
