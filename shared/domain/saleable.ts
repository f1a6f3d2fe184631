import { DomainError } from '../errors.ts';
import { logGamma, normalCdf, normalQuantile } from './special-functions.ts';

/** What is known of the pieces of a batch on a coming day. */
export interface PiecesThen {
  /** Living pieces today. */
  alive: number;
  /** Their likely mean size on that day, mm, and how far off that may be. */
  meanMm: number;
  meanSdMm: number;
  /** How pieces of one batch differ: standard deviation by the mean. */
  variation: number;
  /** Share of today's pieces that will still live. */
  survival: number;
  isHealed: boolean;
}

/** How many pieces will be saleable: the expected count, and the range that holds with 80 %. */
export interface SaleableCount {
  expected: number;
  low: number;
  high: number;
}

/** Equally likely standard scores of the batch's mean: enough that counts do not change with more. */
const SCORES = Array.from({ length: 25 }, (_, index) => normalQuantile((index + 0.5) / 25));
const TAIL = 0.1;

/**
 * Share of pieces whose size reaches a grade, where sizes of a batch are log-normal.
 *
 * @param meanMm above zero
 * @param variation standard deviation by the mean, above zero
 * @param minMm where the grade begins, mm
 * @throws {DomainError} `domain.out_of_range`
 */
export function shareReaching(meanMm: number, variation: number, minMm: number): number {
  if (!(meanMm > 0 && variation > 0)) {
    throw new DomainError('domain.out_of_range', 'Sizes and their differences are above zero.', {
      details: { meanMm, variation },
    });
  }
  if (minMm <= 0) return 1;
  const logVariance = Math.log1p(variation ** 2);
  return normalCdf((Math.log(meanMm / minMm) - logVariance / 2) / Math.sqrt(logVariance));
}

/**
 * How many of a batch will be healed, alive and large enough: the chances of single pieces (a binomial count) mixed over
 * how far the batch's mean size may be off.
 *
 * @throws {DomainError} `domain.out_of_range`
 */
export function saleableCount(then: PiecesThen, minMm: number): SaleableCount {
  if (!then.isHealed || then.alive === 0) return { expected: 0, low: 0, high: 0 };
  const chances = SCORES.map((score) => {
    const meanMm = Math.max(0.1, then.meanMm + score * then.meanSdMm);
    return then.survival * shareReaching(meanMm, then.variation, minMm);
  });
  const mixed = Array.from({ length: then.alive + 1 }, (_, count) => {
    const logWays = logGamma(then.alive + 1) - logGamma(count + 1) - logGamma(then.alive - count + 1);
    return average(chances.map((p) => chanceOf(count, then.alive, p, logWays)));
  });
  return {
    expected: then.alive * average(chances),
    low: quantile(mixed, TAIL),
    high: quantile(mixed, 1 - TAIL),
  };
}

/** @param logWays logarithm of the number of ways to choose so many of all */
function chanceOf(count: number, of: number, p: number, logWays: number): number {
  if (p <= 0 || p >= 1) return count === (p <= 0 ? 0 : of) ? 1 : 0;
  return Math.exp(logWays + count * Math.log(p) + (of - count) * Math.log1p(-p));
}

function quantile(chances: readonly number[], p: number): number {
  let below = 0;
  const found = chances.findIndex((chance) => (below += chance) >= p);
  return found < 0 ? chances.length - 1 : found;
}

function average(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
