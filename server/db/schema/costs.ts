import { sql } from 'drizzle-orm';
import { check, index, integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { batches } from './stock.ts';
import { systems } from './water.ts';

/**
 * What supplies used in a system in a month cost each batch that stood there, shared by frag-days. The parts of a
 * system and month add up to its pool exactly. Rebuilt for a month as a whole.
 */
export const costShares = sqliteTable(
  'cost_share',
  {
    month: text('month').notNull(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    batchId: text('batch_id')
      .notNull()
      .references(() => batches.id),
    part: text('part', { enum: ['lime', 'vinegar', 'other'] }).notNull(),
    fragDays: integer('frag_days').notNull(),
    costMicro: integer('cost_micro').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.batchId, table.month, table.systemId, table.part] }),
    index('cost_share_month').on(table.month, table.systemId),
    check('cost_share_not_negative', sql`${table.costMicro} >= 0 AND ${table.fragDays} >= 0`),
  ],
);

/** Months whose shares are built, and up to which consumption and movement, so that a stale one is seen. */
export const costMonths = sqliteTable('cost_month', {
  month: text('month').primaryKey(),
  builtAt: integer('built_at').notNull(),
  fingerprint: text('fingerprint').notNull(),
});
