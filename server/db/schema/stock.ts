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
import { day, id, instant, version } from './columns.ts';
import { racks, systems } from './water.ts';

/** A lineage: one clone and all its descendants. */
export const lines = sqliteTable('line', {
  id: id(),
  code: text('code').notNull().unique(),
  tradeName: text('trade_name').notNull(),
  taxon: text('taxon').notNull(),
  growthForm: text('growth_form').notNull(),
  publicText: text('public_text').notNull().default(''),
  careText: text('care_text').notNull().default(''),
  origin: text('origin').notNull().default(''),
  citesSource: text('cites_source').notNull().default(''),
  /** Expected size at cutting and growth; null: the growth form's default. */
  startMm: real('start_mm'),
  mmPerWeek: real('mm_per_week'),
  healDays: integer('heal_days'),
  createdAt: instant('created_at').notNull(),
  retiredAt: instant('retired_at'),
  version: version(),
});

/** A mother colony, kept for cutting. */
export const colonies = sqliteTable(
  'colony',
  {
    id: id(),
    code: text('code').notNull().unique(),
    lineId: text('line_id')
      .notNull()
      .references(() => lines.id),
    rackId: text('rack_id')
      .notNull()
      .references(() => racks.id),
    sizeMm: real('size_mm').notNull(),
    health: text('health', { enum: ['good', 'watch', 'poor'] })
      .notNull()
      .default('good'),
    restDays: integer('rest_days').notNull(),
    lastCutOn: day('last_cut_on'),
    acquiredOn: day('acquired_on').notNull(),
    acquiredFrom: text('acquired_from').notNull().default(''),
    createdAt: instant('created_at').notNull(),
    retiredAt: instant('retired_at'),
    version: version(),
  },
  (table) => [index('colony_line').on(table.lineId)],
);

/** One cutting of one colony, with what it took. */
export const cuts = sqliteTable(
  'cut',
  {
    id: id(),
    colonyId: text('colony_id')
      .notNull()
      .references(() => colonies.id),
    cutOn: day('cut_on').notNull(),
    pieces: integer('pieces').notNull(),
    failedPieces: integer('failed_pieces').notNull().default(0),
    minutes: integer('minutes'),
    tool: text('tool').notNull().default(''),
    by: text('by').notNull(),
    note: text('note').notNull().default(''),
    createdAt: instant('created_at').notNull(),
    /** Logged by mistake and taken back; its plugs have left the stock. */
    undoneAt: instant('undone_at'),
  },
  (table) => [index('cut_colony').on(table.colonyId, table.cutOn), check('cut_pieces', sql`${table.pieces} > 0`)],
);

/** The pieces of one cut that live and are counted together. */
export const batches = sqliteTable(
  'batch',
  {
    id: id(),
    code: text('code').notNull().unique(),
    lineId: text('line_id')
      .notNull()
      .references(() => lines.id),
    cutId: text('cut_id')
      .notNull()
      .references(() => cuts.id),
    cutOn: day('cut_on').notNull(),
    pieces: integer('pieces').notNull(),
    startMm: real('start_mm').notNull(),
    createdAt: instant('created_at').notNull(),
  },
  (table) => [
    index('batch_line').on(table.lineId),
    index('batch_cut').on(table.cutId),
    index('batch_cut_on').on(table.cutOn),
  ],
);

/**
 * Where whole pieces can be. `rack` accounts name their rack; `lost` its cause; `order` the order it is packed for.
 * `cut` and `count` are sources and may go below zero; no other account can.
 */
export const stockAccounts = sqliteTable(
  'stock_account',
  {
    id: id(),
    kind: text('kind', {
      enum: ['cut', 'rack', 'order', 'sold', 'lost', 'culled', 'recut', 'given', 'count'],
    }).notNull(),
    rackId: text('rack_id').references(() => racks.id),
    /** Cause of a loss, or the id of the order. Empty for the others. */
    detail: text('detail').notNull().default(''),
    isSource: integer('is_source', { mode: 'boolean' }).generatedAlwaysAs(sql`kind IN ('cut', 'count')`, {
      mode: 'stored',
    }),
  },
  (table) => [
    unique('stock_account_rack').on(table.rackId),
    uniqueIndex('stock_account_kind')
      .on(table.kind, table.detail)
      .where(sql`${table.rackId} IS NULL`),
    check('stock_account_rack_named', sql`(${table.kind} = 'rack') = (${table.rackId} IS NOT NULL)`),
  ],
);

/** A labelled plug: one piece of a batch. Account and position are kept by the ledger's triggers, never set by hand. */
export const plugs = sqliteTable(
  'plug',
  {
    code: text('code').primaryKey(),
    batchId: text('batch_id')
      .notNull()
      .references(() => batches.id),
    number: integer('number').notNull(),
    accountId: text('account_id').references(() => stockAccounts.id),
    position: text('position'),
    createdAt: instant('created_at').notNull(),
  },
  (table) => [
    unique('plug_number').on(table.batchId, table.number),
    unique('plug_position').on(table.accountId, table.position),
    index('plug_account').on(table.accountId, table.batchId),
  ],
);

