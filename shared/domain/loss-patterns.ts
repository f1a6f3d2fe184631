import { DomainError } from '../errors.ts';
import { gammaP } from './special-functions.ts';

/** Losses of a part of the stock beside those that were to be expected of it. */
export interface LossCount {
  lost: number;
  expected: number;
}

/** `p`: the chance of as many losses or more if nothing is amiss; `q`: that share of findings this strong would be false. */
export interface LossOdds {
  p: number;
  q: number;
}

/**
 * Chance of so many losses or more where a number is expected and plugs die each for itself (a Poisson count).
 *
 * @param lost whole number, zero or more
 * @param expected zero or more
 * @throws {DomainError} `domain.out_of_range`
 */
export function chanceOfAsMany({ lost, expected }: LossCount): number {
  if (!(Number.isInteger(lost) && lost >= 0 && expected >= 0)) {
    throw new DomainError('domain.out_of_range', 'Losses are zero or more.', { details: { lost, expected } });
  }
  return lost === 0 ? 1 : gammaP(lost, expected);
}

/**
 * The odds of each of many counts, with the many looks accounted for: of those with q at most 0.05, one in twenty is
 * expected to be nothing.
 *
 * @returns in the order given
 * @see Benjamini & Hochberg 1995, Journal of the Royal Statistical Society B 57:289–300
 */
export function lossOdds(counts: readonly LossCount[]): LossOdds[] {
  const chances = counts.map(chanceOfAsMany);
  const adjusted = falseDiscoveryRates(chances);
  return chances.map((p, index) => ({ p, q: adjusted[index] ?? 1 }));
}

/** Benjamini's and Hochberg's adjusted p values, in the order given. */
export function falseDiscoveryRates(chances: readonly number[]): number[] {
  const falling = chances.map((p, index) => ({ p, index })).sort((a, b) => b.p - a.p);
  const adjusted = new Array<number>(chances.length).fill(1);
  let least = 1;
  falling.forEach(({ p, index }, place) => {
    least = Math.min(least, (p * chances.length) / (chances.length - place));
    adjusted[index] = least;
  });
  return adjusted;
}
