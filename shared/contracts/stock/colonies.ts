import { z } from 'zod';
import { calendarDay, id, idParams, instant, labelCode, listQuery, pageOf, version } from '../common.ts';
import type { Endpoint } from '../endpoint.ts';
import { LineRef, RackRef, sizeMm } from './values.ts';

export const HEALTH = ['good', 'watch', 'poor'] as const;
const restDays = z.int('Enter whole days.').min(0).max(1000, 'At most 1,000 days.');
const acquiredFrom = z.string().trim().max(200, 'At most 200 characters.');

const fields = {
  code: labelCode,
  rackId: id,
  sizeMm,
  health: z.enum(HEALTH),
  restDays,
  lastCutOn: calendarDay.nullable(),
  acquiredOn: calendarDay,
  acquiredFrom,
};
export const CreateColony = z.strictObject({
  ...fields,
  lineId: id,
  health: z.enum(HEALTH).default('good'),
  /** Left out: the rest of the line's growth form. */
  restDays: restDays.optional(),
  lastCutOn: calendarDay.nullable().default(null),
  acquiredFrom: acquiredFrom.default(''),
});
export type CreateColony = z.infer<typeof CreateColony>;
export const EditColony = z.strictObject({ ...fields, retired: z.boolean() }).partial();
export type EditColony = z.infer<typeof EditColony>;

export const Colony = z.object({
  id: z.string(),
  code: z.string(),
  line: LineRef,
  rack: RackRef,
  sizeMm: z.number(),
  health: z.enum(HEALTH),
  restDays: z.int(),
  lastCutOn: calendarDay.nullable(),
  /** First day on which it has rested; null: never cut, so rested. */
  nextCutFrom: calendarDay.nullable(),
  rested: z.boolean(),
  acquiredOn: calendarDay,
  acquiredFrom: z.string(),
  cuts: z.int(),
  createdAt: instant,
  retiredAt: instant.nullable(),
  version,
});
export type Colony = z.infer<typeof Colony>;

/** A mother and what speaks for cutting it today. */
export const CuttingChoice = z.object({
  colony: Colony,
  /** Living pieces of its line not yet promised. */
  lineAlive: z.int(),
  lineSaleable: z.int(),
  lineHeld: z.int(),
  /** Pieces of the line that stores took in the last 28 days. */
  takenIn28Days: z.int(),
  /** Share of living pieces that is taken or promised in four weeks: higher is wanted more. Null: no stock and no demand. */
  want: z.number().nullable(),
});
export type CuttingChoice = z.infer<typeof CuttingChoice>;

export const ListColonies = listQuery.extend({
  lineId: id.optional(),
  rackId: id.optional(),
  retired: z.enum(['no', 'only', 'all']).default('no'),
});
export type ListColonies = z.infer<typeof ListColonies>;

export const colonyEndpoints = {
  listColonies: {
    method: 'get',
    path: '/api/colonies',
    access: 'stock.read',
    summary: 'Mother colonies',
    query: ListColonies,
    response: pageOf(Colony),
  },
  createColony: {
    method: 'post',
    path: '/api/colonies',
    access: 'stock.work',
    summary: 'Register a mother colony',
    body: CreateColony,
    response: Colony,
    creates: true,
  },
  showColony: {
    method: 'get',
    path: '/api/colonies/:id',
    access: 'stock.read',
    summary: 'One mother colony',
    params: idParams,
    response: Colony,
  },
  editColony: {
    method: 'patch',
    path: '/api/colonies/:id',
    access: 'stock.work',
    summary: 'Change a mother colony',
    params: idParams,
    body: EditColony,
    response: Colony,
    edits: true,
  },
  cuttingChoices: {
    method: 'get',
    path: '/api/cutting',
    access: 'stock.read',
    summary: 'Mother colonies, rested and wanted first',
    response: z.object({ items: z.array(CuttingChoice) }),
  },
} as const satisfies Record<string, Endpoint>;
