import { z } from 'zod';
import { id, idParams, instant, nothing } from './common.ts';
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

const perDay = z.number();
const demandBasis = { from: instant, to: instant, readings: z.int(), windowDays: z.int() };

/** What the corals of a system take, meq/L a day; or why that can't be told yet. */
export const Demand = z.discriminatedUnion('enough', [
  z.object({
    enough: z.literal(true),
    ...demandBasis,
    demand: perDay,
    low: perDay,
    high: perDay,
  }),
  z.object({
    enough: z.literal(false),
    ...demandBasis,
    reason: z.enum(['too_few_readings', 'too_short']),
  }),
]);
export type Demand = z.infer<typeof Demand>;

/** What a system is given as things stand now, meq/L a day. */
export const Carried = z.object({
  /** What is drawn a day at the strength that is online; 0 with nothing online, null where levels don't tell. */
  limewater: perDay.nullable(),
  /** Doses of other supplements, mean of the days that demand is told from. */
  others: perDay,
  /** What water changes brought over the same days; below zero where the new water was weaker. */
  waterChanges: perDay,
});
export type Carried = z.infer<typeof Carried>;

/** The most that limewater can bring at today's evaporation, meq/L a day. */
export const LimeCeiling = z.object({
  evaporationLPerDay: z.number(),
  saturated: perDay,
  withVinegar: perDay,
  vinegarMlPerL: z.number(),
});
export type LimeCeiling = z.infer<typeof LimeCeiling>;

export const SystemDemand = z.object({
  systemId: id,
  netVolumeL: z.number(),
  demand: Demand,
  carried: Carried,
  /** Null where no use of limewater was logged lately. */
  ceiling: LimeCeiling.nullable(),
  history: z.array(z.object({ at: instant, demand: perDay, low: perDay, high: perDay })),
  waterChanges: z.array(z.object({ at: instant, litres: z.number() })),
  /** How it was made. */
  inputs: z.object({
    limewaterL: z.number(),
    limewaterMeq: z.number(),
    /** Part of the litres that is taken from the usual use, after the last level reading. */
    assumedL: z.number(),
    doses: z.int(),
    waterChanges: z.int(),
    /** The methods of the tests, each with half of the 95 % interval of one test, meq/L. */
    tests: z.array(z.object({ method: z.string(), count: z.int(), error: z.number() })),
    /** Readings before it are left out: what was dosed then is not known. */
    knownSince: instant.nullable(),
  }),
});
export type SystemDemand = z.infer<typeof SystemDemand>;

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
    summary: 'Alkalinity demand of a system, and how it was made',
    params: idParams,
    query: z.strictObject({ days: z.coerce.number().int().min(7).max(365).default(90) }),
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