/**
 * The ledger: `pieces` of a batch go from one account to another. Rows are never edited or deleted; a mistake is undone
 * by a movement that names it in `reversesId`. Guarded by triggers (drizzle/0001_ledger_guards.sql).
 */
export const stockMovements = sqliteTable(
  'stock_movement',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    /** Movements of one act (a run of scans, a cut) share a group and are undone together. */
    groupId: text('group_id').notNull(),
    kind: text('kind', {
      enum: ['cut', 'place', 'move', 'loss', 'cull', 'give', 'recut', 'pick', 'ship', 'count', 'reversal'],
    }).notNull(),
    batchId: text('batch_id')
      .notNull()
      .references(() => batches.id),
    plugCode: text('plug_code').references(() => plugs.code),
    fromAccountId: text('from_account_id')
      .notNull()
      .references(() => stockAccounts.id),
    toAccountId: text('to_account_id')
      .notNull()
      .references(() => stockAccounts.id),
    fromPosition: text('from_position'),
    toPosition: text('to_position'),
    pieces: integer('pieces').notNull(),
    /** What was seen, for losses. */
    seen: text('seen').notNull().default(''),
    note: text('note').notNull().default(''),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    recordedAt: instant('recorded_at').notNull(),
    reversesId: integer('reverses_id'),
  },
  (table) => [
    unique('stock_movement_reversed_once').on(table.reversesId),
    index('stock_movement_batch').on(table.batchId, table.at),
    index('stock_movement_plug').on(table.plugCode),
    index('stock_movement_group').on(table.groupId),
    index('stock_movement_at').on(table.at),
    check('stock_movement_pieces', sql`${table.pieces} > 0 AND (${table.plugCode} IS NULL OR ${table.pieces} = 1)`),
    check(
      'stock_movement_goes_somewhere',
      sql`${table.fromAccountId} <> ${table.toAccountId} OR ${table.fromPosition} IS NOT ${table.toPosition}`,
    ),
  ],
);

/** Pieces of a batch in an account: the sum of its movements, kept by triggers. `npm run ledger:check` compares. */
export const stockBalances = sqliteTable(
  'stock_balance',
  {
    batchId: text('batch_id')
      .notNull()
      .references(() => batches.id),
    accountId: text('account_id')
      .notNull()
      .references(() => stockAccounts.id),
    pieces: integer('pieces').notNull(),
    isSource: integer('is_source', { mode: 'boolean' }).notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.batchId, table.accountId] }),
    index('stock_balance_account').on(table.accountId),
    check('stock_balance_not_negative', sql`${table.isSource} = 1 OR ${table.pieces} >= 0`),
  ],
);

/** Opened by the ledger's own triggers for the length of a movement; balances and plug places refuse changes while shut. */
export const ledgerGate = sqliteTable('ledger_gate', {
  id: integer('id').primaryKey(),
  open: integer('open', { mode: 'boolean' }).notNull(),
  /** Newest movement that is in the balances. Only a newer one can open the gate. */
  postedId: integer('posted_id').notNull().default(0),
});

/** Measured size of a plug, or of a sample of a batch. */
export const sizeReadings = sqliteTable(
  'size_reading',
  {
    id: id(),
    batchId: text('batch_id')
      .notNull()
      .references(() => batches.id),
    plugCode: text('plug_code').references(() => plugs.code),
    sizeMm: real('size_mm').notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
  },
  (table) => [
    index('size_reading_batch').on(table.batchId, table.at),
    index('size_reading_plug').on(table.plugCode, table.at),
    check('size_reading_mm', sql`${table.sizeMm} > 0 AND ${table.sizeMm} < 2000`),
  ],
);

/** Stock kept from sale for a reason: one plug, a batch, a rack or a whole system. Open while `endedAt` is null. */
export const withholds = sqliteTable(
  'withhold',
  {
    id: id(),
    plugCode: text('plug_code').references(() => plugs.code),
    batchId: text('batch_id').references(() => batches.id),
    rackId: text('rack_id').references(() => racks.id),
    systemId: text('system_id').references(() => systems.id),
    reason: text('reason').notNull(),
    startedAt: instant('started_at').notNull(),
    startedBy: text('started_by').notNull(),
    endedAt: instant('ended_at'),
    endedBy: text('ended_by'),
  },
  (table) => [
    index('withhold_open').on(table.endedAt),
    check(
      'withhold_names_one_thing',
      sql`(${table.plugCode} IS NOT NULL) + (${table.batchId} IS NOT NULL) + (${table.rackId} IS NOT NULL) + (${table.systemId} IS NOT NULL) = 1`,
    ),
  ],
);
