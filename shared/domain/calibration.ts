import { assertNotNegative } from './ranges.ts';
import { meanOfTests } from './replicates.ts';
import { tQuantile95 } from './student-t.ts';

/** Beyond it Student's t is the normal distribution, for our purpose. */
const MANY_DEGREES = 1000;

/** A check of a method against a solution whose value is known. All in one unit. */
export interface CalibrationCheck {
  /** What the method read of the solution, once or several times. */
  found: readonly number[];
  referenceValue: number;
  /** Standard uncertainty of the solution's own value, zero or more. */
  referenceSd: number;
  /** Standard deviation between tests by this method. */
  repeatabilitySd: number;
}

export interface Bias {
  tests: number;
  /** Mean of what was found. */
  mean: number;
  /** How much too high the method reads: below zero where it reads too low. */
  bias: number;
  biasSd: number;
  /** The 95 % interval of the bias. */
  low: number;
  high: number;
  /** Whether the interval leaves zero out. */
  isDistinct: boolean;
}

/**
 * The bias of a method by a check against a known solution, with its 95 % interval by Student's t. The solution's
 * uncertainty and that of the mean add as squares; degrees of freedom by Welch and Satterthwaite, the solution's counted
 * as endless.
 *
 * @throws {DomainError} `domain.out_of_range`
 * @see JCGM 100:2008 (GUM) 5.1.2 for the combined uncertainty, G.4.1 for the effective degrees of freedom
 */
export function calibrationBias({ found, referenceValue, referenceSd, repeatabilitySd }: CalibrationCheck): Bias {
  assertNotNegative('Uncertainty of the solution', referenceSd);
  const { tests, mean, sd, degreesOfFreedom } = meanOfTests(found, repeatabilitySd);
  const bias = mean - referenceValue;
  const biasSd = Math.hypot(sd, referenceSd);
  const effective = Math.min(MANY_DEGREES, Math.floor(degreesOfFreedom * (biasSd / sd) ** 4));
  const half = tQuantile95(Math.max(1, effective)) * biasSd;
  return { tests, mean, bias, biasSd, low: bias - half, high: bias + half, isDistinct: Math.abs(bias) > half };
}

/** What has to be known of a stored check to choose the one that counts. */
export interface DatedCheck {
  at: number;
  /** Null for a check of the whole method, such as of a probe. */
  kitLotId: string | null;
}

/**
 * The check that corrects a reading: the last one at or before it, of its kit lot or of the method as a whole.
 *
 * @param checks those of the reading's method, in any order
 */
export function checkFor<Check extends DatedCheck>(
  checks: readonly Check[],
  reading: { takenAt: number; kitLotId: string | null },
): Check | null {
  return checks.reduce<Check | null>((last, check) => {
    const counts = check.at <= reading.takenAt && (check.kitLotId === null || check.kitLotId === reading.kitLotId);
    return counts && (last === null || check.at >= last.at) ? check : last;
  }, null);
}
