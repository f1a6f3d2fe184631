import { addDays, daysBetween, weekdayOf, type Day } from './days.ts';

/** Year and week by ISO 8601: weeks start on Monday, and week 1 is the one with the year's first Thursday. */
export function isoWeekOf(day: Day): { year: number; week: number } {
  const thursday = addDays(day, 4 - weekdayOf(day));
  const year = Number(thursday.slice(0, 4));
  return { year, week: Math.floor(daysBetween(`${thursday.slice(0, 4)}-01-01`, thursday) / 7) + 1 };
}

/** What the codes of a line's batches of one week start with: 'WIG-2634-'. */
export function batchCodePrefix(lineCode: string, cutOn: Day): string {
  const { year, week } = isoWeekOf(cutOn);
  return `${lineCode}-${twoDigits(year % 100)}${twoDigits(week)}-`;
}

/**
 * The code of a line's next batch of a week: 'WIG-2634-2' is the second that was cut in week 34 of 2026.
 *
 * @param taken codes that exist; those of other lines and weeks do not matter
 */
export function nextBatchCode(lineCode: string, cutOn: Day, taken: Iterable<string>): string {
  const prefix = batchCodePrefix(lineCode, cutOn);
  const numbers = [...taken].filter((code) => code.startsWith(prefix)).map((code) => Number(code.slice(prefix.length)));
  return `${prefix}${Math.max(0, ...numbers) + 1}`;
}

function twoDigits(number: number): string {
  return String(number).padStart(2, '0');
}
