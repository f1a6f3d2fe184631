import { z } from 'zod';
import { idParams, instant, listQuery, noteText, pageOf, shortText, version } from '../common.ts';
import type { Endpoint } from '../endpoint.ts';
import { GradeCount, growthForm, lineCode, sizeMm, StockCounts } from './values.ts';

const pace = z.number().positive('A pace is more than zero.').max(50, 'At most 50 mm a week.');
const healDays = z.int('Enter whole days.').min(0).max(365, 'At most 365 days.');
/** CITES source codes (Resolution Conf. 12.3): wild, captive-bred, born in captivity, ranched, confiscated, older, unknown. */
export const CITES_SOURCES = ['', 'W', 'C', 'F', 'R', 'I', 'O', 'U'] as const;
const citesSource = z.enum(CITES_SOURCES, 'Choose a source code.');

const fields = {
  code: lineCode,
  tradeName: shortText,
  taxon: shortText,
  growthForm,
  /** Shown to anyone who scans a plug. */
  publicText: noteText,
  careText: noteText,
  origin: noteText,
  citesSource,
  /** Null: the growth form's default. */
  startMm: sizeMm.nullable(),
  mmPerWeek: pace.nullable(),
  healDays: healDays.nullable(),
};

export const CreateLine = z.strictObject({
  ...fields,
  publicText: noteText.default(''),
  careText: noteText.default(''),
  origin: noteText.default(''),
  citesSource: citesSource.default(''),
  startMm: sizeMm.nullable().default(null),
  mmPerWeek: pace.nullable().default(null),
  healDays: healDays.nullable().default(null),
});
export type CreateLine = z.infer<typeof CreateLine>;
/** The code stays: batch codes and labels are made from it. */
export const EditLine = z
  .strictObject({ ...fields, retired: z.boolean() })
  .omit({ code: true })
  .partial();
export type EditLine = z.infer<typeof EditLine>;

export const Line = z.object({
  id: z.string(),
  code: z.string(),
  tradeName: z.string(),
  taxon: z.string(),
  growthForm: z.string(),
  publicText: z.string(),
  careText: z.string(),
  origin: z.string(),
  citesSource: z.string(),
  startMm: z.number().nullable(),
  mmPerWeek: z.number().nullable(),
  healDays: z.int().nullable(),
  /** The line's own figures, or its growth form's where it has none. */
  expected: z.object({ startMm: z.number(), mmPerWeek: z.number(), healDays: z.int(), restDays: z.int() }),
  createdAt: instant,
  retiredAt: instant.nullable(),
  version,
});
export type Line = z.infer<typeof Line>;

export const LineWithStock = Line.extend({ counts: StockCounts, grades: z.array(GradeCount), colonies: z.int() });
export type LineWithStock = z.infer<typeof LineWithStock>;

export const ListLines = listQuery.extend({ retired: z.enum(['no', 'only', 'all']).default('no') });
export type ListLines = z.infer<typeof ListLines>;

/** The farm's stock at a glance. */
export const StockSummary = z.object({
  counts: StockCounts,
  grades: z.array(GradeCount),
  lines: z.int(),
  batches: z.int(),
  /** Pieces that become saleable in the next 14 days, as far as growth is known. */
  saleableSoon: z.int(),
});
export type StockSummary = z.infer<typeof StockSummary>;

export const lineEndpoints = {
  listLines: {
    method: 'get',
    path: '/api/lines',
    access: 'stock.read',
    summary: 'Lines with their counts by grade',
    query: ListLines,
    response: pageOf(LineWithStock),
  },
  createLine: {
    method: 'post',
    path: '/api/lines',
    access: 'stock.work',
    summary: 'Start a line',
    body: CreateLine,
    response: Line,
    creates: true,
  },
  showLine: {
    method: 'get',
    path: '/api/lines/:id',
    access: 'stock.read',
    summary: 'One line with its counts',
    params: idParams,
    response: LineWithStock,
  },
  editLine: {
    method: 'patch',
    path: '/api/lines/:id',
    access: 'stock.work',
    summary: 'Change a line',
    params: idParams,
    body: EditLine,
    response: Line,
    edits: true,
  },
  summary: {
    method: 'get',
    path: '/api/stock/summary',
    access: 'stock.read',
    summary: 'Living, saleable, promised and withheld pieces of the farm',
    response: StockSummary,
  },
} as const satisfies Record<string, Endpoint>;
