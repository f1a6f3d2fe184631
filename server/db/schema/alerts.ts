import { sql } from 'drizzle-orm';
import { index, integer, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { ALERT_KINDS } from '../../../shared/domain/alert-rules.ts';
import type { AlertEnd, AlertFacts } from '../../../shared/domain/alert-rules.ts';
import { day, id, instant, version } from './columns.ts';
import { users } from './people.ts';
import { reservoirs } from './reservoirs.ts';
import { systems } from './water.ts';

/** Something about a system that needs a look, from when it began until what ended it. One open alert for each subject. */
export const alerts = sqliteTable(
  'alert',
  {
    id: id(),
    /** What it is about: kind, system and, where there are several, parameter or reservoir. */
    subject: text('subject').notNull(),
    kind: text('kind', { enum: ALERT_KINDS }).notNull(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    reservoirId: text('reservoir_id').references(() => reservoirs.id),
    urgency: text('urgency', { enum: ['now', 'today', 'soon'] }).notNull(),
    /** How bad it is; grows as it gets worse. Its unit belongs to the kind. */
    measure: real('measure').notNull(),
    /** What was seen last. */
    facts: text('facts', { mode: 'json' }).$type<AlertFacts>().notNull(),
    openedAt: instant('opened_at').notNull(),
    lastSeenAt: instant('last_seen_at').notNull(),
    /** Counts what was announced on the whole farm, so that nobody hears the same twice. */
    announcement: integer('announcement').notNull(),
    announcedAt: instant('announced_at').notNull(),
    acknowledgedAt: instant('acknowledged_at'),
    acknowledgedBy: text('acknowledged_by'),
    acknowledgedMeasure: real('acknowledged_measure'),
    closedAt: instant('closed_at'),
    /** What ended it. */
    closedBy: text('closed_by', { mode: 'json' }).$type<AlertEnd>(),
  },
  (table) => [
    uniqueIndex('alert_open')
      .on(table.subject)
      .where(sql`closed_at IS NULL`),
    index('alert_system').on(table.systemId, table.closedAt),
    index('alert_closed').on(table.closedAt, table.id),
    index('alert_opened').on(table.openedAt, table.id),
    index('alert_announcement').on(table.announcement),
  ],
);

/** What a person wants to hear by e-mail, and up to where they heard it. */
export const notificationChoices = sqliteTable('notification_choice', {
  userId: text('user_id')
    .primaryKey()
    .references(() => users.id),
  alertsAtOnce: integer('alerts_at_once', { mode: 'boolean' }).notNull(),
  /** Hour of the farm's day at which the daily mail goes out; null: none. */
  digestHour: integer('digest_hour'),
  mutedKinds: text('muted_kinds', { mode: 'json' }).$type<(typeof ALERT_KINDS)[number][]>().notNull(),
  heardUpTo: integer('heard_up_to').notNull(),
  lastDigestOn: day('last_digest_on'),
  version: version(),
});
