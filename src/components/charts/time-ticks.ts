import { type Day, MS_PER_HOUR, addDays, dayOf, daysBetween, instantAt, startOfDay } from '@shared/domain/days.ts';
import { formatClock, formatDay, formatMonth } from '@/formatting/format-day.ts';

const STEPS_IN_HOURS = [3, 6, 12];
const STEPS_IN_DAYS = [1, 2, 7, 14, 28];
const STEPS_IN_MONTHS = [1, 2, 3, 6, 12, 24];
/** Longer stretches are told by their months. */
const MOST_DAYS_BY_DAY = 150;
const MOST_DAYS_BY_HOUR = 2;

export interface TimeTick {
  at: number;
  text: string;
}

/** Words under the time axis on the farm's clock, evenly apart and not more than `most` of them. */
export function timeTicks(from: number, to: number, most: number, timeZone: string): TimeTick[] {
  const length = daysBetween(dayOf(from, timeZone), dayOf(to, timeZone)) + 1;
  if (length > MOST_DAYS_BY_DAY) return monthTicks(from, to, most, timeZone);
  if (length <= MOST_DAYS_BY_HOUR) return hourTicks(from, to, most, timeZone);
  return dayTicks(from, to, most, timeZone, length);
}

/** Counted back from the newest day, the one that people look for. */
function dayTicks(from: number, to: number, most: number, timeZone: string, length: number): TimeTick[] {
  const step = STEPS_IN_DAYS.find((days) => length / days <= most) ?? 56;
  const ticks: TimeTick[] = [];
  for (let day = dayOf(to, timeZone); ; day = addDays(day, -step)) {
    const at = startOfDay(day, timeZone);
    if (at < from) return ticks.reverse();
    ticks.push({ at, text: formatDay(day, day) });
  }
}

function hourTicks(from: number, to: number, most: number, timeZone: string): TimeTick[] {
  const step = STEPS_IN_HOURS.find((hours) => (to - from) / (hours * MS_PER_HOUR) <= most) ?? 24;
  const ticks: TimeTick[] = [];
  for (let day = dayOf(from, timeZone); startOfDay(day, timeZone) <= to; day = addDays(day, 1)) {
    for (let hour = 0; hour < 24; hour += step) {
      const at = instantAt(day, hour * 60, timeZone);
      if (at >= from && at <= to)
        ticks.push({ at, text: hour === 0 ? formatDay(day, day) : formatClock(at, timeZone) });
    }
  }
  return ticks;
}

function monthTicks(from: number, to: number, most: number, timeZone: string): TimeTick[] {
  const firsts = firstsOfMonths(from, to, timeZone);
  const step = STEPS_IN_MONTHS.find((months) => firsts.length / months <= most) ?? 36;
  return firsts
    .filter((day) => (Number(day.slice(0, 4)) * 12 + Number(day.slice(5, 7)) - 1) % step === 0)
    .map((day) => ({ at: startOfDay(day, timeZone), text: shortMonth(day) }));
}

function firstsOfMonths(from: number, to: number, timeZone: string): Day[] {
  const days: Day[] = [];
  for (let day = monthAfter(dayOf(from, timeZone)); startOfDay(day, timeZone) <= to; day = monthAfter(day)) {
    days.push(day);
  }
  return days;
}

function monthAfter(day: Day): Day {
  const [year, month] = [Number(day.slice(0, 4)), Number(day.slice(5, 7))];
  return month === 12 ? `${year + 1}-01-01` : `${year}-${String(month + 1).padStart(2, '0')}-01`;
}

/** "Feb 2026". */
function shortMonth(day: Day): string {
  const [month = '', year = ''] = formatMonth(day.slice(0, 7)).split(' ');
  return `${month.slice(0, 3)} ${year}`;
}
