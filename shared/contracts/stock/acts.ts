import { z } from 'zod';
import { LOSS_CAUSES, LOSS_SEEN } from '../../domain/losses.ts';
import { done, id, instant, noteText, shortText } from '../common.ts';
import type { Endpoint } from '../endpoint.ts';
import { happenedAt, plugCodes, plugCodeText, position, sizeMm } from './values.ts';

const note = noteText.default('');

/**
 * Plugs to a rack: one to an exact `position`; or any number to free positions in order, from `startPosition` or the
 * first; or `loose`, on the rack without a position. Serves first placing from the bench and every move after it.
 */
export const PlacePlugs = z
  .strictObject({
    codes: plugCodes,
    rackId: id,
    position: position.optional(),
    startPosition: position.optional(),
    loose: z.boolean().default(false),
    at: happenedAt,
    note,
  })
  .refine(({ codes, position: exact }) => exact === undefined || codes.length === 1, {
    path: ['position'],
    message: 'One position holds one plug. Give a start position for more.',
  });
export type PlacePlugs = z.infer<typeof PlacePlugs>;

export const RecordLoss = z.strictObject({
  codes: plugCodes,
  seen: z.enum(
    LOSS_SEEN.map(({ code }) => code),
    'Choose what was seen.',
  ),
  cause: z
    .enum(
      LOSS_CAUSES.map(({ code }) => code),
      'Choose a likely cause.',
    )
    .default('unknown'),
  at: happenedAt,
  note,
});
export type RecordLoss = z.infer<typeof RecordLoss>;

/** Taken out as unfit, with the reason. */
export const CullPlugs = z.strictObject({ codes: plugCodes, reason: shortText, at: happenedAt });
/** Given away; `to` says to whom. */
export const GivePlugs = z.strictObject({ codes: plugCodes, to: shortText, at: happenedAt });

export const StockActDone = z.object({
  /** What `undoAct` takes. */
  groupId: z.string(),
  pieces: z.int(),
  plugs: z.array(z.object({ code: z.string(), position: z.string().nullable() })),
});
export type StockActDone = z.infer<typeof StockActDone>;

/** Sizes of one plug, or of a sample of a batch. */
export const Measure = z
  .strictObject({
    plugCode: plugCodeText.optional(),
    batchId: id.optional(),
    sizesMm: z.array(sizeMm).min(1, 'Enter a size.').max(200, 'At most 200 sizes at once.'),
    at: happenedAt,
  })
  .refine(({ plugCode, batchId }) => (plugCode === undefined) !== (batchId === undefined), {
    path: ['plugCode'],
    message: 'Measure one plug or one batch.',
  });
export type Measure = z.infer<typeof Measure>;

/** Keeps stock from sale: exactly one of plug, batch, rack and system. */
export const Withhold = z
  .strictObject({
    plugCode: plugCodeText.optional(),
    batchId: id.optional(),
    rackId: id.optional(),
    systemId: id.optional(),
    reason: shortText,
  })
  .refine(
    ({ plugCode, batchId, rackId, systemId }) =>
      [plugCode, batchId, rackId, systemId].filter((each) => each !== undefined).length === 1,
    { path: ['reason'], message: 'Choose one plug, batch, rack or system.' },
  );
export type Withhold = z.infer<typeof Withhold>;

export const Withheld = z.object({
  id: z.string(),
  scope: z.enum(['plug', 'batch', 'rack', 'system']),
  /** Code of the plug, batch, rack or system. */
  of: z.string(),
  reason: z.string(),
  startedAt: instant,
  startedBy: z.string(),
  endedAt: instant.nullable(),
  endedBy: z.string().nullable(),
});
export type Withheld = z.infer<typeof Withheld>;

export const actEndpoints = {
  placePlugs: {
    method: 'post',
    path: '/api/stock/place',
    access: 'stock.work',
    summary: 'Place or move plugs on a rack',
    body: PlacePlugs,
    response: StockActDone,
    creates: true,
  },
  recordLoss: {
    method: 'post',
    path: '/api/stock/losses',
    access: 'stock.work',
    summary: 'Record lost plugs',
    body: RecordLoss,
    response: StockActDone,
    creates: true,
  },
  cullPlugs: {
    method: 'post',
    path: '/api/stock/culls',
    access: 'stock.work',
    summary: 'Cull plugs as unfit',
    body: CullPlugs,
    response: StockActDone,
    creates: true,
  },
  givePlugs: {
    method: 'post',
    path: '/api/stock/gifts',
    access: 'stock.work',
    summary: 'Give plugs away',
    body: GivePlugs,
    response: StockActDone,
    creates: true,
  },
  undoAct: {
    method: 'post',
    path: '/api/stock/acts/:groupId/undo',
    access: 'stock.work',
    summary: 'Undo a whole act: within a day, or later by the owner',
    params: z.strictObject({ groupId: id }),
    body: z.strictObject({ note }),
    response: z.object({ pieces: z.int() }),
    creates: true,
  },
  measure: {
    method: 'post',
    path: '/api/stock/measurements',
    access: 'stock.work',
    summary: 'Log sizes of a plug or of a sample of a batch',
    body: Measure,
    response: z.object({ ids: z.array(z.string()), meanMm: z.number() }),
    creates: true,
  },
  undoMeasurement: {
    method: 'delete',
    path: '/api/stock/measurements/:id',
    access: 'stock.work',
    summary: 'Take back a measurement',
    params: z.strictObject({ id }),
    response: done,
  },
  withhold: {
    method: 'post',
    path: '/api/stock/withholds',
    access: 'stock.work',
    summary: 'Keep stock from sale',
    body: Withhold,
    response: Withheld,
    creates: true,
  },
  release: {
    method: 'post',
    path: '/api/stock/withholds/:id/release',
    access: 'stock.work',
    summary: 'Release withheld stock',
    params: z.strictObject({ id }),
    response: Withheld,
    creates: true,
  },
  listWithholds: {
    method: 'get',
    path: '/api/stock/withholds',
    access: 'stock.read',
    summary: 'What is kept from sale now, and why',
    response: z.object({ items: z.array(Withheld) }),
  },
} as const satisfies Record<string, Endpoint>;
