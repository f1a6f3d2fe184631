import { assertAboveZero, assertNotNegative } from './ranges.ts';

const CALCIUM_CARBONATE_G_PER_MOL = 100.086;

/**
 * Part of its strength that saturated limewater loses when it is left open until it is in balance with air and chalk, at
 * 25 °C: from 20.6 to 0.556 mmol/L of calcium (PHREEQC 3.8.9, phreeqc.dat).
 */
const MOST_LOST = 0.973;

/** Alkalinity that even wholly carbonated limewater keeps, meq/L: twice 0.556 mmol/L. */
const LAST_MEQ_L = 1.11;

export interface AgedLimewater {
  alkalinityMeqL: number;
  /** Part of the alkalinity that is gone, 0 to 0.973. */
  lost: number;
  /** Chalk that has dropped out or floats as a crust, g. */
  chalkG: number;
}

/**
 * What carbon dioxide of the air leaves of limewater: each mole of it takes one of calcium and two equivalents, as chalk.
 *
 * @param litres what stands in the reservoir, L
 * @param alkalinityMeqL its strength before
 * @param co2Mmol carbon dioxide taken up, mmol
 * @throws {DomainError} `domain.out_of_range`
 */
export function afterAir(litres: number, alkalinityMeqL: number, co2Mmol: number): AgedLimewater {
  assertAboveZero('Litres', litres);
  assertNotNegative('Strength (meq/L)', alkalinityMeqL);
  assertNotNegative('Carbon dioxide (mmol)', co2Mmol);
  const mostMeqL = Math.max(0, Math.min(alkalinityMeqL - LAST_MEQ_L, alkalinityMeqL * MOST_LOST));
  const lostMeqL = Math.min((2 * co2Mmol) / litres, mostMeqL);
  return {
    alkalinityMeqL: alkalinityMeqL - lostMeqL,
    lost: alkalinityMeqL > 0 ? lostMeqL / alkalinityMeqL : 0,
    chalkG: (lostMeqL * litres * CALCIUM_CARBONATE_G_PER_MOL) / 2000,
  };
}
