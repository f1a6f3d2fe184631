import { sql } from 'drizzle-orm';
import {
  check,
  index,
  integer,
  primaryKey,
  real,
  sqliteTable,
  text,
  unique,
  uniqueIndex,
} from 'drizzle-orm/sqlite-core';
import { POWDER_CODES } from '../../../shared/domain/stock-solutions.ts';
import { day, id, instant, version } from './columns.ts';
import { items, lots } from './supplies.ts';
import { systems } from './water.ts';

/** A recipe of powders in water. What it makes is a supplement of the supplies, one lot for each batch. */
export const stockSolutions = sqliteTable(
  'stock_solution',
  {
    id: id(),
    itemId: text('item_id')
      .notNull()
      .unique()
      .references(() => items.id),
    /** Final volume of the recipe. */
    litres: real('litres').notNull(),
    note: text('note').notNull().default(''),
    createdAt: instant('created_at').notNull(),
  },
  (table) => [check('stock_solution_litres', sql`${table.litres} > 0`)],
);

export const solutionParts = sqliteTable(
  'stock_solution_part',
  {
    solutionId: text('solution_id')
      .notNull()
      .references(() => stockSolutions.id),
    position: integer('position').notNull(),
    /** The supply that is weighed in, and which salt it is. */
    itemId: text('item_id')
      .notNull()
      .references(() => items.id),
    powder: text('powder', { enum: POWDER_CODES }).notNull(),
    purity: real('purity').notNull(),
    grams: real('grams').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.solutionId, table.position] }),
    check('stock_solution_part_amount', sql`${table.grams} > 0 AND ${table.purity} > 0 AND ${table.purity} <= 1`),
  ],
);

export const solutionBatches = sqliteTable(
  'solution_batch',
  {
    id: id(),
    solutionId: text('solution_id')
      .notNull()
      .references(() => stockSolutions.id),
    lotId: text('lot_id')
      .notNull()
      .references(() => lots.id),
    litres: real('litres').notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
  },
  (table) => [index('solution_batch_of').on(table.solutionId, table.at)],
);

export const dosingPumps = sqliteTable('dosing_pump', {
  id: id(),
  code: text('code').notNull().unique(),
  name: text('name').notNull(),
  createdAt: instant('created_at').notNull(),
  retiredAt: instant('retired_at'),
  version: version(),
});

/** What a pump gave when it was asked for an amount; `adjusted` where it was set right by this. */
export const pumpCalibrations = sqliteTable(
  'pump_calibration',
  {
    id: id(),
    pumpId: text('pump_id')
      .notNull()
      .references(() => dosingPumps.id),
    askedMl: real('asked_ml').notNull(),
    measuredMl: text('measured_ml', { mode: 'json' }).$type<number[]>().notNull(),
    factor: real('factor').notNull(),
    adjusted: integer('adjusted', { mode: 'boolean' }).notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    note: text('note').notNull().default(''),
  },
  (table) => [
    index('pump_calibration_of').on(table.pumpId, table.at),
    check('pump_calibration_factor', sql`${table.askedMl} > 0 AND ${table.factor} > 0`),
  ],
);

/** A supplement that is given steadily; a change of the amount ends one row and begins the next. */
export const dosingRates = sqliteTable(
  'dosing_rate',
  {
    id: id(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    itemId: text('item_id')
      .notNull()
      .references(() => items.id),
    pumpId: text('pump_id').references(() => dosingPumps.id),
    /** In the item's unit, as the pump is set. */
    amountPerDay: real('amount_per_day').notNull(),
    startMinute: integer('start_minute'),
    endMinute: integer('end_minute'),
    fromAt: instant('from_at').notNull(),
    toAt: instant('to_at'),
    by: text('by').notNull(),
    endedBy: text('ended_by'),
    note: text('note').notNull().default(''),
  },
  (table) => [
    index('dosing_rate_system').on(table.systemId, table.fromAt),
    index('dosing_rate_item').on(table.itemId),
    uniqueIndex('dosing_rate_running')
      .on(table.systemId, table.itemId)
      .where(sql`${table.toAt} IS NULL`),
    check(
      'dosing_rate_span',
      sql`${table.amountPerDay} > 0 AND (${table.toAt} IS NULL OR ${table.toAt} >= ${table.fromAt})`,
    ),
  ],
);

/** What a rate took from the supplies on one day of the farm; `booked` is less where the books held less. */
export const dosingBookings = sqliteTable(
  'dosing_booking',
  {
    id: id(),
    rateId: text('rate_id')
      .notNull()
      .references(() => dosingRates.id),
    day: day('day').notNull(),
    amount: real('amount').notNull(),
    booked: real('booked').notNull(),
  },
  (table) => [unique('dosing_booking_once').on(table.rateId, table.day)],
);
