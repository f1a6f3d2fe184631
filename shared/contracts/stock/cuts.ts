import { z } from 'zod';
import { calendarDay, id, instant, listQuery, noteText, pageOf, pieces } from '../common.ts';
import type { Endpoint } from '../endpoint.ts';
import { position, sizeMm } from './values.ts';

/** Where the new plugs go: a rack, its free positions filled in order from the start; or the bench, to be placed later. */
export const CutTarget = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('rack'), rackId: id, startPosition: position.optional() }),
  z.strictObject({ kind: z.literal('bench') }),
]);

export const LogCut = z.strictObject({
  colonyId: id,
  cutOn: calendarDay,
  /** Pieces that were mounted on plugs. */
  pieces: pieces.max(500, 'At most 500 at once.'),
  /** Pieces cut but not fit to mount. */
  failedPieces: z.int('Enter a whole number.').min(0).max(5000).default(0),
  minutes: z.int('Enter whole minutes.').min(0).max(1440, 'At most a day.').nullable().default(null),
  tool: z.string().trim().max(60, 'At most 60 characters.').default(''),
  /** Left out: what is expected of the line. */
  startMm: sizeMm.optional(),
  target: CutTarget,
  plugItemId: id.nullable().default(null),
  glueItemId: id.nullable().default(null),
  /** Glue, in the item's unit (gram or mL) for each piece. */
  gluePerPiece: z.number().min(0).max(100, 'At most 100 for each piece.').default(0),
  /** Needed where the colony has not rested yet: why it is cut all the same. */
  restOverride: noteText.optional(),
  note: noteText.default(''),
});
export type LogCut = z.infer<typeof LogCut>;

export const Cut = z.object({
  id: z.string(),
  colonyId: z.string(),
  colonyCode: z.string(),
  lineCode: z.string(),
  cutOn: calendarDay,
  pieces: z.int(),
  failedPieces: z.int(),
  minutes: z.int().nullable(),
  tool: z.string(),
  by: z.string(),
  note: z.string(),
  batchId: z.string(),
  batchCode: z.string(),
  /** Living pieces of its batch now. */
  alive: z.int(),
  undoneAt: instant.nullable(),
});
export type Cut = z.infer<typeof Cut>;

export const LoggedCut = z.object({
  cutId: z.string(),
  batchId: z.string(),
  batchCode: z.string(),
  /** The act to undo; null where the plugs wait on the bench. */
  groupId: z.string().nullable(),
  plugs: z.array(z.object({ code: z.string(), number: z.int(), position: z.string().nullable() })),
});
export type LoggedCut = z.infer<typeof LoggedCut>;

export const cutEndpoints = {
  logCut: {
    method: 'post',
    path: '/api/cuts',
    access: 'stock.work',
    summary: 'Log a cut: makes a batch and its plugs and places them',
    body: LogCut,
    response: LoggedCut,
    creates: true,
  },
  listCuts: {
    method: 'get',
    path: '/api/cuts',
    access: 'stock.read',
    summary: 'Cuts, newest first',
    query: listQuery.omit({ search: true }).extend({ colonyId: id.optional(), lineId: id.optional() }),
    response: pageOf(Cut),
  },
  undoCut: {
    method: 'post',
    path: '/api/cuts/:id/undo',
    access: 'stock.work',
    summary: 'Undo a cut whose plugs have not moved on',
    params: z.strictObject({ id }),
    body: z.strictObject({ note: noteText.default('') }),
    response: z.object({ pieces: z.int() }),
    creates: true,
  },
} as const satisfies Record<string, Endpoint>;
