import { assertWithin } from './ranges.ts';

/** EOS-80 is defined on the 1968 temperature scale; thermometers of today show ITS-90 (Saunders 1990). */
const T68_PER_T90 = 1.00024;

const SALINITY_LIMITS = { min: 0, max: 42 } as const;
const TEMPERATURE_LIMITS = { min: -2, max: 40 } as const;
const SG_TEMPERATURE = 25;

/** Specific gravity of salinity 42, where the equation of state ends. */
const HIGHEST_SG = 1.0317;

/**
 * Density of seawater at one atmosphere.
 *
 * @param salinity practical salinity (PSS-78), 0–42
 * @param temperatureC °C on ITS-90, −2 to 40
 * @returns kg/m³
 * @throws {DomainError} `domain.out_of_range`
 * @see UNESCO 1983, Technical Papers in Marine Science 44, equations 13 and 14 (EOS-80)
 */
export function seawaterDensity(salinity: number, temperatureC: number): number {
  assertWithin('Salinity', salinity, SALINITY_LIMITS.min, SALINITY_LIMITS.max);
  assertWithin('Temperature (°C)', temperatureC, TEMPERATURE_LIMITS.min, TEMPERATURE_LIMITS.max);
  return densityOf(salinity, temperatureC * T68_PER_T90);
}

/**
 * Specific gravity 25/25 °C: density at 25 °C over that of pure water at 25 °C, the scale of a refractometer or float
 * that is marked 25 °C.
 *
 * @param salinity practical salinity, 0–42
 */
export function specificGravity(salinity: number): number {
  return seawaterDensity(salinity, SG_TEMPERATURE) / seawaterDensity(0, SG_TEMPERATURE);
}

/**
 * Practical salinity from specific gravity 25/25 °C; the inverse of {@link specificGravity} by Newton's method.
 *
 * @throws {DomainError} `domain.out_of_range` outside 1.0000–1.0317 (salinity 0–42)
 */
export function salinityFromSpecificGravity(sg: number): number {
  assertWithin('Specific gravity', sg, 1, HIGHEST_SG);
  const target = sg * seawaterDensity(0, SG_TEMPERATURE);
  const t68 = SG_TEMPERATURE * T68_PER_T90;
  let salinity = (sg - 1) * 1300;
  // Density is almost a straight line in salinity: three steps reach the last bit, the rest costs nothing.
  for (let step = 0; step < 8; step += 1) {
    const excess = densityOf(salinity, t68) - target;
    salinity = Math.min(SALINITY_LIMITS.max, Math.max(0, salinity - excess / densitySlope(salinity, t68)));
  }
  return salinity;
}

function densityOf(s: number, t: number): number {
  const { linear, power, square } = saltTerms(t);
  return pureWaterDensity(t) + linear * s + power * s ** 1.5 + square * s * s;
}

function densitySlope(s: number, t: number): number {
  const { linear, power, square } = saltTerms(t);
  return linear + 1.5 * power * Math.sqrt(s) + 2 * square * s;
}

/** Standard mean ocean water free of salt, equation 14. */
function pureWaterDensity(t: number): number {
  return polynomial(t, [999.842594, 6.793952e-2, -9.09529e-3, 1.001685e-4, -1.120083e-6, 6.536332e-9]);
}

/** The coefficients of S, S^1.5 and S² in equation 13. */
function saltTerms(t: number): { linear: number; power: number; square: number } {
  return {
    linear: polynomial(t, [8.24493e-1, -4.0899e-3, 7.6438e-5, -8.2467e-7, 5.3875e-9]),
    power: polynomial(t, [-5.72466e-3, 1.0227e-4, -1.6546e-6]),
    square: 4.8314e-4,
  };
}

function polynomial(x: number, coefficients: readonly number[]): number {
  return coefficients.reduceRight((sum, coefficient) => sum * x + coefficient, 0);
}
