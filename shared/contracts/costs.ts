import { z } from 'zod';
import { ITEM_KINDS } from '../domain/supply-items.ts';
import { id, idParams, instant } from './common.ts';
import type { Endpoint } from './endpoint.ts';

/** Costs are whole micro-units of the farm's currency. */
const micro = z.int();
const month = z.string().regex(/^\d{4}-\d{2}$/);

/** What a batch has cost so far, and what of it one living piece carries. */
export const BatchCost = z.object({
  batchId: id,
  /** Plugs, glue and whatever else the cut took. */
  cutMicro: micro,
  limeMicro: micro,
  vinegarMicro: micro,
  otherMicro: micro,
  totalMicro: micro,
  living: z.int(),
  /** Pieces that left alive: sold, given away or cut again. They took their share with them. */
  leftAlive: z.int(),
  fragDays: z.int(),
  /** Null where no piece is left to carry anything. */
  perLivingMicro: micro.nullable(),
  limePerLivingMicro: micro.nullable(),
  /** When the shares of the systems were last worked out; null: not yet. */
  asOf: instant.nullable(),
});
export type BatchCost = z.infer<typeof BatchCost>;

/** What one living piece carries on average, and of what; null where no piece lives. */
const carried = {
  perLivingMicro: micro.nullable(),
  limePerLivingMicro: micro.nullable(),
  vinegarPerLivingMicro: micro.nullable(),
  cutPerLivingMicro: micro.nullable(),
  otherPerLivingMicro: micro.nullable(),
};

export const LineCost = z.object({
  lineId: id,
  code: z.string(),
  tradeName: z.string(),
  batches: z.int(),
  living: z.int(),
  totalMicro: micro,
  ...carried,
});
export type LineCost = z.infer<typeof LineCost>;

/** What supplies used in a system in a month cost. What no piece stood there to carry stays with the farm. */
export const SystemMonth = z.object({
  month,
  systemId: id,
  systemCode: z.string(),
  systemName: z.string(),
  limeMicro: micro,
  vinegarMicro: micro,
  otherMicro: micro,
  totalMicro: micro,
  unsharedMicro: micro,
  fragDays: z.int(),
});
export type SystemMonth = z.infer<typeof SystemMonth>;

export const CostOverview = z.object({
  asOf: instant.nullable(),
  living: z.int(),
  ...carried,
  /** What the systems used in all, by kind of supply, the dearest first. */
  used: z.array(z.object({ kind: z.enum(ITEM_KINDS), costMicro: micro })),
  lines: z.array(LineCost),
  months: z.array(SystemMonth),
});
export type CostOverview = z.infer<typeof CostOverview>;

export const COST_TABLES = ['lines', 'months'] as const;

export const costEndpoints = {
  overview: {
    method: 'get',
    path: '/api/costs',
    access: 'costs.read',
    summary: 'Cost of a living frag by line, and of each system by month',
    response: CostOverview,
  },
  batch: {
    method: 'get',
    path: '/api/costs/batches/:id',
    access: 'costs.read',
    summary: 'What a batch has cost so far',
    params: idParams,
    response: BatchCost,
  },
  export: {
    method: 'get',
    path: '/api/costs/export',
    access: 'costs.read',
    summary: 'Costs by line or by system and month as CSV',
    query: z.strictObject({ table: z.enum(COST_TABLES) }),
    answer: 'file',
  },
} as const satisfies Record<string, Endpoint>;
