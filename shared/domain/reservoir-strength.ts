import { saturatedStrength } from './limewater-ceiling.ts';
import { strengthLeft } from './limewater-strength.ts';
import { USUAL_ACID_PERCENT } from './limewater.ts';
import type { ReservoirEventKind } from './reservoir-state.ts';

/**
 * Strength by a check beside the farm's own reading of fresh saturated limewater, meq/L at 25 °C. Only for limewater without vinegar: acetate carries current less well than hydroxide, so
 * there the reading says too little.
 *
 * @throws {DomainError} `domain.out_of_range`, also for a reading over 110 % of the fresh one
 */
export function strengthByConductivity(conductivityMsCm: number, freshMsCm: number): number {
  return strengthLeft(conductivityMsCm, freshMsCm) * saturatedStrength();
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
