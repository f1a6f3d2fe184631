import { DomainError } from '../../errors.ts';
import { CALCIUM_MG_PER_MEQ, doseEffect, type WaterState } from '../dose-effect.ts';
import type { WaterRules } from './rules.ts';

/** Nobody doses more than this in an hour, meq/L; where the search ends. */
const MOST_MEQ_L = 2;
const HALVINGS = 30;

export interface HourlyRoom {
  /** Alkalinity that may go in within an hour, closed to the air, meq/L. */
  meqL: number;
  /** What stands in the way of more; null where nothing does up to 2 meq/L. */
  stoppedBy: 'ph' | 'omega' | null;
}

/**
 * How much alkalinity may be dosed within an hour before a limit is passed, taken as limewater: the strictest way, since it
 * brings no carbon with it and so lifts pH and saturation most.
 *
 * @returns null where the water's values can't all be true, so that nothing is known
 */
export function hourlyRoom(
  water: WaterState,
  { phLimit, phRise, omegaLimit }: Pick<WaterRules, 'phLimit' | 'phRise' | 'omegaLimit'>,
): HourlyRoom | null {
  const highestPh = Math.min(phLimit, water.phNbs + phRise);
  const stopAt = (meqL: number): HourlyRoom['stoppedBy'] => {
    const { atOnce } = doseEffect(water, { alkalinityMeqL: meqL, calciumMgL: meqL * CALCIUM_MG_PER_MEQ });
    if (atOnce.phNbs > highestPh) return 'ph';
    return atOnce.omegaAragonite > omegaLimit ? 'omega' : null;
  };
  try {
    const already = water.phNbs > phLimit ? 'ph' : stopAt(0);
    if (already) return { meqL: 0, stoppedBy: already };
    let [fine, tooMuch] = [0, MOST_MEQ_L];
    if (stopAt(tooMuch) === null) return { meqL: tooMuch, stoppedBy: null };
    for (let halving = 0; halving < HALVINGS; halving += 1) {
      const middle = (fine + tooMuch) / 2;
      if (stopAt(middle) === null) fine = middle;
      else tooMuch = middle;
    }
    return { meqL: fine, stoppedBy: stopAt(tooMuch) };
  } catch (error) {
    if (error instanceof DomainError) return null;
    throw error;
  }
}
