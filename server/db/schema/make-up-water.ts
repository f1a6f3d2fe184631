import { sql } from 'drizzle-orm';
import { type AnySQLiteColumn, check, index, integer, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { CARTRIDGE_STAGES } from '../../../shared/domain/cartridges.ts';
import { day, id, instant, version } from './columns.ts';
import { items } from './supplies.ts';
import { systems } from './water.ts';

/** A look at the unit that makes pure water; TDS in mg/L, `litresMade` since the look before. */
export const makeUpReadings = sqliteTable(
  'make_up_reading',
  {
    id: id(),
    at: instant('at').notNull(),
    tdsIn: real('tds_in'),
    tdsMembrane: real('tds_membrane'),
    tdsOut: real('tds_out'),
    litresMade: real('litres_made'),
    by: text('by').notNull(),
    note: text('note').notNull().default(''),
  },
  (table) => [index('make_up_reading_at').on(table.at)],
);

/** A cartridge of the unit from its installing to its removal, and what ends its life. */
export const cartridges = sqliteTable(
  'cartridge',
  {
    id: id(),
    stage: text('stage', { enum: CARTRIDGE_STAGES }).notNull(),
    name: text('name').notNull(),
    /** The supply that a piece was taken from. */
    itemId: text('item_id').references(() => items.id),
    installedOn: day('installed_on').notNull(),
    lifeDays: integer('life_days'),
    lifeL: real('life_l'),
    limit: real('limit_value'),
    removedOn: day('removed_on'),
    /** The one that it took the place of. */
    replacesId: text('replaces_id').references((): AnySQLiteColumn => cartridges.id),
    by: text('by').notNull(),
    note: text('note').notNull().default(''),
    version: version(),
  },
  (table) => [index('cartridge_installed').on(table.installedOn)],
);

/** A system's habit of changing water. */
export const waterChangePlans = sqliteTable(
  'water_change_plan',
  {
    systemId: text('system_id')
      .primaryKey()
      .references(() => systems.id),
    everyDays: integer('every_days').notNull(),
    fraction: real('fraction').notNull(),
    startOn: day('start_on').notNull(),
    by: text('by').notNull(),
    updatedAt: instant('updated_at').notNull(),
    version: version(),
  },
  (table) => [
    check('water_change_plan_habit', sql`${table.everyDays} >= 1 AND ${table.fraction} > 0 AND ${table.fraction} <= 1`),
  ],
);
