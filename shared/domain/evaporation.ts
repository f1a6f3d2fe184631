import { MS_PER_DAY } from './days.ts';
import { assertAboveZero, assertNotNegative } from './ranges.ts';
import { litresPerDay, type UseInterval } from './reservoir-use.ts';
import { tQuantile95 } from './student-t.ts';

const Z_975 = 1.96;
/** Fewer stretches between level readings than this tell no spread. */
const FEWEST_STRETCHES = 3;

/** Water that leaves a system into the air, L a day, with a 95 % interval; its ends are null where no spread is known. */
export interface Evaporation {
  litresPerDay: number;
  low: number | null;
  high: number | null;
  /** Days that the figure covers. */
  days: number;
  /** Stretches between two looks at a level that it was told from. */
  stretches: number;
}

/**
 * Evaporation from the limewater that replaced it: what was used between level readings, as all of it tops up what the
 * air took. The interval follows from how the stretches differ, and is never narrower than the readings of the level
 * allow.
 *
 * @param use what was drawn while online, this system's part
 * @param days length of the window that ends `now`
 * @param levelSdL how far one look at a level may be off (standard deviation), L
 * @returns null where less than half a day is covered
 */
export function evaporationFromUse(
  use: readonly UseInterval[],
  now: number,
  { days, levelSdL = 0 }: { days: number; levelSdL?: number },
): Evaporation | null {
  const mean = litresPerDay(use, now, days);
  if (mean === null) return null;
  const stretches = use.flatMap((interval) => clipped(interval, now - days * MS_PER_DAY, now));
  const covered = stretches.reduce((sum, stretch) => sum + stretch.days, 0);
  const found = { litresPerDay: mean, days: covered, stretches: stretches.length };
  if (stretches.length < FEWEST_STRETCHES) return { ...found, low: null, high: null };
  const freedom = stretches.length - 1;
  const squares = stretches.reduce(
    (sum, stretch) => sum + stretch.days * (stretch.litres / stretch.days - mean) ** 2,
    0,
  );
  const byScatter = Math.sqrt(squares / freedom / covered) * tQuantile95(freedom);
  // Only the first and the last look count: those between them cancel.
  const byLooks = (Z_975 * Math.SQRT2 * levelSdL) / covered;
  const half = Math.max(byScatter, byLooks);
  return { ...found, low: Math.max(0, mean - half), high: mean + half };
}

/** A salinity reading, PSS-78, with the standard deviation of its error. */
export interface SalinityReading {
  at: number;
  salinity: number;
  sd: number;
}

/**
 * Evaporation by the salt that stays behind. Between two readings without a water change the salt is the same, so the
 * water at the second is S₁/S₂ of that at the first. Where top-off kept up, salinity stands still and this is what was
 * topped up; where it was missed, the rise tells the rest.
 *
 * @param netVolumeL the system's water at the first reading, L
 * @param toppedUpL water that was put in between the readings, limewater included, L
 * @returns L a day with a 95 % interval; null where the readings are less than half a day apart
 * @throws {DomainError} `domain.out_of_range`
 */
export function evaporationFromSalinity(
  first: SalinityReading,
  second: SalinityReading,
  { netVolumeL, toppedUpL }: { netVolumeL: number; toppedUpL: number },
): Evaporation | null {
  assertAboveZero('Salinity', first.salinity);
  assertAboveZero('Salinity', second.salinity);
  assertAboveZero('System volume (L)', netVolumeL);
  assertNotNegative('Topped up (L)', toppedUpL);
  const days = (second.at - first.at) / MS_PER_DAY;
  if (days < 0.5) return null;
  const kept = first.salinity / second.salinity;
  const lostL = netVolumeL * (1 - kept);
  const sdL = netVolumeL * kept * Math.hypot(first.sd / first.salinity, second.sd / second.salinity);
  const perDay = (toppedUpL + lostL) / days;
  const half = (Z_975 * sdL) / days;
  return { litresPerDay: perDay, low: perDay - half, high: perDay + half, days, stretches: 1 };
}

/**
 * What a square metre of open water loses in a day, L, calm to moving water.
 *
 * @see Smith, Löf & Jones 1998, Solar Energy 62:159–167, the pool equation, computed for these states of the air
 */
export const EVAPORATION_BY_AIR = [
  { air: 'humid shed: water 25 °C, air 24 °C, 80 %', least: 2.0, most: 2.7 },
  { air: 'summer greenhouse: water 26 °C, air 30 °C, 60 %', least: 2.1, most: 2.8 },
  { air: 'water 25 °C, air 24 °C, 60 %', least: 3.5, most: 4.7 },
  { air: 'water 26 °C, air 24 °C, 50 %', least: 4.7, most: 6.4 },
  { air: 'heated winter: water 26 °C, air 22 °C, 40 %', least: 5.8, most: 7.9 },
] as const;

/** Undisturbed pools lose this part of what the equation says (same paper). */
const STILL_WATER = 0.74;
const LEAST_PER_M2 = EVAPORATION_BY_AIR[0].least * STILL_WATER;
const MOST_PER_M2 = Math.max(...EVAPORATION_BY_AIR.map(({ most }) => most));

export type EvaporationCheck = 'low' | 'usual' | 'high';

/**
 * Whether evaporation fits the open water surface: lower than any air takes means that top-off doesn't keep up or a level
 * is wrong, higher means a leak, or water that goes elsewhere.
 *
 * @param surfaceM2 open water surface of all tanks and sumps, m²
 */
export function checkEvaporation(
  evaporationLPerDay: number,
  surfaceM2: number,
): { perM2: number; check: EvaporationCheck; least: number; most: number } {
  assertAboveZero('Water surface (m²)', surfaceM2);
  const perM2 = evaporationLPerDay / surfaceM2;
  const check = perM2 < LEAST_PER_M2 ? 'low' : perM2 > MOST_PER_M2 ? 'high' : 'usual';
  return { perM2, check, least: LEAST_PER_M2, most: MOST_PER_M2 };
}

function clipped({ from, to, litres }: UseInterval, least: number, most: number): { days: number; litres: number }[] {
  const inside = Math.min(to, most) - Math.max(from, least);
  return inside > 0 ? [{ days: inside / MS_PER_DAY, litres: (litres * inside) / (to - from) }] : [];
}
