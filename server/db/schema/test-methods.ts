import { sql } from 'drizzle-orm';
import { blob, check, index, real, sqliteTable, text, unique } from 'drizzle-orm/sqlite-core';
import { day, id, instant, version } from './columns.ts';

/** A way to test one parameter, with how far two tests of the same water lie apart. Figures are in the canonical unit. */
export const testMethods = sqliteTable(
  'test_method',
  {
    id: id(),
    parameter: text('parameter').notNull(),
    name: text('name').notNull(),
    /** The unit that the tester reads. */
    unit: text('unit').notNull(),
    /** Standard deviation of repeated tests of the same water. */
    repeatabilitySd: real('repeatability_sd').notNull(),
    /** Smallest step that it shows. */
    resolution: real('resolution').notNull(),
    /** Where the standard deviation is from. */
    source: text('source').notNull().default(''),
    createdAt: instant('created_at').notNull(),
    retiredAt: instant('retired_at'),
    version: version(),
  },
  (table) => [
    unique('test_method_once').on(table.parameter, table.name),
    check('test_method_sd', sql`${table.repeatabilitySd} > 0 AND ${table.resolution} > 0`),
  ],
);

/** A box of reagents, or one instrument, that a method is done with. */
export const kitLots = sqliteTable(
  'kit_lot',
  {
    id: id(),
    methodId: text('method_id')
      .notNull()
      .references(() => testMethods.id),
    code: text('code').notNull(),
    openedOn: day('opened_on'),
    expiresOn: day('expires_on'),
    createdAt: instant('created_at').notNull(),
    usedUpAt: instant('used_up_at'),
    version: version(),
  },
  (table) => [unique('kit_lot_once').on(table.methodId, table.code)],
);

/**
 * A check of a method against a solution of known value. Its bias corrects later readings of the method (or of the one
 * kit lot) until the next check. Figures are in the canonical unit.
 */
export const calibrations = sqliteTable(
  'calibration',
  {
    id: id(),
    methodId: text('method_id')
      .notNull()
      .references(() => testMethods.id),
    kitLotId: text('kit_lot_id').references(() => kitLots.id),
    at: instant('at').notNull(),
    solution: text('solution').notNull().default(''),
    referenceValue: real('reference_value').notNull(),
    referenceSd: real('reference_sd').notNull(),
    found: text('found', { mode: 'json' }).$type<number[]>().notNull(),
    bias: real('bias').notNull(),
    biasSd: real('bias_sd').notNull(),
    by: text('by').notNull(),
    note: text('note').notNull().default(''),
    createdAt: instant('created_at').notNull(),
  },
  (table) => [
    index('calibration_method').on(table.methodId, table.at),
    index('calibration_kit_lot').on(table.kitLotId),
  ],
);

/** A picture of the slip that readings were written on. */
export const readingPhotos = sqliteTable(
  'reading_photo',
  {
    id: id(),
    contentType: text('content_type', { enum: ['image/jpeg', 'image/png', 'image/webp'] }).notNull(),
    content: blob('content', { mode: 'buffer' }).notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    byUserId: text('by_user_id'),
  },
  (table) => [index('reading_photo_at').on(table.at)],
);
