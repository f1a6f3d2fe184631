import { DomainError } from '../errors.ts';
import { addDays, type Day, daysBetween, monthBounds, monthOf, weekdayOf } from './days.ts';

/**
 * How work comes due again, on the farm's days. `days`, `weeks` and `months` are counted from the day that the work
 * starts on; `after_done` from the day that it was last done. Days are calendar days, so clock changes move nothing.
 */
export type RepeatRule =
  | { every: 'days'; interval: number }
  /** `weekdays` as ISO numbers: 1 is Monday. Weeks begin on Monday. */
  | { every: 'weeks'; interval: number; weekdays: number[] }
  /** A day that a month lacks falls on its last one. */
  | { every: 'months'; interval: number; monthDay: number }
  /** Such as the first Monday (1) or the last Friday (-1) of a month. */
  | { every: 'months_on'; interval: number; week: number; weekday: number }
  | { every: 'dates'; dates: Day[] }
  | { every: 'after_done'; days: number };

/** Work that never repeats has no rule. */
export type Repeat = RepeatRule | null;

/**
 * The first day on which work is due.
 *
 * @param startsOn the earliest day; the day itself where the rule lets it be one
 * @returns null where a list of dates holds none from then on
 * @throws {DomainError} `domain.out_of_range` for a rule that names no days
 */
export function firstDue(rule: Repeat, startsOn: Day): Day | null {
  if (rule === null || rule.every === 'after_done') return startsOn;
  return nextDue(rule, startsOn, addDays(startsOn, -1));
}

/**
 * The next day on which work is due, later than a day.
 *
 * @param startsOn where the counting begins
 * @param after for `after_done` the day that it was done; else nothing up to this day counts
 * @returns null where nothing more comes
 * @throws {DomainError} `domain.out_of_range` for a rule that names no days
 */
export function nextDue(rule: Repeat, startsOn: Day, after: Day): Day | null {
  if (rule === null) return null;
  switch (rule.every) {
    case 'days':
      return inDays(counted(rule.interval), startsOn, after);
    case 'weeks':
      return inWeeks(counted(rule.interval), weekdaysOf(rule.weekdays), startsOn, after);
    case 'months':
      return inMonths(counted(rule.interval), startsOn, after, (month) => dayOfMonth(month, rule.monthDay));
    case 'months_on':
      return inMonths(counted(rule.interval), startsOn, after, (month) => weekdayOfMonth(month, rule));
    case 'dates':
      return [...rule.dates].sort().find((date) => date > after && date >= startsOn) ?? null;
    case 'after_done':
      return addDays(after, counted(rule.days));
  }
}

/**
 * The next day after work was done or skipped. What was done late is not asked for again for the days in between, and
 * what was done early is not asked for on the day that it was meant for.
 */
export function dueAfter(rule: Repeat, startsOn: Day, dueOn: Day, settledOn: Day): Day | null {
  if (rule?.every === 'after_done') return nextDue(rule, startsOn, settledOn);
  return nextDue(rule, startsOn, dueOn > settledOn ? dueOn : settledOn);
}

/** How many days before its day work may count as done: less than half of the time between two, three at most. */
export function mayBeDoneEarly(rule: Repeat): number {
  if (rule === null || rule.every === 'dates') return 0;
  const between = { days: 1, weeks: 7, months: 28, months_on: 28, after_done: 1 }[rule.every];
  const most = rule.every === 'after_done' ? rule.days : between * rule.interval;
  const apart = rule.every === 'weeks' ? most / Math.max(1, rule.weekdays.length) : most;
  return Math.min(3, Math.floor((apart - 1) / 2));
}

function inDays(interval: number, startsOn: Day, after: Day): Day {
  const passed = daysBetween(startsOn, after);
  const steps = passed < 0 ? 0 : Math.floor(passed / interval) + 1;
  return addDays(startsOn, steps * interval);
}

function inWeeks(interval: number, weekdays: readonly number[], startsOn: Day, after: Day): Day {
  const firstMonday = mondayOf(startsOn);
  const from = after < startsOn ? startsOn : addDays(after, 1);
  const weeks = Math.floor(daysBetween(firstMonday, from) / 7 / interval) * interval;
  // The days left in this turn's week, or those of the next turn.
  for (const turn of [weeks, weeks + interval]) {
    const monday = addDays(firstMonday, turn * 7);
    const found = weekdays.map((weekday) => addDays(monday, weekday - 1)).find((day) => day >= from);
    if (found !== undefined) return found;
  }
  throw new DomainError('domain.out_of_range', 'Choose one weekday at least.');
}

function inMonths(interval: number, startsOn: Day, after: Day, dayIn: (month: string) => Day): Day {
  const first = monthNumber(startsOn);
  const from = after < startsOn ? startsOn : addDays(after, 1);
  const passed = Math.floor((monthNumber(from) - first) / interval) * interval;
  const found = [0, 1, 2].map((turn) => dayIn(monthNamed(first + passed + turn * interval))).find((day) => day >= from);
  if (found === undefined) throw new DomainError('domain.out_of_range', 'Choose a day of the month.');
  return found;
}

function dayOfMonth(month: string, monthDay: number): Day {
  const { from, to } = monthBounds(month);
  const length = daysBetween(from, to);
  return addDays(from, Math.min(Math.max(1, monthDay), length) - 1);
}

function weekdayOfMonth(month: string, { week, weekday }: { week: number; weekday: number }): Day {
  const { from, to } = monthBounds(month);
  const last = addDays(to, -1);
  if (week < 0) return addDays(last, -((weekdayOf(last) - weekday + 7) % 7));
  return addDays(from, ((weekday - weekdayOf(from) + 7) % 7) + (week - 1) * 7);
}

function mondayOf(day: Day): Day {
  return addDays(day, 1 - weekdayOf(day));
}

function monthNumber(day: Day): number {
  const [year = '', month = ''] = monthOf(day).split('-');
  return Number(year) * 12 + Number(month) - 1;
}

function monthNamed(number: number): string {
  const year = String(Math.floor(number / 12)).padStart(4, '0');
  return `${year}-${String((number % 12) + 1).padStart(2, '0')}`;
}

function counted(interval: number): number {
  if (Number.isInteger(interval) && interval >= 1) return interval;
  throw new DomainError('domain.out_of_range', 'Work repeats after one day, week or month at least.');
}

function weekdaysOf(weekdays: readonly number[]): number[] {
  return weekdays.filter((weekday) => weekday >= 1 && weekday <= 7).sort((a, b) => a - b);
}
