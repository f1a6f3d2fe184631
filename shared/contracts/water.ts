import { z } from 'zod';
import { id, idParams, instant, nothing } from './common.ts';
import { Carried, Demand, demandParameter, LimeCeiling, SystemDemand } from './demand.ts';
import type { Endpoint } from './endpoint.ts';
import { Reservoir } from './reservoirs.ts';
import { parameterCode, System, TargetBand } from './systems.ts';

/** Where a value stands to its target band. */
export const bandState = z.enum(['below', 'in', 'above', 'none']);
export type BandState = z.infer<typeof bandState>;

export const LatestValue = z.object({
  parameter: parameterCode,
  value: z.number(),
  takenAt: instant,
  method: z.string(),
  band: TargetBand.nullable(),
  state: bandState,
});
export type LatestValue = z.infer<typeof LatestValue>;

export { Carried, Demand, LimeCeiling, SystemDemand };

/** A system at a glance. */
export const SystemGlance = z.object({
  system: System.omit({ tanks: true, bands: true }),
  latest: z.array(LatestValue),
  demand: Demand,
  carried: Carried,
  online: Reservoir.nullable(),
  standby: z.int(),
  plugs: z.int(),
});
export type SystemGlance = z.infer<typeof SystemGlance>;

export const WaterItem = z.object({
  id,
  code: z.string(),
  name: z.string(),
  kind: z.enum(['lime', 'vinegar', 'salt', 'supplement']),
  unit: z.string(),
  strength: z.number().nullable(),
  /** What one unit of a supplement brings beside alkalinity, mg. */
  calciumMg: z.number().nullable(),
  magnesiumMg: z.number().nullable(),
  onHand: z.number(),
});
export type WaterItem = z.infer<typeof WaterItem>;

export const waterEndpoints = {
  glance: {
    method: 'get',
    path: '/api/systems/:id/glance',
    access: 'water.read',
    summary: 'One system at a glance',
    params: idParams,
    response: SystemGlance,
  },
  demand: {
    method: 'get',
    path: '/api/systems/:id/demand',
    access: 'water.read',
    summary: 'What the corals of a system take, and how it was made',
    params: idParams,
    query: z.strictObject({
      days: z.coerce.number().int().min(7).max(365).default(90),
      parameter: demandParameter.default('alkalinity'),
    }),
    response: SystemDemand,
  },
  items: {
    method: 'get',
    path: '/api/water-items',
    access: 'water.read',
    summary: 'Supplies that water work takes from, the usual one of each kind first',
    query: nothing,
    response: z.object({ items: z.array(WaterItem) }),
  },
} as const satisfies Record<string, Endpoint>;
