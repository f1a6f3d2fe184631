import { eq, max } from 'drizzle-orm';
import type { EditNotifications, NotificationChoices } from '../../shared/contracts/notifications.ts';
import { dayOf, instantAt } from '../../shared/domain/days.ts';
import { alerts, calendarFeeds, notificationChoices } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { choicesRow, showChoices } from '../queries/notifications.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';
import { newToken } from './mailed-tokens.ts';

/**
 * Chooses what a person hears of by e-mail. What was announced before is not sent after; a daily mail whose hour has
 * passed begins tomorrow.
 *
 * @throws {DomainError} `edit.stale`
 */
export function editChoices(
  write: Write,
  userId: string,
  ifMatch: number,
  edit: EditNotifications,
): NotificationChoices {
  const before = showChoices(write.tx, userId);
  assertVersion(before, ifMatch, before);
  const row = choicesRow(write.tx, userId);
  const { alertsAtOnce, digestHour, mutedKinds } = { ...before, ...definedOnly(edit) };
  const beginsNow = alertsAtOnce && !before.alertsAtOnce;
  const values = {
    ...{ alertsAtOnce, digestHour, mutedKinds: [...new Set(mutedKinds)], version: before.version + 1 },
    heardUpTo: beginsNow || !row ? lastAnnouncement(write) : row.heardUpTo,
    lastDigestOn: digestHour === before.digestHour ? (row?.lastDigestOn ?? null) : passedToday(write, digestHour),
  };
  write.tx
    .insert(notificationChoices)
    .values({ userId, ...values })
    .onConflictDoUpdate({ target: notificationChoices.userId, set: values })
    .run();
  const after = showChoices(write.tx, userId);
  write.audit({ action: 'notifications.changed', entity: 'user', entityId: userId, before, after });
  return after;
}

/** A new secret for a person's calendar; it is told this once, and the one before stops working. */
export function renewCalendar(write: Write, userId: string): string {
  const { token, tokenHash } = newToken();
  const fresh = { tokenHash, createdAt: write.now };
  write.tx
    .insert(calendarFeeds)
    .values({ userId, ...fresh })
    .onConflictDoUpdate({ target: calendarFeeds.userId, set: fresh })
    .run();
  write.audit({ action: 'calendar.renewed', entity: 'user', entityId: userId });
  return token;
}

export function endCalendar(write: Write, userId: string): void {
  write.tx.delete(calendarFeeds).where(eq(calendarFeeds.userId, userId)).run();
  write.audit({ action: 'calendar.ended', entity: 'user', entityId: userId });
}

export function lastAnnouncement(write: Write): number {
  return (
    write.tx
      .select({ last: max(alerts.announcement) })
      .from(alerts)
      .get()?.last ?? 0
  );
}

/** Today, where the hour has passed, as if it had been sent; null where today's is still to come. */
function passedToday(write: Write, digestHour: number | null): string | null {
  const { timeZone } = farmOf(write.tx);
  const today = dayOf(write.now, timeZone);
  return digestHour !== null && instantAt(today, digestHour * 60, timeZone) > write.now ? null : today;
}
