import { type Day, dayOf, daysBetween } from '@shared/domain/days.ts';

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const LONG_MONTHS = [
  ...['January', 'February', 'March', 'April', 'May', 'June'],
  ...['July', 'August', 'September', 'October', 'November', 'December'],
];
const DAYS_OF_A_NEAR_WEEK = 6;

/** "12 Mar 2026", or "12 Mar" when it is in the year of `today`. */
export function formatDay(day: Day, today?: Day): string {
  const [year = '', month = '', date = ''] = day.split('-');
  const short = `${String(Number(date))} ${MONTHS[Number(month) - 1] ?? ''}`;
  return today?.startsWith(`${year}-`) ? short : `${short} ${year}`;
}

/** "Tuesday, 1 December": for the head of a page. */
export function formatLongDay(day: Day): string {
  const [, month = '', date = ''] = day.split('-');
  return `${weekdayName(day)}, ${String(Number(date))} ${LONG_MONTHS[Number(month) - 1] ?? ''}`;
}

/** "February 2026", from 'YYYY-MM'. */
export function formatMonth(month: string): string {
  const [year = '', number = ''] = month.split('-');
  return `${LONG_MONTHS[Number(number) - 1] ?? ''} ${year}`.trim();
}

/** "today", "tomorrow", "Thursday", else the day: how people name days near them. */
export function nearDay(day: Day, today: Day): string {
  const away = daysBetween(today, day);
  if (away === 0) return 'today';
  if (away === 1) return 'tomorrow';
  if (away === -1) return 'yesterday';
  return away > 1 && away <= DAYS_OF_A_NEAR_WEEK ? weekdayName(day) : formatDay(day, today);
}

/** Hours and minutes on the clock of the farm. */
export function formatClock(instant: number, timeZone: string): string {
  return new Intl.DateTimeFormat('en-GB', { timeZone, hour: '2-digit', minute: '2-digit' }).format(instant);
}

/** "12 Mar, 14:20" in the farm's zone; the year where it isn't the one of `now`. */
export function formatInstant(instant: number, timeZone: string, now?: number): string {
  const today = now === undefined ? undefined : dayOf(now, timeZone);
  return `${formatDay(dayOf(instant, timeZone), today)}, ${formatClock(instant, timeZone)}`;
}

function weekdayName(day: Day): string {
  return new Intl.DateTimeFormat('en', { weekday: 'long', timeZone: 'UTC' }).format(Date.parse(`${day}T00:00:00Z`));
}
