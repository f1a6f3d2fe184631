import { sql } from 'drizzle-orm';
import { blob, check, index, integer, primaryKey, real, sqliteTable, text, unique } from 'drizzle-orm/sqlite-core';
import { id, instant, version } from './columns.ts';
import { saltBatches } from './salt-batches.ts';
import { calibrations, kitLots, readingPhotos, testMethods } from './test-methods.ts';

/** Tanks that share one water volume. */
export const systems = sqliteTable(
  'system',
  {
    id: id(),
    code: text('code').notNull().unique(),
    name: text('name').notNull(),
    kind: text('kind', { enum: ['growout', 'broodstock', 'quarantine'] }).notNull(),
    netVolumeL: real('net_volume_l').notNull(),
    /** Open water surface of all its tanks and sumps, for how much may evaporate; null where nobody measured it. */
    surfaceM2: real('surface_m2'),
    note: text('note').notNull().default(''),
    createdAt: instant('created_at').notNull(),
    retiredAt: instant('retired_at'),
    version: version(),
  },
  (table) => [check('system_volume_positive', sql`${table.netVolumeL} > 0`)],
);

/** Where a system's parameter should stay, in the parameter's canonical unit. */
export const targetBands = sqliteTable(
  'target_band',
  {
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    parameter: text('parameter').notNull(),
    low: real('low').notNull(),
    high: real('high').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.systemId, table.parameter] }),
    check('target_band_order', sql`${table.low} < ${table.high}`),
  ],
);

export const tanks = sqliteTable(
  'tank',
  {
    id: id(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    code: text('code').notNull().unique(),
    name: text('name').notNull(),
    createdAt: instant('created_at').notNull(),
  },
  (table) => [index('tank_system').on(table.systemId)],
);

/** A movable tray of plugs; positions are row letter and column number, like C-11. */
export const racks = sqliteTable(
  'rack',
  {
    id: id(),
    tankId: text('tank_id')
      .notNull()
      .references(() => tanks.id),
    code: text('code').notNull().unique(),
    rows: integer('rows').notNull(),
    columns: integer('columns').notNull(),
    createdAt: instant('created_at').notNull(),
    retiredAt: instant('retired_at'),
    version: version(),
  },
  (table) => [
    index('rack_tank').on(table.tankId),
    check('rack_size', sql`${table.rows} BETWEEN 1 AND 26 AND ${table.columns} BETWEEN 1 AND 99`),
  ],
);

/** One import of readings from a file; undone as a whole. A large one is done in pieces by a job. */
export const readingImports = sqliteTable(
  'reading_import',
  {
    id: id(),
    fileName: text('file_name').notNull(),
    /** Readings stored so far. */
    readings: integer('readings').notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    state: text('state', { enum: ['waiting', 'running', 'finished', 'failed'] })
      .notNull()
      .default('finished'),
    rows: integer('rows').notNull().default(0),
    rowsDone: integer('rows_done').notNull().default(0),
    duplicates: integer('duplicates').notNull().default(0),
    badRows: integer('bad_rows').notNull().default(0),
    /** Why it failed, in words for the person. */
    failure: text('failure'),
  },
  (table) => [index('reading_import_at').on(table.at), index('reading_import_state').on(table.state)],
);

/** The file of an import that is still to be done, and what its columns mean. */
export const readingImportFiles = sqliteTable('reading_import_file', {
  importId: text('import_id')
    .primaryKey()
    .references(() => readingImports.id),
  content: blob('content', { mode: 'buffer' }).notNull(),
  mapping: text('mapping', { mode: 'json' }).$type<unknown>().notNull(),
});

/**
 * One measured value in the parameter's canonical unit. `value` is the best statement of it: the mean of the tests, less
 * the bias of the kit where that is known; `measured` is the mean as it was read.
 */
export const readings = sqliteTable(
  'reading',
  {
    id: id(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    parameter: text('parameter').notNull(),
    value: real('value').notNull(),
    method: text('method').notNull().default(''),
    takenAt: instant('taken_at').notNull(),
    by: text('by').notNull(),
    note: text('note').notNull().default(''),
    importId: text('import_id').references(() => readingImports.id),
    createdAt: instant('created_at').notNull(),
    version: version(),
    methodId: text('method_id').references(() => testMethods.id),
    kitLotId: text('kit_lot_id').references(() => kitLots.id),
    /** The check whose bias was taken off. */
    calibrationId: text('calibration_id').references(() => calibrations.id),
    /** Null where it is the value. */
    measured: real('measured'),
    /** Standard deviation of the mean by the method's repeatability; null where no method of the farm is named. */
    sd: real('sd'),
    /** Each test, where there was more than one. */
    repeats: text('repeats', { mode: 'json' }).$type<number[]>(),
    /** The unit that it was typed in. */
    unit: text('unit'),
    photoId: text('photo_id').references(() => readingPhotos.id),
  },
  (table) => [
    unique('reading_once').on(table.systemId, table.parameter, table.takenAt),
    index('reading_system_time').on(table.systemId, table.takenAt),
    index('reading_parameter_time').on(table.parameter, table.takenAt),
    index('reading_time').on(table.takenAt),
    index('reading_import_id').on(table.importId),
    index('reading_method_time').on(table.methodId, table.takenAt),
    index('reading_by_time').on(table.by, table.takenAt),
    index('reading_calibration').on(table.calibrationId),
    index('reading_photo_id').on(table.photoId),
  ],
);

/** Part of a system's water replaced by new water of known alkalinity. */
export const waterChanges = sqliteTable(
  'water_change',
  {
    id: id(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    litres: real('litres').notNull(),
    alkalinityMeqL: real('alkalinity_meq_l').notNull(),
    saltG: real('salt_g').notNull().default(0),
    /** The new water as tested; null where it was not. */
    calciumMgL: real('calcium_mg_l'),
    magnesiumMgL: real('magnesium_mg_l'),
    salinity: real('salinity'),
    saltBatchId: text('salt_batch_id').references(() => saltBatches.id),
    at: instant('at').notNull(),
    by: text('by').notNull(),
  },
  (table) => [
    index('water_change_system').on(table.systemId, table.at),
    check('water_change_litres', sql`${table.litres} > 0`),
  ],
);

/** A supplement other than limewater put into a system; its effect as total alkalinity. */
export const doses = sqliteTable(
  'dose',
  {
    id: id(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    itemId: text('item_id').notNull(),
    amount: real('amount').notNull(),
    alkalinityMeq: real('alkalinity_meq').notNull(),
    calciumMg: real('calcium_mg').notNull().default(0),
    magnesiumMg: real('magnesium_mg').notNull().default(0),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    note: text('note').notNull().default(''),
  },
  (table) => [index('dose_system').on(table.systemId, table.at), check('dose_amount', sql`${table.amount} > 0`)],
);
