import { sql } from 'drizzle-orm';
import { check, index, integer, primaryKey, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { id, instant, version } from './columns.ts';
import { systems } from './water.ts';

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
