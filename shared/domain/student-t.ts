import { DomainError } from '../errors.ts';

const Z_975 = 1.959963984540054;

/** Upper 2.5 % points of Student's t for 1 to 30 degrees of freedom (published tables; checked by integration). */
const T_975 = [
  ...[12.706205, 4.302653, 3.182446, 2.776445, 2.570582, 2.446912, 2.364624, 2.306004, 2.262157, 2.228139],
  ...[2.200985, 2.178813, 2.160369, 2.144787, 2.13145, 2.119905, 2.109816, 2.100922, 2.093024, 2.085963],
  ...[2.079614, 2.073873, 2.068658, 2.063899, 2.059539, 2.055529, 2.051831, 2.048407, 2.04523, 2.042272],
];

/**
 * How many standard errors a two-sided 95 % interval reaches each way.
 *
 * @param degreesOfFreedom a whole number from 1
 * @throws {DomainError} `domain.out_of_range`
 * @see Abramowitz & Stegun 26.7.5 for the expansion above 30 degrees of freedom
 */
export function tQuantile95(degreesOfFreedom: number): number {
  if (!(Number.isInteger(degreesOfFreedom) && degreesOfFreedom >= 1)) {
    throw new DomainError('domain.out_of_range', 'An interval needs at least one degree of freedom.', {
      details: { degreesOfFreedom },
    });
  }
  return T_975[degreesOfFreedom - 1] ?? expanded(degreesOfFreedom);
}

function expanded(n: number): number {
  const z = Z_975;
  const first = (z ** 3 + z) / 4;
  const second = (5 * z ** 5 + 16 * z ** 3 + 3 * z) / 96;
  const third = (3 * z ** 7 + 19 * z ** 5 + 17 * z ** 3 - 15 * z) / 384;
  return z + first / n + second / n ** 2 + third / n ** 3;
}
