import { z } from 'zod';
import type { Endpoint } from '../endpoint.ts';
import { SurvivalStep } from './batches.ts';

export const SURVIVAL_BY = ['line', 'cause', 'cutter', 'system', 'season'] as const;
export type SurvivalBy = (typeof SURVIVAL_BY)[number];

/** Survivors' curves of parts of the stock, the one with the largest share of losses first. */
export const SurvivalGroups = z.object({
  groups: z.array(
    z.object({
      label: z.string(),
      plugs: z.int(),
      lost: z.int(),
      /** 95 % interval of the share that was lost (Wilson 1927). */
      lostShare: z.object({ low: z.number(), high: z.number() }),
      steps: z.array(SurvivalStep),
    }),
  ),
  /** Whether the groups differ by more than chance (log-rank test); null: they cannot be compared. */
  logRank: z.object({ chiSquare: z.number(), degreesOfFreedom: z.int(), p: z.number() }).nullable(),
});
export type SurvivalGroups = z.infer<typeof SurvivalGroups>;

/** Parts of the stock that lost more than their lines and ages let expect. */
export const LossPatterns = z.object({
  /** The losses of the last so many days were looked at. */
  days: z.int(),
  /** How many parts were looked at. */
  compared: z.int(),
  patterns: z.array(
    z.object({
      kind: z.enum(['system', 'line', 'cutter']),
      label: z.string(),
      plugs: z.int(),
      lost: z.int(),
      expected: z.number(),
      /** Chance of as many losses or more if nothing is amiss. */
      p: z.number(),
      /** Share of findings this strong that would be false, with all parts looked at accounted for. */
      q: z.number(),
    }),
  ),
});
export type LossPatterns = z.infer<typeof LossPatterns>;

export const lossEndpoints = {
  survival: {
    method: 'get',
    path: '/api/stock/survival',
    access: 'stock.read',
    summary: 'Survivors’ curves by line, cause, cutter, system or season',
    query: z.strictObject({ by: z.enum(SURVIVAL_BY).default('line') }),
    response: SurvivalGroups,
  },
  lossPatterns: {
    method: 'get',
    path: '/api/stock/loss-patterns',
    access: 'stock.read',
    summary: 'Unusual runs of losses with their odds',
    response: LossPatterns,
  },
} as const satisfies Record<string, Endpoint>;
