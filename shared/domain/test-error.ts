import { fromCanonical, MEQ_PER_DKH, PARAMETERS, type ParameterCode, toCanonical } from './units.ts';

/** Half of a 95 % interval in standard deviations of a normal error. */
export const SD_PER_HALF_INTERVAL = 1.96;

/** How far a single test may be off. */
export interface TestError {
  /** Standard deviation, in the parameter's canonical unit. */
  sd: number;
  /** Half of the 95 % interval: what is shown after ±. */
  half: number;
  /** The method that it belongs to, in plain words. */
  method: string;
}

/**
 * Methods with an error of their own, known by words of what people write down. Half-widths of 95 %: a photometer's ±0.3
 * dKH is what makers of such meters state; 0.2 for a titration (0.15 to 0.3) and 0.4 for counted drops (a drop is 0.3
 * to 0.5) are common practice, no source.
 */
const ALKALINITY_METHODS: readonly { words: RegExp; method: string; halfDkh: number }[] = [
  { words: /photom|colou?rim/i, method: 'photometer', halfDkh: 0.3 },
  { words: /drop/i, method: 'drop-count test', halfDkh: 0.4 },
  { words: /titr|syringe|burette/i, method: 'titration', halfDkh: 0.2 },
];

/**
 * The error of one test by the method that was written down with it; the parameter's usual one where the method is not
 * known.
 */
export function testErrorOf(parameter: ParameterCode, method: string): TestError {
  if (parameter === 'alkalinity') {
    const known = ALKALINITY_METHODS.find(({ words }) => words.test(method));
    if (known) {
      const half = known.halfDkh * MEQ_PER_DKH;
      return { sd: half / SD_PER_HALF_INTERVAL, half, method: known.method };
    }
  }
  const usual = PARAMETERS.find(({ code }) => code === parameter);
  const sd = usual?.testSd ?? 0;
  return { sd, half: sd * SD_PER_HALF_INTERVAL, method: 'usual test' };
}

/**
 * A small difference in a unit of the parameter, in the canonical unit. Where the unit is no plain multiple (°F, specific
 * gravity) its slope in the middle of the usual band counts.
 */
export function canonicalDifference(parameter: ParameterCode, difference: number, unit: string): number {
  const middle = fromCanonical(parameter, bandMiddle(parameter), unit);
  return toCanonical(parameter, middle + difference / 2, unit) - toCanonical(parameter, middle - difference / 2, unit);
}

/** The other way round: a small canonical difference in a unit of the parameter. */
export function differenceInUnit(parameter: ParameterCode, difference: number, unit: string): number {
  const middle = bandMiddle(parameter);
  return (
    fromCanonical(parameter, middle + difference / 2, unit) - fromCanonical(parameter, middle - difference / 2, unit)
  );
}

function bandMiddle(parameter: ParameterCode): number {
  const band = PARAMETERS.find(({ code }) => code === parameter)?.band ?? { min: 0, max: 0 };
  return (band.min + band.max) / 2;
}
