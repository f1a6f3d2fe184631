import { assertAboveZero } from './ranges.ts';
import { saturatedStrength } from './limewater-ceiling.ts';
import { USUAL_ACID_PERCENT } from './limewater.ts';
import type { ReservoirEventKind } from './reservoir-state.ts';

/**
 * Conductivity of part-saturated limewater beside that of the saturated one, at 25 °C: it falls slightly less than the
 * strength does, so half strength reads 54 %. From PHREEQC runs (phreeqc.dat): 0.95, 2.24, 4.21, 6.04, 7.09, 7.77 mS/cm
 * for 2, 5, 10, 15, 18, 20 mmol/L, and 7.99 for the 20.6 mmol/L that saturate it there. Models of the absolute value
 * differ by 13 %, their ratios hardly: so the farm's own fresh reading is the measure.
 */
const PARTS: readonly { conductivity: number; strength: number }[] = [
  [0, 0],
  [0.95, 2],
  [2.24, 5],
  [4.21, 10],
  [6.04, 15],
  [7.09, 18],
  [7.77, 20],
  [7.99, 20.6],
].map(([conductivity = 0, strength = 0]) => ({ conductivity: conductivity / 7.99, strength: strength / 20.6 }));

/**
 * Strength of clear limewater as a part of saturated, from two readings of one meter.
 *
 * @param conductivityMsCm of what is checked, at 25 °C, mS/cm, above zero
 * @param freshMsCm of fresh saturated limewater, by the same meter at 25 °C, mS/cm
 * @returns 0 to 1; a reading above the fresh one counts as saturated
 * @throws {DomainError} `domain.out_of_range`
 */
export function partOfSaturated(conductivityMsCm: number, freshMsCm: number): number {
  assertAboveZero('Conductivity (mS/cm)', conductivityMsCm);
  assertAboveZero('Fresh reading (mS/cm)', freshMsCm);
  const ratio = Math.min(1, conductivityMsCm / freshMsCm);
  const end = PARTS.findIndex(({ conductivity }) => conductivity >= ratio);
  const above = PARTS[end] ?? { conductivity: 1, strength: 1 };
  const below = PARTS[end - 1] ?? { conductivity: 0, strength: 0 };
  const along = (ratio - below.conductivity) / (above.conductivity - below.conductivity);
  return below.strength + along * (above.strength - below.strength);
}

/**
 * Strength by a check, meq/L. Only for limewater without vinegar: acetate carries current less well than hydroxide, so
 * there the reading says too little.
 */
export function strengthByConductivity(conductivityMsCm: number, freshMsCm: number): number {
  return partOfSaturated(conductivityMsCm, freshMsCm) * saturatedStrength();
}

/** Vinegar in what stands in a reservoir, mL/L of 5 %, from which a strength by conductivity says too little: 1 % off. */
export const VINEGAR_THAT_SPOILS = 0.5;

/** What an event did to the vinegar in a reservoir. */
export interface VinegarStep {
  kind: ReservoirEventKind;
  levelBeforeL: number;
  levelL: number;
  vinegarMl: number | null;
  acidPercent: number | null;
}

/**
 * Vinegar that is in what stands in a reservoir, mL of 5 % in a litre, as if none were oxidised.
 *
 * @param steps events in order of time
 */
export function vinegarMlPerL(steps: readonly VinegarStep[]): number {
  return steps.reduce((perL, { kind, levelBeforeL, levelL, vinegarMl, acidPercent }) => {
    if (kind === 'cleaned' || levelL === 0) return 0;
    if (kind !== 'refill' && kind !== 'topped_up') return perL;
    const added = ((vinegarMl ?? 0) * (acidPercent ?? USUAL_ACID_PERCENT)) / USUAL_ACID_PERCENT;
    return (perL * levelBeforeL + added) / levelL;
  }, 0);
}
