import { MEQ_PER_DKH, PARAMETERS, type ParameterCode } from './units.ts';

/** Half of a 95 % interval in standard deviations of a normal error. */
const SD_PER_HALF_INTERVAL = 1.96;

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
