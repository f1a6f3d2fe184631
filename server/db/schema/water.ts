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

/** A vessel of limewater. At most one reservoir is online for a system at a time. */
export const reservoirs = sqliteTable(
  'reservoir',
  {
    id: id(),
    code: text('code').notNull().unique(),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    volumeL: real('volume_l').notNull(),
    state: text('state', { enum: ['standby', 'settling', 'online', 'spent'] })
      .notNull()
      .default('standby'),
    levelL: real('level_l').notNull().default(0),
    /** Strength of what is in it, once acetate is used up. */
    alkalinityMeqL: real('alkalinity_meq_l').notNull().default(0),
    readyAt: instant('ready_at'),
    /** Inner height up to the full level, and inner area of the bottom where it is known: litres follow from depth. */
    heightMm: real('height_mm'),
    footprintCm2: real('footprint_cm2'),
    /** How far the intake stands above the bottom; what lies below it is sludge and never drawn. */
    intakeMm: real('intake_mm'),
    covered: integer('covered', { mode: 'boolean' }).notNull().default(true),
    /** Days online after which the farm replaces it, whatever is left; null where it runs until it is low. */
    replaceDays: integer('replace_days'),
    sludgeWeeks: integer('sludge_weeks').notNull().default(6),
    pumpLPerH: real('pump_l_per_h'),
    createdAt: instant('created_at').notNull(),
    retiredAt: instant('retired_at'),
    version: version(),
  },
  (table) => [
    index('reservoir_system').on(table.systemId),
    check('reservoir_level', sql`${table.levelL} >= 0 AND ${table.levelL} <= ${table.volumeL} * 1.02`),
  ],
);

/**
 * Which systems a reservoir feeds, and the part of its flow that each gets. All rows of one `since` are one set; the
 * newest set holds, an older one for what was drawn in its time. Without any, all goes to the reservoir's own system.
 */
export const reservoirFeeds = sqliteTable(
  'reservoir_feed',
  {
    reservoirId: text('reservoir_id')
      .notNull()
      .references(() => reservoirs.id),
    systemId: text('system_id')
      .notNull()
      .references(() => systems.id),
    since: instant('since').notNull(),
    share: real('share').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.reservoirId, table.since, table.systemId] }),
    index('reservoir_feed_system').on(table.systemId),
    check('reservoir_feed_share', sql`${table.share} > 0 AND ${table.share} <= 1`),
  ],
);

/**
 * What happened to a reservoir, in order. `levelL` and `alkalinityMeqL` are what holds after the event; `levelBeforeL`
 * is what stood in it before water was added or sludge taken out, so that only what fell in between counts as drawn.
 */
export const reservoirEvents = sqliteTable(
  'reservoir_event',
  {
    id: id(),
    reservoirId: text('reservoir_id')
      .notNull()
      .references(() => reservoirs.id),
    kind: text('kind', {
      enum: ['refill', 'level', 'online', 'offline', 'topped_up', 'strength', 'sludge_removed', 'spent', 'cleaned'],
    }).notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    levelBeforeL: real('level_before_l').notNull(),
    levelL: real('level_l').notNull(),
    alkalinityMeqL: real('alkalinity_meq_l').notNull(),
    waterL: real('water_l'),
    limeG: real('lime_g'),
    limePurity: real('lime_purity'),
    vinegarMl: real('vinegar_ml'),
    acidPercent: real('acid_percent'),
    temperatureC: real('temperature_c'),
    undissolvedG: real('undissolved_g'),
    calciumMgL: real('calcium_mg_l'),
    /** A strength check: what the meter read, and the farm's own reading of fresh saturated limewater, mS/cm. */
    conductivityMsCm: real('conductivity_ms_cm'),
    freshMsCm: real('fresh_ms_cm'),
    /** Strength that the check found, as a part of what was expected to stand in it. */
    strengthLeft: real('strength_left'),
    /** How it was set up when it went online. */
    intakeMm: real('intake_mm'),
    covered: integer('covered', { mode: 'boolean' }),
    note: text('note').notNull().default(''),
  },
  (table) => [
    index('reservoir_event_order').on(table.reservoirId, table.at),
    index('reservoir_event_kind').on(table.reservoirId, table.kind, table.at),
  ],
);
