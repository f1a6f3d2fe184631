import { addDays, type Day } from './days.ts';
import { assertAboveZero, assertNotNegative, assertWithin } from './ranges.ts';

/** Salt mix in a litre of new water of 35 ppt, g; from memory, the bag's own figure counts. */
export const SALT_G_PER_L_AT_35 = 38;

/** A level in a system and in the new water, and what it moves by itself between two changes; one unit for all. */
export interface ChangedLevel {
  level: number;
  newWater: number;
  /** Rise (or fall) between two changes, such as nitrate from feeding; 0 when left out. */
  drift?: number;
}

/**
 * A level after a number of equal batch changes: water is taken out first, then new water filled in, so that each moves
 * the level by its part of the difference. What drifts between changes comes before each of them.
 *
 * @param fraction part of the volume that is changed each time, above 0 up to 1
 * @returns the level after each change, first to last
 */
export function levelsAfterChanges(
  { level, newWater, drift = 0 }: ChangedLevel,
  fraction: number,
  count: number,
): number[] {
  assertFraction(fraction);
  const levels: number[] = [];
  let now = level;
  for (let change = 0; change < count; change += 1) {
    now = (1 - fraction) * (now + drift) + fraction * newWater;
    levels.push(now);
  }
  return levels;
}

/** A level after one batch change. */
export function levelAfterChange(level: number, newWater: number, fraction: number): number {
  assertFraction(fraction);
  return (1 - fraction) * level + fraction * newWater;
}

/**
 * A level while new water runs in and as much runs out, well mixed.
 *
 * @param litres that ran in
 */
export function levelAfterContinuous(level: number, newWater: number, litres: number, volumeL: number): number {
  assertNotNegative('Water that ran in (L)', litres);
  assertAboveZero('Net volume (L)', volumeL);
  return newWater + (level - newWater) * Math.exp(-litres / volumeL);
}

/** The level that endless equal changes come to, right after a change. */
export function levelInTheEnd(
  { newWater, drift = 0 }: Pick<ChangedLevel, 'newWater' | 'drift'>,
  fraction: number,
): number {
  assertFraction(fraction);
  return newWater + (drift * (1 - fraction)) / fraction;
}

/**
 * Litres to bring a level to a target: at once as one batch, or running through.
 *
 * @returns null where the target is not between the level and the new water, since no change reaches it
 */
export function litresToReach(
  level: number,
  newWater: number,
  target: number,
  volumeL: number,
): { batchL: number; continuousL: number } | null {
  assertAboveZero('Net volume (L)', volumeL);
  if (target === level) return { batchL: 0, continuousL: 0 };
  const left = (target - newWater) / (level - newWater);
  if (!(left > 0 && left < 1)) return null;
  return { batchL: (1 - left) * volumeL, continuousL: -Math.log(left) * volumeL };
}

/**
 * How many equal changes bring a level to a target or past it.
 *
 * @param most give up beyond so many
 * @returns null where they never do
 */
export function changesToReach(from: ChangedLevel, fraction: number, target: number, most = 400): number | null {
  const isThere = (level: number) => (from.level >= target ? level <= target : level >= target);
  if (isThere(from.level) && from.level === target) return 0;
  const found = levelsAfterChanges(from, fraction, most).findIndex(isThere);
  return found === -1 ? null : found + 1;
}

/**
 * Salt mix for new water, in proportion to its salinity.
 *
 * @param salinity ppt, 0 to 45
 * @returns grams
 */
export function saltForWater(litres: number, salinity: number): number {
  assertNotNegative('New water (L)', litres);
  assertWithin('Salinity (ppt)', salinity, 0, 45);
  return (litres * SALT_G_PER_L_AT_35 * salinity) / 35;
}

/** A habit of changing water: a part of the volume, so many days after the last time. */
export interface ChangeHabit {
  everyDays: number;
  /** First day where no change was logged yet. */
  startOn: Day;
}

/** The day of the next change: a missed one is due still, on the day it was. */
export function nextChangeOn({ everyDays, startOn }: ChangeHabit, lastOn: Day | null): Day {
  if (lastOn === null) return startOn;
  const next = addDays(lastOn, everyDays);
  return next < startOn ? startOn : next;
}

/**
 * The days of changes up to a last day; a missed one counts as made today.
 */
export function plannedChanges(habit: ChangeHabit, lastOn: Day | null, today: Day, until: Day): Day[] {
  assertAboveZero('Days between changes', habit.everyDays);
  const due = nextChangeOn(habit, lastOn);
  const days: Day[] = [];
  for (let day = due < today ? today : due; day <= until; day = addDays(day, habit.everyDays)) days.push(day);
  return days;
}

function assertFraction(fraction: number): void {
  assertAboveZero('Part of the water', fraction);
  assertWithin('Part of the water', fraction, 0, 1);
}
