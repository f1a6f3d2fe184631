import { assertAboveZero, assertNotNegative, assertWithin } from './ranges.ts';

/**
 * How much more a weak limewater conducts than its share of a full one: ions hinder one another (Kohlrausch). Fitted to
 * PHREEQC 3.8.9 with phreeqc.dat at 25 °C (2 to 20 mmol/L), where half the strength reads 54 % of full; within 0.5 %.
 */
const HINDRANCE = 0.29;

/** A reading may lie so far above the fresh one before the probe or the fresh reading must be wrong. */
const MOST_ABOVE_FRESH = 1.1;

/**
 * What part of full strength limewater still has, from its conductivity.
 *
 * Both readings are the farm's own, by one meter at one temperature (or compensated by the meter): published values for
 * saturated limewater differ by 13 %, so only the ratio is trusted. Acetate conducts too, so it holds for limewater without
 * vinegar, or where the fresh reading had the same vinegar.
 *
 * @param readingMsCm conductivity now, mS/cm
 * @param freshMsCm conductivity of the same limewater when it was fresh and saturated, mS/cm
 * @returns 0 to 1
 * @throws {DomainError} `domain.out_of_range`, also for a reading over 110 % of the fresh one
 */
export function strengthLeft(readingMsCm: number, freshMsCm: number): number {
  assertNotNegative('Conductivity (mS/cm)', readingMsCm);
  assertAboveZero('Conductivity when fresh (mS/cm)', freshMsCm);
  assertWithin('Conductivity as part of the fresh reading', readingMsCm / freshMsCm, 0, MOST_ABOVE_FRESH);
  const ratio = Math.min(1, readingMsCm / freshMsCm);
  // ratio = (1 + k) part − k part^1.5 rises from 0 to 1 with part; Newton's steps from above never pass the root.
  let part = ratio;
  for (let step = 0; step < 20; step += 1) part -= (conductedPart(part) - ratio) / conductedSlope(part);
  return Math.min(1, Math.max(0, part));
}

function conductedPart(part: number): number {
  return (1 + HINDRANCE) * part - HINDRANCE * part ** 1.5;
}

function conductedSlope(part: number): number {
  return 1 + HINDRANCE - 1.5 * HINDRANCE * Math.sqrt(part);
}
