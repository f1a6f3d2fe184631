import { primaryKey, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.ts';
import { systems } from './water.ts';

/**
 * What is known of a system's demand at its last test, kept so that lists need not work it out. Triggers take a row away
 * as soon as anything that it stands on changes; a job makes it anew.
 */
export const demandStates = sqliteTable(
  'demand_state',
  {
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id, { onDelete: 'cascade' }),
    parameter: text('parameter', { enum: ['alkalinity', 'calcium', 'magnesium'] }).notNull(),
    /** The instant that it was made for. */
    at: instant('at').notNull(),
    demand: real('demand').notNull(),
    variance: real('variance').notNull(),
    /** What each day without a test adds to the variance. */
    driftVariance: real('drift_variance').notNull(),
    /** Tests that count, of the four weeks before. */
    testedAt: text('tested_at', { mode: 'json' }).$type<number[]>().notNull(),
  },
  (table) => [primaryKey({ columns: [table.systemId, table.parameter] })],
);
