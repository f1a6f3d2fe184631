import { sql } from 'drizzle-orm';
import { check, index, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { id, instant, version } from './columns.ts';

/** New salt water mixed at one time, with its own readings; what is left of it waits for water changes. */
export const saltBatches = sqliteTable(
  'salt_batch',
  {
    id: id(),
    litres: real('litres').notNull(),
    remainingL: real('remaining_l').notNull(),
    saltItemId: text('salt_item_id'),
    saltG: real('salt_g').notNull().default(0),
    /** Its readings, null where it was not tested for it. */
    salinity: real('salinity'),
    alkalinityMeqL: real('alkalinity_meq_l'),
    calciumMgL: real('calcium_mg_l'),
    magnesiumMgL: real('magnesium_mg_l'),
    temperatureC: real('temperature_c'),
    at: instant('at').notNull(),
    readyAt: instant('ready_at').notNull(),
    by: text('by').notNull(),
    note: text('note').notNull().default(''),
    /** When what was left of it was poured away. */
    discardedAt: instant('discarded_at'),
    version: version(),
  },
  (table) => [
    index('salt_batch_at').on(table.at),
    check(
      'salt_batch_remaining',
      sql`${table.litres} > 0 AND ${table.remainingL} >= 0 AND ${table.remainingL} <= ${table.litres}`,
    ),
  ],
);
