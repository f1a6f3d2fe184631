import { DomainError } from '../errors.ts';

/** Mean of the range of two normal values in standard deviations, and the factor of its upper limit, as handbooks print them. */
const D2 = 1.128;
const D4 = 3.267;
const LIMIT_SIGMAS = 3;

/** Where single values are expected to stay while nothing special happens, in their own unit. */
export interface IndividualsChart {
  mean: number;
  /** Spread from one value to the next, so that a slow drift does not widen the limits. */
  sigma: number;
  low: number;
  high: number;
  /** Distances between neighbours, one fewer than the values. */
  movingRanges: number[];
  meanMovingRange: number;
  movingRangeHigh: number;
}

/**
 * Chart of single values with limits at three sigma, sigma from the mean moving range.
 *
 * @param values in order of time, two or more
 * @throws {DomainError} `domain.out_of_range`
 * @see NIST/SEMATECH e-Handbook of Statistical Methods, 6.3.2.2
 */
export function individualsChart(values: readonly number[]): IndividualsChart {
  assertMany(values);
  const mean = meanOf(values);
  const movingRanges = values.slice(1).map((value, index) => Math.abs(value - (values[index] ?? value)));
  const meanMovingRange = meanOf(movingRanges);
  const sigma = meanMovingRange / D2;
  return {
    ...{ mean, sigma, movingRanges, meanMovingRange, movingRangeHigh: D4 * meanMovingRange },
    low: mean - LIMIT_SIGMAS * sigma,
    high: mean + LIMIT_SIGMAS * sigma,
  };
}

/** A value of the moving average with its limits, which widen from the start on. */
export interface EwmaPoint {
  value: number;
  low: number;
  high: number;
  isOut: boolean;
}

/**
 * Exponentially weighted moving average: finds small lasting shifts sooner than single values do.
 *
 * @param values in order of time
 * @param target what is wanted or usual, where the average starts
 * @param sigma standard deviation of one value, above zero
 * @param weight of the newest value (λ), above 0 up to 1; 0.2 to 0.3 is usual
 * @throws {DomainError} `domain.out_of_range`
 * @see NIST/SEMATECH e-Handbook of Statistical Methods, 6.3.2.4
 */
export function ewmaChart(
  values: readonly number[],
  { target, sigma, weight = 0.3 }: { target: number; sigma: number; weight?: number },
): EwmaPoint[] {
  if (!(weight > 0 && weight <= 1) || !(sigma > 0)) {
    throw new DomainError('domain.out_of_range', 'The weight must be above 0 and at most 1, sigma above 0.', {
      details: { weight, sigma },
    });
  }
  let average = target;
  return values.map((value, index) => {
    average = weight * value + (1 - weight) * average;
    const spread = (weight / (2 - weight)) * (1 - (1 - weight) ** (2 * (index + 1)));
    const reach = LIMIT_SIGMAS * sigma * Math.sqrt(spread);
    const [low, high] = [target - reach, target + reach];
    return { value: average, low, high, isOut: average < low || average > high };
  });
}

/** The four zone rules; the number says which. */
export type RunRule = 'beyond 3 sigma' | '2 of 3 beyond 2 sigma' | '4 of 5 beyond 1 sigma' | '8 on one side';

const ZONE_RULES: readonly { rule: RunRule; beyond: number; needed: number; of: number }[] = [
  { rule: 'beyond 3 sigma', beyond: 3, needed: 1, of: 1 },
  { rule: '2 of 3 beyond 2 sigma', beyond: 2, needed: 2, of: 3 },
  { rule: '4 of 5 beyond 1 sigma', beyond: 1, needed: 4, of: 5 },
  { rule: '8 on one side', beyond: 0, needed: 8, of: 8 },
];

export interface RunSignal {
  /** Of the value that completes the pattern. */
  index: number;
  rule: RunRule;
}

/**
 * Patterns that chance alone seldom makes. The newest value must be one of those beyond the zone; a value on the line of a
 * zone is not beyond it; the two sides count apart.
 *
 * @param values in order of time
 * @see Western Electric 1956, Statistical Quality Control Handbook (zone rules, wording from memory)
 */
export function runSignals(
  values: readonly number[],
  { mean, sigma }: Pick<IndividualsChart, 'mean' | 'sigma'>,
): RunSignal[] {
  const scores = values.map((value) => (value - mean) / sigma);
  return scores.flatMap((score, index) =>
    ZONE_RULES.filter(({ beyond, needed, of }) => {
      const side = Math.sign(score);
      const isBeyond = (each: number) => each * side > beyond;
      const latest = scores.slice(Math.max(0, index - of + 1), index + 1);
      return side !== 0 && isBeyond(score) && latest.filter(isBeyond).length >= needed;
    }).map(({ rule }) => ({ index, rule })),
  );
}

function meanOf(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function assertMany(values: readonly number[]): void {
  if (values.length >= 2 && values.every(Number.isFinite)) return;
  throw new DomainError('domain.out_of_range', 'A control chart needs two values or more.', {
    details: { values: values.length },
  });
}
