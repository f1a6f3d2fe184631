import type { Repeat } from './repeat-rule.ts';

const WEEKDAYS = ['Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday', 'Sunday'];
const WEEKS: Record<number, string> = { 1: 'first', 2: 'second', 3: 'third', 4: 'fourth', [-1]: 'last' };

/** How work repeats, in words: "every 2 weeks on Monday and Thursday". */
export function repeatWords(rule: Repeat): string {
  if (rule === null) return 'once';
  switch (rule.every) {
    case 'days':
      return every(rule.interval, 'day');
    case 'weeks':
      return rule.weekdays.length === 7 && rule.interval === 1
        ? 'every day'
        : `${every(rule.interval, 'week')} on ${listed([...rule.weekdays].sort().map(weekdayName))}`;
    case 'months':
      return `${every(rule.interval, 'month')} on the ${ordinal(rule.monthDay)}`;
    case 'months_on':
      return `${every(rule.interval, 'month')} on the ${WEEKS[rule.week] ?? ''} ${weekdayName(rule.weekday)}`;
    case 'dates':
      return rule.dates.length === 1 ? 'on one set day' : `on ${rule.dates.length} set days`;
    case 'after_done':
      return `${rule.days === 1 ? '1 day' : `${rule.days} days`} after it was done`;
  }
}

/** The name of an ISO weekday, 1 is Monday. */
export function weekdayName(weekday: number): string {
  return WEEKDAYS[weekday - 1] ?? '';
}

function every(interval: number, unit: string): string {
  return interval === 1 ? `every ${unit}` : `every ${interval} ${unit}s`;
}

function listed(words: readonly string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1) ?? ''}`;
}

function ordinal(day: number): string {
  const ending = day % 100 >= 11 && day % 100 <= 13 ? 'th' : ({ 1: 'st', 2: 'nd', 3: 'rd' }[day % 10] ?? 'th');
  return `${day}${ending}`;
}
