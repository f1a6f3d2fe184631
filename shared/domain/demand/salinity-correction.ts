import { MS_PER_DAY } from '../days.ts';
import { NOTHING, type Belief } from '../state-space/belief.ts';
import { observe, predict } from '../state-space/kalman.ts';
import type { Estimate } from './track-demand.ts';

/** One salinity test, PSS-78. */
export interface SalinityTest {
  at: number;
  value: number;
  sd: number;
}

/** Salinity of a system wanders by so much in a day where top-off is controlled (standard deviation; no source). */
const DRIFT_PER_DAY = 0.08;

/**
 * Salinity through time from its tests, each instant from the tests up to it: a level that wanders, filtered.
 *
 * @returns what is known at an instant; null before the first test
 */
export function salinityThrough(tests: readonly SalinityTest[]): (at: number) => Estimate | null {
  const known = filteredTests(tests);
  return (at) => {
    const last = known.findLast((each) => each.at <= at);
    if (!last) return null;
    const wandered = (DRIFT_PER_DAY ** 2 * (at - last.at)) / MS_PER_DAY;
    return { value: last.belief.level, sd: Math.sqrt(last.belief.cov.ll + wandered) };
  };
}

function filteredTests(tests: readonly SalinityTest[]): { at: number; belief: Belief }[] {
  let belief: Belief = { level: 0, rate: 0, cov: NOTHING, diffuse: { ...NOTHING, ll: 1 } };
  let before = tests[0]?.at ?? 0;
  return [...tests]
    .sort((a, b) => a.at - b.at)
    .map(({ at, value, sd }) => {
      const noise = { ...NOTHING, ll: (DRIFT_PER_DAY ** 2 * (at - before)) / MS_PER_DAY };
      before = at;
      belief = observe(predict(belief, { keep: 1, reach: 0, input: 0, noise }), value, sd ** 2).belief;
      return { at, belief };
    });
}

/**
 * By what a level is to be multiplied to be as it were at another salinity: evaporation and fresh water change all that is
 * dissolved in the same proportion, and neither is a demand.
 *
 * @param then salinity when the level was tested
 * @param now salinity to bring it to
 * @returns the factor with the standard deviation of the earlier salinity's part in it
 */
export function salinityFactor(then: Estimate, now: Estimate): Estimate {
  const value = now.value / then.value;
  return { value, sd: (value * then.sd) / then.value };
}
