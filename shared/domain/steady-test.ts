import { MS_PER_DAY } from './days.ts';
import { assertAboveZero } from './ranges.ts';
import { tQuantile95 } from './student-t.ts';

/** One test of a level. */
export interface LevelTest {
  /** Epoch ms. */
  at: number;
  value: number;
  /** Standard deviation of the test, above zero, in the value's unit. */
  sd: number;
}

export type Steadiness =
  | { enough: false; reason: 'too_few_tests' | 'too_short'; tests: number; days: number }
  | {
      enough: true;
      steady: boolean;
      tests: number;
      /** Days between the first and the last test used. */
      days: number;
      slopePerDay: number;
      /** 95 % interval of the slope. */
      low: number;
      high: number;
      /** What the trend makes over the days of the tests. */
      change: number;
    };

export interface SteadyLimits {
  windowDays: number;
  /** The most that the trend may make over the window, in the value's unit. */
  tolerance: number;
}

/** Weekly tests give four in three weeks; three cannot tell a line from its scatter. */
const FEWEST_TESTS = 4;
/** Part of the window that the tests must span. */
const SHORTEST_SPAN = 2 / 3;

/**
 * Whether a level has stood still over a window of tests: its trend's 95 % interval includes zero, and what the trend
 * makes over the window is within the tolerance. Both are needed: few loose tests never prove a trend, and many close
 * ones find a trend that nobody need care about.
 *
 * The trend is a straight line by weighted least squares; its error is that of the tests, or larger where they scatter
 * more than they should.
 *
 * @param until end of the window, epoch ms
 * @throws {DomainError} `domain.out_of_range`
 */
export function steadiness(
  tests: readonly LevelTest[],
  until: number,
  { windowDays, tolerance }: SteadyLimits,
): Steadiness {
  assertAboveZero('Window (days)', windowDays);
  assertAboveZero('Tolerance', tolerance);
  const used = tests.filter(({ at, sd }) => at >= until - windowDays * MS_PER_DAY && at <= until && sd > 0);
  const times = used.map(({ at }) => (at - until) / MS_PER_DAY);
  const days = used.length > 0 ? Math.max(...times) - Math.min(...times) : 0;
  if (used.length < FEWEST_TESTS) return { enough: false, reason: 'too_few_tests', tests: used.length, days };
  if (days < windowDays * SHORTEST_SPAN) return { enough: false, reason: 'too_short', tests: used.length, days };

  const { slopePerDay, standardError } = trendOf(used, times);
  const reach = tQuantile95(used.length - 2) * standardError;
  const [low, high, change] = [slopePerDay - reach, slopePerDay + reach, slopePerDay * days];
  const steady = low <= 0 && high >= 0 && Math.abs(change) <= tolerance;
  return { enough: true, steady, tests: used.length, days, slopePerDay, low, high, change };
}

function trendOf(tests: readonly LevelTest[], times: readonly number[]) {
  const weights = tests.map(({ sd }) => 1 / sd ** 2);
  const total = sum(weights);
  const mean = (values: readonly number[]) => sum(values.map((value, i) => value * (weights[i] ?? 0))) / total;
  const values = tests.map(({ value }) => value);
  const [meanTime, meanValue] = [mean(times), mean(values)];
  const spread = mean(times.map((time) => (time - meanTime) ** 2)) * total;
  const shared = mean(times.map((time, i) => (time - meanTime) * ((values[i] ?? 0) - meanValue))) * total;
  const slopePerDay = shared / spread;
  const misfits = times.map((time, i) => (values[i] ?? 0) - meanValue - slopePerDay * (time - meanTime));
  const misfit = (mean(misfits.map((each) => each ** 2)) * total) / (tests.length - 2);
  return { slopePerDay, standardError: Math.sqrt(Math.max(1, misfit) / spread) };
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
