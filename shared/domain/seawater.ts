import { polynomial } from './polynomial.ts';
import { assertWithin } from './ranges.ts';
import { risingRoot } from './roots.ts';

const SALINITY_LIMITS = { min: 0, max: 42 } as const;
const TEMPERATURE_LIMITS = { min: -2, max: 40 } as const;

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
  return densityByEquation(salinity, temperatureC);
}

/**
 * The same without the guard, for who has checked the range: the constants of the carbonate system reach salinity 43, a
 * little beyond the 42 that EOS-80 was fitted to.
 */
export function densityByEquation(salinity: number, temperatureC: number): number {
  return densityOf(salinity, toT68(temperatureC));
}

/**
 * Specific gravity is nothing without its two temperatures: of the sample and of the pure water it is compared with.
 * Instruments are marked 25/25 °C, 60/60 °F or 20/4 °C; between them the same water differs by up to 0.0016.
 */
export const SG_SCALES = {
  '25/25': { sampleC: 25, waterC: 25 },
  '60F/60F': { sampleC: 140 / 9, waterC: 140 / 9 },
  '20/4': { sampleC: 20, waterC: 4 },
} as const;
export type SgScale = keyof typeof SG_SCALES;

/**
 * Specific gravity: density of seawater over that of pure water, at the temperatures of the scale.
 *
 * @param salinity practical salinity, 0–42
 */
export function specificGravity(salinity: number, scale: SgScale = '25/25'): number {
  const { sampleC, waterC } = SG_SCALES[scale];
  return seawaterDensity(salinity, sampleC) / seawaterDensity(0, waterC);
}

/**
 * Practical salinity from specific gravity; the inverse of {@link specificGravity}.
 *
 * @throws {DomainError} `domain.out_of_range` where it is no seawater of salinity 0–42
 */
export function salinityFromSpecificGravity(sg: number, scale: SgScale = '25/25'): number {
  const { min, max } = SALINITY_LIMITS;
  const rounded = (salinity: number, round: (x: number) => number) =>
    round(specificGravity(salinity, scale) * 1e4) / 1e4;
  assertWithin(`Specific gravity ${scale}`, sg, rounded(min, Math.floor), rounded(max, Math.ceil));
  const { sampleC, waterC } = SG_SCALES[scale];
  const target = sg * seawaterDensity(0, waterC);
  const t68 = toT68(sampleC);
  const excess = (salinity: number) => ({
    value: densityOf(salinity, t68) - target,
    slope: densitySlope(salinity, t68),
  });
  return risingRoot(excess, { low: min, high: max }, 35, 1e-12);
}

/** EOS-80 and PSS-78 are defined on the 1968 temperature scale; thermometers of today show ITS-90 (Saunders 1990). */
export function toT68(t90: number): number {
  return t90 * 1.00024;
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
