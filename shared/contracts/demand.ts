import { z } from 'zod';
import { id, instant } from './common.ts';

const perDay = z.number();

/** What the tests of these four weeks are, and when: the tests that a demand stands on. */
const basis = { from: instant, to: instant, readings: z.int(), windowDays: z.int() };

/** What the corals of a system take now, with its 95 % interval; or why that can't be told yet. */
export const Demand = z.discriminatedUnion('enough', [
  z.object({ enough: z.literal(true), ...basis, demand: perDay, low: perDay, high: perDay }),
  z.object({ enough: z.literal(false), ...basis, reason: z.enum(['too_few_readings', 'too_short']) }),
]);
export type Demand = z.infer<typeof Demand>;

/** What a system is given as things stand now. */
export const Carried = z.object({
  /** What is drawn a day at the strength that is online; 0 with nothing online, null where levels don't tell. */
  limewater: perDay.nullable(),
  /** Other supplements, mean of the last two weeks. */
  others: perDay,
  /** What water changes brought over the same days; below zero where the new water was weaker. */
  waterChanges: perDay,
});
export type Carried = z.infer<typeof Carried>;

/** The most that limewater can bring at today's evaporation. */
export const LimeCeiling = z.object({
  evaporationLPerDay: z.number(),
  saturated: perDay,
  withVinegar: perDay,
  vinegarMlPerL: z.number(),
});
export type LimeCeiling = z.infer<typeof LimeCeiling>;

/** What a balance is kept of: alkalinity in meq/L, calcium and magnesium in mg/L. */
export const DEMAND_PARAMETERS = ['alkalinity', 'calcium', 'magnesium'] as const;
export const demandParameter = z.enum(DEMAND_PARAMETERS);
export type DemandParameter = z.infer<typeof demandParameter>;

const ranged = z.object({ at: instant, demand: perDay, low: perDay, high: perDay });

/** How demand stands to what it was two weeks ago, beside what stock and growth explain. */
export const DemandChange = z.object({
  direction: z.enum(['up', 'down', 'none']),
  before: perDay,
  now: perDay,
  expected: perDay,
  half: perDay,
  since: instant,
});

/** What the chemistry says beside the demand, each with its numbers; alkalinity in meq/L, calcium and nitrate in mg/L. */
export const DemandCheck = z.discriminatedUnion('code', [
  z.object({ code: z.literal('calcium_agrees'), ratio: z.number(), half: z.number() }),
  z.object({ code: z.literal('calcium_exceeds'), ratio: z.number(), half: z.number() }),
  z.object({
    code: z.literal('alkalinity_alone'),
    ratio: z.number(),
    half: z.number(),
    /** Alkalinity that goes a day without calcium. */
    withoutCalcium: perDay,
    /** Rise of nitrate a day, and the alkalinity that making it takes; null where nitrate does not tell. */
    nitrate: z.object({ risePerDay: z.number(), half: z.number(), takes: perDay }).nullable(),
  }),
  z.object({
    code: z.literal('may_precipitate'),
    before: perDay,
    now: perDay,
    half: perDay,
    ph: z.number().nullable(),
    saturation: z.number().nullable(),
  }),
  z.object({
    code: z.literal('salinity_moved'),
    from: z.number(),
    to: z.number(),
    half: z.number(),
    /** Change of the level by salinity alone. */
    moves: z.number(),
  }),
  z.object({ code: z.literal('changed'), ...DemandChange.shape }),
  z.object({ code: z.literal('stepped'), at: instant, by: z.number() }),
]);
export type DemandCheck = z.infer<typeof DemandCheck>;

export const SystemDemand = z.object({
  systemId: id,
  parameter: demandParameter,
  netVolumeL: z.number(),
  demand: Demand,
  carried: Carried,
  /** Null where no use of limewater was logged lately. */
  ceiling: LimeCeiling.nullable(),
  /** Day by day up to now, each from all tests before and after it. */
  history: z.array(ranged),
  levels: z.array(z.object({ at: instant, level: z.number(), low: z.number(), high: z.number() })),
  /** If nothing new happens: the next four weeks. Empty where demand is not known. */
  forecast: z.array(ranged),
  /** Tests too far from what was expected: they are kept and all but left out. */
  flagged: z.array(z.object({ readingId: id, at: instant, value: z.number(), expected: z.number() })),
  checks: z.array(DemandCheck),
  waterChanges: z.array(z.object({ at: instant, litres: z.number() })),
  /** How it was made. */
  inputs: z.object({
    limewaterL: z.number(),
    limewaterMeq: z.number(),
    /** Part of the litres that is taken from the usual use, after the last level reading. */
    assumedL: z.number(),
    doses: z.int(),
    waterChanges: z.int(),
    /** The methods of the tests, each with half of the 95 % interval of one test. */
    tests: z.array(z.object({ method: z.string(), count: z.int(), error: z.number() })),
    /** Readings before it are left out: what was dosed then is not known. */
    knownSince: instant.nullable(),
    /** Salinity that levels are brought to, where it was tested. */
    salinity: z.number().nullable(),
    /** Standard deviations that the data chose: of demand from day to day, of supply, and of tests beside the stated. */
    noise: z.object({ drift: z.number(), supplyError: z.number(), testScale: z.number() }),
  }),
});
export type SystemDemand = z.infer<typeof SystemDemand>;
