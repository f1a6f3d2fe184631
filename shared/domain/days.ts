import { DomainError } from '../errors.ts';

/** A calendar day of the farm, 'YYYY-MM-DD'. */
export type Day = string;

/** A calendar month, 'YYYY-MM'. */
export type Month = string;

export const MS_PER_HOUR = 3_600_000;

/** Length of a day without a clock change; use {@link startOfDay} where the local day matters. */
export const MS_PER_DAY = 24 * MS_PER_HOUR;

/** No zone is further than this from UTC, so the local midnight is always inside the span around UTC midnight. */
const WIDEST_OFFSET_MS = 15 * MS_PER_HOUR;

const FIRST_DAY_MS = Date.parse('0001-01-01T00:00:00Z');
const END_OF_DAYS_MS = Date.parse('9999-12-31T00:00:00Z') + MS_PER_DAY;

const DAY_PATTERN = /^\d{4}-\d{2}-\d{2}$/;

// Building a formatter costs far more than using one.
const clockFormats = new Map<string, Intl.DateTimeFormat>();

/** Whether the text is a real calendar day such as '2028-02-29'. */
export function isDay(text: string): boolean {
  if (!DAY_PATTERN.test(text)) return false;
  const midnight = Date.parse(`${text}T00:00:00Z`);
  // Some engines roll 30 February over to March instead of refusing it.
  return midnight >= FIRST_DAY_MS && new Date(midnight).toISOString().slice(0, 10) === text;
}

/**
 * The calendar day on the wall of the farm at an instant.
 *
 * @param instantMs epoch milliseconds, UTC
 * @param timeZone IANA name, such as 'Europe/Lisbon'
 * @throws {DomainError} `input.invalid` when the zone is unknown
 */
export function dayOf(instantMs: number, timeZone: string): Day {
  return dayFromUtc(wallClockAsUtc(instantMs, timeZone));
}

/**
 * The first instant of a day in a zone. Where the clocks skip midnight it is the moment after the jump; where midnight
 * comes twice it is the first one; a day that the zone skipped altogether starts where the next one does.
 *
 * @throws {DomainError} `input.invalid` when the day or the zone is not real
 */
export function startOfDay(day: Day, timeZone: string): number {
  return instantAt(day, 0, timeZone);
}

/**
 * The instant at which the clocks of a zone show a time; as {@link startOfDay} where they skip it or show it twice.
 *
 * @param minuteOfDay minutes after midnight as the clock shows them, 0 to 1439; parts of minutes are seconds
 * @throws {DomainError} `input.invalid` when the day or the zone is not real
 */
export function instantAt(day: Day, minuteOfDay: number, timeZone: string): number {
  const wall = utcOf(day) + Math.round(minuteOfDay * 60) * 1000;
  const candidates = [-MS_PER_DAY, MS_PER_DAY]
    .map((shift) => wall - offsetAt(wall + shift, timeZone))
    .filter((instant) => wallClockAsUtc(instant, timeZone) === wall);
  return candidates.length > 0 ? Math.min(...candidates) : firstInstantFrom(wall, timeZone);
}

/** The day `count` days later (earlier when negative). */
export function addDays(day: Day, count: number): Day {
  if (!Number.isInteger(count)) {
    throw new DomainError('input.invalid', 'Days are counted in whole numbers.', { details: { count } });
  }
  return dayFromUtc(utcOf(day) + count * MS_PER_DAY);
}

/** Whole days from `from` to `to`; negative when `to` is earlier. */
export function daysBetween(from: Day, to: Day): number {
  return (utcOf(to) - utcOf(from)) / MS_PER_DAY;
}

/** The month of a day, 'YYYY-MM'. */
export function monthOf(day: Day): Month {
  utcOf(day);
  return day.slice(0, 7);
}

/** First day of a month and first day of the month after it. */
export function monthBounds(month: Month): { from: Day; to: Day } {
  const from = `${month}-01`;
  const start = new Date(utcOf(from));
  return { from, to: dayFromUtc(Date.UTC(start.getUTCFullYear(), start.getUTCMonth() + 1, 1)) };
}

/** ISO weekday: 1 is Monday, 7 is Sunday. */
export function weekdayOf(day: Day): number {
  return new Date(utcOf(day)).getUTCDay() || 7;
}

/** Every day from `from` to `to`, both included; empty when `to` is earlier. */
export function eachDay(from: Day, to: Day): Day[] {
  const count = Math.max(0, daysBetween(from, to) + 1);
  return Array.from({ length: count }, (_, index) => addDays(from, index));
}

function utcOf(day: Day): number {
  if (!isDay(day)) {
    throw new DomainError('input.invalid', 'Enter a real day as year-month-day, such as 2026-03-12.', {
      details: { day },
    });
  }
  return Date.parse(`${day}T00:00:00Z`);
}

function dayFromUtc(utcMs: number): Day {
  if (!(utcMs >= FIRST_DAY_MS && utcMs < END_OF_DAYS_MS)) {
    throw new DomainError('domain.out_of_range', 'Days run from year 1 to year 9999.', { details: { utcMs } });
  }
  return new Date(utcMs).toISOString().slice(0, 10);
}

/** How far the clocks of a zone are ahead of UTC at an instant, ms. */
export function offsetAt(instantMs: number, timeZone: string): number {
  return wallClockAsUtc(instantMs, timeZone) - Math.floor(instantMs / 1000) * 1000;
}

/** What the wall clock of the zone shows, read as if it were UTC, to the second. */
function wallClockAsUtc(instantMs: number, timeZone: string): number {
  const shown: Partial<Record<Intl.DateTimeFormatPartTypes, number>> = {};
  for (const { type, value } of clockFormat(timeZone).formatToParts(instantMs)) shown[type] = Number(value);
  const { year = 0, month = 1, day = 1, hour = 0, minute = 0, second = 0 } = shown;
  return Date.UTC(year, month - 1, day, hour, minute, second);
}

function clockFormat(timeZone: string): Intl.DateTimeFormat {
  const known = clockFormats.get(timeZone);
  if (known) return known;
  const made = newClockFormat(timeZone);
  clockFormats.set(timeZone, made);
  return made;
}

function newClockFormat(timeZone: string): Intl.DateTimeFormat {
  try {
    return new Intl.DateTimeFormat('en-US', {
      timeZone,
      hourCycle: 'h23',
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
    });
  } catch {
    throw new DomainError('input.invalid', 'Choose a time zone from the list.', { details: { timeZone } });
  }
}

/** Bisection for the jump over a time that the clocks skip. */
function firstInstantFrom(wall: number, timeZone: string): number {
  let before = wall - WIDEST_OFFSET_MS;
  let after = wall + WIDEST_OFFSET_MS;
  while (after - before > 1) {
    const middle = Math.floor((before + after) / 2);
    if (wallClockAsUtc(middle, timeZone) < wall) before = middle;
    else after = middle;
  }
  return after;
}
