import type { DateOrder } from '../../../shared/contracts/reading-imports.ts';
import { isDay } from '../../../shared/domain/days.ts';
import type { ClockTime, ZoneClock } from './zone-clock.ts';

const YEAR_FIRST = /^(\d{4})[-/.](\d{1,2})[-/.](\d{1,2})/;
const YEAR_LAST = /^(\d{1,2})[-/.](\d{1,2})[-/.](\d{4}|\d{2})(?!\d)/;
const CLOCK = /^(\d{1,2}):(\d{2})(?::(\d{2})(?:\.\d+)?)?\s*([ap]m)?\s*(z|[+-]\d{2}:?\d{2})?$/i;

/** A reading without a time of day is put at noon. */
const NOON = 12 * 60;

/**
 * The instant that a cell of a file names, by the clocks given where it names no offset of its own; null where it is
 * none.
 *
 * @param text a day, or a day and a time
 * @param order how days are written where the year stands last
 */
export function readTime(text: string, order: DateOrder, clock: ZoneClock): ClockTime | null {
  const found = YEAR_FIRST.exec(text) ?? YEAR_LAST.exec(text);
  if (!found) return null;
  const day = dayFrom(found.slice(1), order);
  if (!isDay(day)) return null;
  const rest = text
    .slice(found[0].length)
    .replace(/^[T,\s]+/i, '')
    .trim();
  if (rest === '') return clock.instant(day, NOON);
  const time = CLOCK.exec(rest);
  const minutes = time ? minutesOf(time) : null;
  if (!time || minutes === null) return null;
  const offset = time[5];
  if (offset === undefined) return clock.instant(day, minutes);
  const utc = Date.parse(`${day}T00:00:00Z`) + Math.round((minutes - offsetMinutes(offset)) * 60) * 1000;
  return { at: utc, jump: null };
}

function dayFrom(parts: readonly string[], order: DateOrder): string {
  const [a = '', b = '', c = ''] = parts;
  if (a.length === 4) return `${a}-${b.padStart(2, '0')}-${c.padStart(2, '0')}`;
  const year = c.length === 2 ? `20${c}` : c;
  const [month, day] = order === 'mdy' ? [a, b] : [b, a];
  return `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`;
}

function minutesOf(clock: RegExpExecArray): number | null {
  const [, hourText, minute, second = '0', half] = clock;
  let hour = Number(hourText);
  if (half) {
    if (hour < 1 || hour > 12) return null;
    hour = (hour % 12) + (half.toLowerCase() === 'pm' ? 12 : 0);
  }
  if (hour > 23 || Number(minute) > 59 || Number(second) > 59) return null;
  return hour * 60 + Number(minute) + Number(second) / 60;
}

function offsetMinutes(offset: string): number {
  if (/^z$/i.test(offset)) return 0;
  const sign = offset.startsWith('-') ? -1 : 1;
  const digits = offset.slice(1).replace(':', '');
  return sign * (Number(digits.slice(0, 2)) * 60 + Number(digits.slice(2)));
}
