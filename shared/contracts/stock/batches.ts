import { z } from 'zod';
import { calendarDay, id, idParams, instant, listQuery, pageOf } from '../common.ts';
import type { Endpoint } from '../endpoint.ts';
import { grade, LineRef, RackRef, SizeOutlook, StockCounts } from './values.ts';

export const Batch = z.object({
  id: z.string(),
  code: z.string(),
  line: LineRef,
  cutId: z.string(),
  colonyId: z.string(),
  colonyCode: z.string(),
  cutOn: calendarDay,
  ageDays: z.int(),
  /** Pieces that were cut. */
  pieces: z.int(),
  startMm: z.number(),
  size: SizeOutlook,
  counts: StockCounts,
  /** Saleable and not promised. */
  available: z.int(),
  undoneAt: instant.nullable(),
});
export type Batch = z.infer<typeof Batch>;

export const BATCH_STATES = ['alive', 'saleable', 'growing', 'withheld', 'finished', 'all'] as const;
export const ListBatches = listQuery.extend({
  lineId: id.optional(),
  systemId: id.optional(),
  colonyId: id.optional(),
  state: z.enum(BATCH_STATES).default('alive'),
});
export type ListBatches = z.infer<typeof ListBatches>;

export const MOVEMENT_KINDS = [
  'cut',
  'place',
  'move',
  'loss',
  'cull',
  'give',
  'recut',
  'pick',
  'ship',
  'count',
  'reversal',
] as const;

/** One act on a batch or plug: its movements together. `from` and `to` are words for people. */
export const StockAct = z.object({
  groupId: z.string(),
  kind: z.enum(MOVEMENT_KINDS),
  at: instant,
  by: z.string(),
  pieces: z.int(),
  from: z.string(),
  to: z.string(),
  seen: z.string(),
  note: z.string(),
  /** It was undone later. */
  undone: z.boolean(),
  /** The caller may undo it now, as far as the product knows. */
  canUndo: z.boolean(),
});
export type StockAct = z.infer<typeof StockAct>;

/** A step of the survivors' curve (Kaplan and Meier 1958): from `day` on, this share of pieces is alive, with its 95 % band. */
export const SurvivalStep = z.object({
  day: z.int(),
  atRisk: z.int(),
  lost: z.int(),
  survival: z.number(),
  low: z.number(),
  high: z.number(),
});

export const Measurement = z.object({
  id: z.string(),
  plugCode: z.string().nullable(),
  sizeMm: z.number(),
  at: instant,
  by: z.string(),
});
export type Measurement = z.infer<typeof Measurement>;

/** How many of the living pieces will be healed and of a grade by a day, with the range that holds with 80 %. */
const ReadyCount = z.object({ day: calendarDay, expected: z.number(), low: z.int(), high: z.int() });

/** When most of a batch will have reached the smallest grade that is sold, or the next one. */
export const SaleableForecast = ReadyCount.omit({ day: true }).extend({
  grade,
  /** The pieces cannot be sold yet; otherwise the next grade is looked for. */
  isFirstSale: z.boolean(),
  /** Living pieces. */
  of: z.int(),
  on: calendarDay,
  /** Week by week from today. */
  points: z.array(ReadyCount),
  basis: z.object({
    /** Growth as a multiple of what is usual for the line, pooled with its genus and the farm, and its standard deviation. */
    ratio: z.number(),
    ratioSd: z.number(),
    /** Measured batches of the line. */
    batches: z.int(),
    /** The curve that fits the line best; null: too few measurings. */
    curve: z.enum(['linear', 'exponential', 'logistic', 'von_bertalanffy']).nullable(),
    variation: z.number(),
    /** Pieces of the newest sample. */
    sampled: z.int(),
  }),
});
export type SaleableForecast = z.infer<typeof SaleableForecast>;

export const BatchPage = Batch.extend({
  forecast: SaleableForecast.nullable(),
  racks: z.array(RackRef.extend({ pieces: z.int() })),
  /** Pieces that left, by how. */
  left: z.array(
    z.object({ kind: z.enum(['sold', 'lost', 'culled', 'recut', 'given']), detail: z.string(), pieces: z.int() }),
  ),
  picked: z.int(),
  survival: z.array(SurvivalStep),
  measurements: z.array(Measurement),
  acts: z.array(StockAct),
  withholds: z.array(z.object({ id: z.string(), reason: z.string(), scope: z.string(), startedAt: instant })),
  cut: z.object({
    failedPieces: z.int(),
    minutes: z.int().nullable(),
    tool: z.string(),
    by: z.string(),
    note: z.string(),
  }),
});
export type BatchPage = z.infer<typeof BatchPage>;

/** A plug in the list of its batch. */
export const BatchPlug = z.object({
  code: z.string(),
  number: z.int(),
  /** 'rack', 'bench', 'order' or how it left. */
  state: z.string(),
  rackCode: z.string().nullable(),
  position: z.string().nullable(),
});

export const batchEndpoints = {
  listBatches: {
    method: 'get',
    path: '/api/batches',
    access: 'stock.read',
    summary: 'Batches with their counts and size',
    query: ListBatches,
    response: pageOf(Batch),
  },
  showBatch: {
    method: 'get',
    path: '/api/batches/:id',
    access: 'stock.read',
    summary: 'One batch: life, survivors, measurements, acts',
    params: idParams,
    response: BatchPage,
  },
  listBatchPlugs: {
    method: 'get',
    path: '/api/batches/:id/plugs',
    access: 'stock.read',
    summary: 'Every plug of a batch and where it is',
    params: idParams,
    response: z.object({ items: z.array(BatchPlug) }),
  },
} as const satisfies Record<string, Endpoint>;
