import type { RepeatRule } from '@shared/domain/repeat-rule.ts';
import { type Day, isDay, weekdayOf } from '@shared/domain/days.ts';
import { weekdayName } from '@shared/domain/repeat-words.ts';

/** How a task repeats while it is being chosen: what every way needs, whichever is chosen. */
export interface RepeatDraft {
  way: 'once' | RepeatRule['every'];
  interval: number | null;
  weekdays: number[];
  monthDay: number | null;
  week: number;
  weekday: number;
  dates: string;
}

export const WAY_CHOICES: { value: RepeatDraft['way']; title: string }[] = [
  { value: 'once', title: 'Once' },
  { value: 'days', title: 'Every so many days' },
  { value: 'weeks', title: 'By week, on weekdays' },
  { value: 'months', title: 'By month, on a date' },
  { value: 'months_on', title: 'By month, on a weekday' },
  { value: 'after_done', title: 'Days after it was done' },
  { value: 'dates', title: 'On days of a list' },
];

export const WEEK_CHOICES = [
  { value: 1, title: 'First' },
  { value: 2, title: 'Second' },
  { value: 3, title: 'Third' },
  { value: 4, title: 'Fourth' },
  { value: -1, title: 'Last' },
];

export const WEEKDAY_CHOICES = [1, 2, 3, 4, 5, 6, 7].map((value) => ({ value, title: weekdayName(value) }));

/** The draft of a rule, with likely values in what the rule leaves open. */
export function draftOf(rule: RepeatRule | null, startsOn: Day): RepeatDraft {
  const usual: RepeatDraft = {
    ...{
      way: rule?.every ?? 'once',
      interval: 1,
      weekdays: [weekdayOf(startsOn)],
      monthDay: Number(startsOn.slice(8)),
    },
    ...{ week: 1, weekday: weekdayOf(startsOn), dates: '' },
  };
  if (rule === null) return usual;
  if (rule.every === 'after_done') return { ...usual, interval: rule.days };
  if (rule.every === 'dates') return { ...usual, dates: rule.dates.join('\n') };
  return { ...usual, ...rule };
}

/** The rule as it is sent; numbers that are missing stay so, for the contract to refuse at their field. */
export function ruleOf(draft: RepeatDraft): unknown {
  const { way, interval, weekdays, monthDay, week, weekday, dates } = draft;
  switch (way) {
    case 'once':
      return null;
    case 'days':
      return { every: way, interval };
    case 'weeks':
      return { every: way, interval, weekdays: [...weekdays].sort((a, b) => a - b) };
    case 'months':
      return { every: way, interval, monthDay };
    case 'months_on':
      return { every: way, interval, week, weekday };
    case 'after_done':
      return { every: way, days: interval };
    case 'dates':
      return { every: way, dates: datesIn(dates) };
  }
}

/** Days of a list with one on each line; what is no day is kept, for the contract to refuse. */
function datesIn(text: string): string[] {
  const words = text.split(/[\s,;]+/).filter((word) => word !== '');
  return [...new Set(words)].sort((a, b) => (isDay(a) && isDay(b) ? a.localeCompare(b) : 0));
}
