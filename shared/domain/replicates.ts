import { DomainError } from '../errors.ts';
import { assertAboveZero } from './ranges.ts';

/**
 * How many earlier tests the repeatability of a method counts as, when it meets the scatter of the tests at hand. Ten is
 * our own choice: two or three tests hardly move it, and a pair that lies far apart still widens it.
 */
const TESTS_BEHIND_A_METHOD = 10;

const MOST_TESTS = 50;

/** Several tests of the same water as one result. */
export interface TestsMean {
  tests: number;
  mean: number;
  /** Standard deviation of the mean. */
  sd: number;
  /** Standard deviation between the tests themselves; null for one test. */
  scatter: number | null;
  /** How well `sd` is known: degrees of freedom behind it. */
  degreesOfFreedom: number;
}

/**
 * Mean of repeated tests with its error. The variance of one test is pooled from the method's repeatability (as of ten
 * earlier tests) and the scatter of these tests; that of the mean is a part of it for each test.
 *
 * @param values 1 to 50 results of the same water, in one unit
 * @param repeatabilitySd standard deviation between tests by this method, above zero, same unit
 * @param earlierTests how many tests stand behind `repeatabilitySd`; with 0 the scatter alone counts (needs two tests)
 * @throws {DomainError} `domain.out_of_range`
 * @see JCGM 100:2008 (GUM) 4.2.2 to 4.2.4 for the scatter, the mean's variance and the pooled estimate
 */
export function meanOfTests(
  values: readonly number[],
  repeatabilitySd: number,
  earlierTests = TESTS_BEHIND_A_METHOD,
): TestsMean {
  assertAboveZero('Repeatability', repeatabilitySd);
  const tests = values.length;
  if (tests < 1 || tests > MOST_TESTS || !values.every(Number.isFinite)) {
    throw new DomainError('domain.out_of_range', `A result is made of 1 to ${MOST_TESTS} numbers.`, {
      details: { tests },
    });
  }
  const degreesOfFreedom = earlierTests + tests - 1;
  if (degreesOfFreedom < 1) {
    throw new DomainError('domain.out_of_range', 'One test alone tells nothing of its own error.');
  }
  const mean = values.reduce((sum, value) => sum + value, 0) / tests;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  const variance = (earlierTests * repeatabilitySd ** 2 + squares) / degreesOfFreedom;
  return {
    ...{ tests, mean, degreesOfFreedom },
    sd: Math.sqrt(variance / tests),
    scatter: tests > 1 ? Math.sqrt(squares / (tests - 1)) : null,
  };
}
