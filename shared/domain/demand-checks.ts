import { ATOMIC_G_PER_MOL } from './atomic-weights.ts';
import { CALCIUM_MG_PER_MEQ } from './dose-effect.ts';
import type { DemandChange } from './demand/demand-change.ts';
import type { Estimate } from './demand/track-demand.ts';

/** What is known of a system beside its alkalinity demand; null where tests don't tell. Rates are a day. */
export interface CheckFacts {
  /** meq/L. */
  alkalinity: Estimate | null;
  /** mg/L. */
  calcium: Estimate | null;
  /** Rise of nitrate, mg/L of NO₃. */
  nitrateRise: Estimate | null;
  change: DemandChange | null;
  /** Mean of the last two weeks, NBS scale. */
  ph: number | null;
  saturation: number | null;
  salinity: SalinityMove | null;
  /** Steps that nobody logged, lately: when, and by how much the level moved. */
  steps: readonly { at: number; by: number }[];
}

/** Salinity two weeks ago and now, with the level that it scales. */
export interface SalinityMove {
  before: Estimate;
  now: Estimate;
  level: number;
}

export type DemandCheckFound =
  | { code: 'calcium_agrees' | 'calcium_exceeds'; ratio: number; half: number }
  | {
      code: 'alkalinity_alone';
      ratio: number;
      half: number;
      withoutCalcium: number;
      nitrate: { risePerDay: number; half: number; takes: number } | null;
    }
  | {
      code: 'may_precipitate';
      before: number;
      now: number;
      half: number;
      ph: number | null;
      saturation: number | null;
    }
  | { code: 'salinity_moved'; from: number; to: number; half: number; moves: number }
  | ({ code: 'changed' } & DemandChange)
  | { code: 'stepped'; at: number; by: number };

const Z_975 = 1.96;
/** A ratio is called wrong beyond 99 % only: it is looked at day after day, and chance alone gets its turn. */
const WRONG_BEYOND = 2.576 / Z_975;
/** A ratio less sure than this part of 20.04 says nothing. */
const SURE_ENOUGH = 0.5;
const NITRATE_G_PER_MOL = ATOMIC_G_PER_MOL.N + 3 * ATOMIC_G_PER_MOL.O;
/** From here on chalk may form by itself: pH (common practice, no source) and saturation, well below the 7 of runaway. */
const HIGH_PH = 8.45;
const HIGH_SATURATION = 6;
/** A smaller drift of salinity explains nothing that is seen. */
const SALINITY_MATTERS = 0.005;

/** What the chemistry says beside the demand. Only what the evidence supports is said; nothing known gives nothing. */
export function demandChecks(facts: CheckFacts): DemandCheckFound[] {
  return [
    ...facts.steps.map(({ at, by }) => ({ code: 'stepped' as const, at, by })),
    ...changeFound(facts),
    ...ratioFound(facts),
    ...salinityFound(facts.salinity),
  ];
}

/**
 * Skeleton takes 20.04 mg of calcium with each meq of alkalinity. Less calcium means that something else takes alkalinity:
 * nitrification, one meq for each mmol of nitrate that builds up (net), or the error of a test.
 *
 * @see Smith & Key 1975, Limnology and Oceanography 20, 493–495; Chisholm & Gattuso 1991, ibid. 36, 1232–1239
 */
function ratioFound({ alkalinity, calcium, nitrateRise }: CheckFacts): DemandCheckFound[] {
  if (!alkalinity || !calcium || alkalinity.value <= Z_975 * alkalinity.sd) return [];
  const ratio = calcium.value / alkalinity.value;
  const half = (Z_975 * Math.hypot(calcium.sd, ratio * alkalinity.sd)) / alkalinity.value;
  if (half > SURE_ENOUGH * CALCIUM_MG_PER_MEQ) return [];
  const off = Math.abs(ratio - CALCIUM_MG_PER_MEQ);
  if (off <= half) return [{ code: 'calcium_agrees', ratio, half }];
  if (off <= WRONG_BEYOND * half) return [];
  if (ratio > CALCIUM_MG_PER_MEQ) return [{ code: 'calcium_exceeds', ratio, half }];
  const withoutCalcium = alkalinity.value - calcium.value / CALCIUM_MG_PER_MEQ;
  return [{ code: 'alkalinity_alone', ratio, half, withoutCalcium, nitrate: nitrateFound(nitrateRise) }];
}

function nitrateFound(rise: Estimate | null): { risePerDay: number; half: number; takes: number } | null {
  if (!rise || rise.value <= Z_975 * rise.sd) return null;
  return { risePerDay: rise.value, half: Z_975 * rise.sd, takes: rise.value / NITRATE_G_PER_MOL };
}

function changeFound({ change, ph, saturation }: CheckFacts): DemandCheckFound[] {
  if (!change || change.direction === 'none') return [];
  const { before, now, half } = change;
  const [highPh, highSaturation] = [
    ph !== null && ph >= HIGH_PH ? ph : null,
    saturation !== null && saturation >= HIGH_SATURATION ? saturation : null,
  ];
  if (change.direction === 'up' && (highPh !== null || highSaturation !== null)) {
    return [{ code: 'may_precipitate', before, now, half, ph: highPh, saturation: highSaturation }];
  }
  return [{ code: 'changed', ...change }];
}

function salinityFound(move: SalinityMove | null): DemandCheckFound[] {
  if (!move) return [];
  const { before, now, level } = move;
  const half = Z_975 * Math.hypot(before.sd, now.sd);
  const part = now.value / before.value - 1;
  if (Math.abs(now.value - before.value) <= half || Math.abs(part) < SALINITY_MATTERS) return [];
  return [{ code: 'salinity_moved', from: before.value, to: now.value, half, moves: level * part }];
}
