import { mixLimewater } from './limewater.ts';

/** A usual amount where vinegar is used at all, mL of 5 % in a litre (common practice, no source). */
export const USUAL_VINEGAR_ML_PER_L = 5;

/** Powder that no litre dissolves, so that a mix with it is full. */
const PLENTY_G_PER_L = 20;

/**
 * The strongest limewater that water holds, counted as what it brings in the end.
 *
 * @param vinegarMlPerL 5 % vinegar in each litre
 * @param temperatureC °C, 15–30
 * @returns meq/L
 */
export function saturatedStrength(vinegarMlPerL = 0, temperatureC = 25): number {
  return mixLimewater({ waterL: 1, limeG: PLENTY_G_PER_L, purity: 1, vinegarMl: vinegarMlPerL, temperatureC })
    .alkalinityMeqL;
}

/** Change in a day that most farms stay under, dKH (common practice, no source). */
export const DAILY_CHANGE_LIMIT_DKH = 1.4;
