import { sql } from 'drizzle-orm';
import { check, index, integer, primaryKey, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import type { PrintedSubject } from '../../../shared/contracts/labels.ts';
import { id, instant, version } from './columns.ts';

/** Label stocks of the farm's own, beside those that come with the product (`LABEL_SHEETS`). Lengths are mm. */
export const labelStocks = sqliteTable(
  'label_stock',
  {
    id: id(),
    name: text('name').notNull(),
    paper: text('paper', { enum: ['A4', 'letter', 'roll'] }).notNull(),
    shape: text('shape', { enum: ['rectangle', 'round'] }).notNull(),
    width: real('width_mm').notNull(),
    height: real('height_mm').notNull(),
    columns: integer('columns').notNull(),
    rows: integer('rows').notNull(),
    left: real('left_mm').notNull(),
    top: real('top_mm').notNull(),
    pitchX: real('pitch_x_mm').notNull(),
    pitchY: real('pitch_y_mm').notNull(),
    cutLines: integer('cut_lines', { mode: 'boolean' }).notNull(),
    createdAt: instant('created_at').notNull(),
    retiredAt: instant('retired_at'),
    version: version(),
  },
  (table) => [
    uniqueIndex('label_stock_name')
      .on(table.name)
      .where(sql`${table.retiredAt} IS NULL`),
    check('label_stock_size', sql`${table.width} > 0 AND ${table.height} > 0`),
    check('label_stock_grid', sql`${table.columns} > 0 AND ${table.rows} > 0`),
  ],
);

/** What a printer needs to hit the labels of a stock: where to draw x is x · scale + shift, from the top left corner. */
export const labelFits = sqliteTable(
  'label_fit',
  {
    /** A stock of the farm's own or one that comes with the product. */
    stockId: text('stock_id').notNull(),
    printer: text('printer').notNull(),
    shiftX: real('shift_x_mm').notNull(),
    shiftY: real('shift_y_mm').notNull(),
    scaleX: real('scale_x').notNull(),
    scaleY: real('scale_y').notNull(),
    savedAt: instant('saved_at').notNull(),
    by: text('by').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.stockId, table.printer] }),
    check('label_fit_scale', sql`${table.scaleX} > 0 AND ${table.scaleY} > 0`),
  ],
);

/** Every run of labels, so that it can be printed again. */
export const labelPrints = sqliteTable(
  'label_print',
  {
    id: id(),
    subject: text('subject', { mode: 'json' }).$type<PrintedSubject>().notNull(),
    title: text('title').notNull(),
    labels: integer('labels').notNull(),
    stockId: text('stock_id').notNull(),
    start: integer('start').notNull(),
    printer: text('printer').notNull(),
    edges: integer('edges', { mode: 'boolean' }).notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
  },
  (table) => [index('label_print_at').on(table.at, table.id), check('label_print_labels', sql`${table.labels} > 0`)],
);
