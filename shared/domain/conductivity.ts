import { polynomial } from './polynomial.ts';
import { assertWithin } from './ranges.ts';
import { risingRoot } from './roots.ts';
import { toT68 } from './seawater.ts';

/** Conductivity of standard seawater, S 35 at 15 °C (IPTS-68), mS/cm: the value in use since Culkin & Smith 1980. */
const STANDARD_MS_CM = 42.914;

const SALINITY_LIMITS = { min: 0, max: 42 } as const;
const TEMPERATURE_LIMITS = { min: -2, max: 35 } as const;

/** Below this PSS-78 does not hold, and the extension of Hill, Dauphinee & Woods 1986 takes over. */
const LOWEST_OF_SCALE = 2;

/** Coefficients of powers of √Rt: of the scale at 15 °C, and of its change with temperature. */
const AT_15_C = [0.008, -0.1692, 25.3851, 14.0941, -7.0261, 2.7081] as const;
const PER_DEGREE = [0.0005, -0.0056, -0.0066, -0.0375, 0.0636, -0.0144] as const;

/** More than this ratio no seawater of salinity 42 has. */
const ROOT_RATIO = { low: 0, high: 1.2 } as const;

/**
 * Practical salinity from conductivity at one atmosphere.
 *
 * @param conductivityMsCm as measured at `temperatureC`, mS/cm; a meter that compensates shows it for 25 °C
 * @param temperatureC °C on ITS-90, −2 to 35
 * @returns practical salinity, 0–42
 * @throws {DomainError} `domain.out_of_range`
 * @see UNESCO 1983, Technical Papers in Marine Science 44, pp. 6–9 (PSS-78)
 * @see Hill, Dauphinee & Woods 1986, IEEE J. Ocean. Eng. OE-11:109 (below 2, scaled to meet PSS-78 there)
 */
export function salinityFromConductivity(conductivityMsCm: number, temperatureC: number): number {
  assertTemperature(temperatureC);
  assertWithin('Conductivity (mS/cm)', conductivityMsCm, 0, conductivityOf(SALINITY_LIMITS.max, temperatureC) + 1e-9);
  return Math.min(SALINITY_LIMITS.max, salinityOfRatio(ratioAt(conductivityMsCm, temperatureC), temperatureC));
}

/**
 * Conductivity of seawater at one atmosphere, mS/cm; the inverse of {@link salinityFromConductivity}.
 *
 * @param salinity practical salinity, 0–42
 * @param temperatureC °C on ITS-90, −2 to 35
 * @throws {DomainError} `domain.out_of_range`
 */
export function conductivityOf(salinity: number, temperatureC: number): number {
  assertWithin('Salinity', salinity, SALINITY_LIMITS.min, SALINITY_LIMITS.max);
  assertTemperature(temperatureC);
  return rootRatioOf(salinity, temperatureC) ** 2 * standardRatio(temperatureC) * STANDARD_MS_CM;
}

/** Practical salinity from Rt: conductivity over that of S 35 at the same temperature. */
export function salinityOfRatio(ratio: number, temperatureC: number): number {
  const salinity = practicalSalinity(Math.sqrt(ratio), temperatureC).value;
  if (salinity >= LOWEST_OF_SCALE) return salinity;
  return extended(ratio, temperatureC) * hillScale(temperatureC);
}

/** √Rt of a salinity: the scale is a rising polynomial of it. */
function rootRatioOf(salinity: number, temperatureC: number): number {
  if (salinity >= LOWEST_OF_SCALE) return rootOnScale(salinity, temperatureC);
  const scale = hillScale(temperatureC);
  const excess = (root: number) => {
    const at = (x: number) => extended(x * x, temperatureC) * scale;
    // The correction is small and smooth, so the slope of the scale itself leads there.
    return { value: at(root) - salinity, slope: practicalSalinity(root, temperatureC).slope };
  };
  return salinity === 0 ? 0 : risingRoot(excess, { low: 0, high: 0.3 }, 0.15, 1e-15);
}

function rootOnScale(salinity: number, temperatureC: number): number {
  const excess = (root: number) => {
    const { value, slope } = practicalSalinity(root, temperatureC);
    return { value: value - salinity, slope };
  };
  return risingRoot(excess, ROOT_RATIO, Math.sqrt(salinity / 35), 1e-15);
}

function practicalSalinity(root: number, temperatureC: number): { value: number; slope: number } {
  const warmth = warmthOf(temperatureC);
  const coefficients = AT_15_C.map((coefficient, power) => coefficient + warmth * (PER_DEGREE[power] ?? 0));
  const slopes = coefficients.slice(1).map((coefficient, power) => coefficient * (power + 1));
  return { value: polynomial(root, coefficients), slope: polynomial(root, slopes) };
}

/** The scale less its constant terms, which fade with salt, so that pure water reads zero. */
function extended(ratio: number, temperatureC: number): number {
  const x = 400 * ratio;
  const y = Math.sqrt(100 * ratio);
  const faded =
    AT_15_C[0] / (1 + 1.5 * x + x * x) + (PER_DEGREE[0] * warmthOf(temperatureC)) / (1 + y + y ** 2 + y ** 3);
  return practicalSalinity(Math.sqrt(ratio), temperatureC).value - faded;
}

/** Lifts the extension by its last hundred-thousandth, so that both meet at salinity 2. */
function hillScale(temperatureC: number): number {
  return LOWEST_OF_SCALE / extended(rootOnScale(LOWEST_OF_SCALE, temperatureC) ** 2, temperatureC);
}

function warmthOf(temperatureC: number): number {
  const above15 = toT68(temperatureC) - 15;
  return above15 / (1 + 0.0162 * above15);
}

/** Rt of a measured conductivity. */
function ratioAt(conductivityMsCm: number, temperatureC: number): number {
  return conductivityMsCm / STANDARD_MS_CM / standardRatio(temperatureC);
}

/** rt: conductivity of S 35 at this temperature over that at 15 °C. */
function standardRatio(temperatureC: number): number {
  return polynomial(toT68(temperatureC), [0.6766097, 2.00564e-2, 1.104259e-4, -6.9698e-7, 1.0031e-9]);
}

function assertTemperature(temperatureC: number): void {
  assertWithin('Temperature (°C)', temperatureC, TEMPERATURE_LIMITS.min, TEMPERATURE_LIMITS.max);
}
