import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { addDays, type Day, daysBetween, eachDay, weekdayOf } from '../../../shared/domain/days.ts';
import {
  dueAfter,
  firstDue,
  mayBeDoneEarly,
  nextDue,
  type Repeat,
  type RepeatRule,
} from '../../../shared/domain/repeat-rule.ts';
import { repeatWords } from '../../../shared/domain/repeat-words.ts';
import { DomainError } from '../../../shared/errors.ts';

const START: Day = '2026-01-30'; // a Friday

const day = fc.integer({ min: 0, max: 4000 }).map((count) => addDays('2024-01-01', count));
const interval = fc.integer({ min: 1, max: 9 });
const weekday = fc.integer({ min: 1, max: 7 });
const countedRule: fc.Arbitrary<RepeatRule> = fc.oneof(
  fc.record({ every: fc.constant('days' as const), interval }),
  fc.record({
    every: fc.constant('weeks' as const),
    interval,
    weekdays: fc.uniqueArray(weekday, { minLength: 1, maxLength: 7 }),
  }),
  fc.record({ every: fc.constant('months' as const), interval, monthDay: fc.integer({ min: 1, max: 31 }) }),
  fc.record({ every: fc.constant('months_on' as const), interval, week: fc.constantFrom(1, 2, 3, 4, -1), weekday }),
);

/** The first `count` days of a rule, found one after another. */
function series(rule: Repeat, startsOn: Day, count: number): Day[] {
  const days: Day[] = [];
  for (let next = firstDue(rule, startsOn); next !== null && days.length < count; next = nextDue(rule, startsOn, next))
    days.push(next);
  return days;
}

describe('days on which work comes due', () => {
  it.each<[string, Repeat, Day[]]>([
    ['every 3 days', { every: 'days', interval: 3 }, ['2026-01-30', '2026-02-02', '2026-02-05']],
    [
      'every 2 weeks on Monday and Friday',
      { every: 'weeks', interval: 2, weekdays: [5, 1] },
      ['2026-01-30', '2026-02-09', '2026-02-13', '2026-02-23'],
    ],
    [
      'every month on the 31st',
      { every: 'months', interval: 1, monthDay: 31 },
      ['2026-01-31', '2026-02-28', '2026-03-31', '2026-04-30'],
    ],
    [
      'every 3 months on the first Monday',
      { every: 'months_on', interval: 3, week: 1, weekday: 1 },
      ['2026-04-06', '2026-07-06', '2026-10-05'],
    ],
    [
      'every month on the last Friday',
      { every: 'months_on', interval: 1, week: -1, weekday: 5 },
      ['2026-01-30', '2026-02-27', '2026-03-27'],
    ],
    ['on 2 set days', { every: 'dates', dates: ['2026-05-01', '2026-02-14'] }, ['2026-02-14', '2026-05-01']],
    ['once', null, ['2026-01-30']],
  ])('%s', (words, rule, days) => {
    expect(series(rule, START, days.length + (rule === null || rule.every === 'dates' ? 1 : 0))).toEqual(days);
    expect(repeatWords(rule)).toBe(words);
  });

  it('when a year has 29 February, the last day of that month is it', () => {
    expect(nextDue({ every: 'months', interval: 1, monthDay: 30 }, '2028-01-30', '2028-01-30')).toBe('2028-02-29');
  });

  it('when clocks change, no day is lost or doubled', () => {
    expect(series({ every: 'days', interval: 1 }, '2026-03-28', 4)).toEqual(eachDay('2026-03-28', '2026-03-31'));
    expect(series({ every: 'days', interval: 1 }, '2026-10-24', 4)).toEqual(eachDay('2026-10-24', '2026-10-27'));
  });

  it('the next day is always later, never before the start, and nothing lies between', () => {
    fc.assert(
      fc.property(countedRule, day, day, (rule, startsOn, after) => {
        const next = nextDue(rule, startsOn, after);
        expect(next !== null && next > after && next >= startsOn).toBe(true);
        // What comes after any day before it is it as well: none was jumped over.
        if (next !== null && addDays(next, -1) >= after) {
          expect(nextDue(rule, startsOn, addDays(next, -1))).toBe(next);
        }
      }),
    );
  });

  it('the days of a rule do not depend on the day from which they are looked for', () => {
    fc.assert(
      fc.property(countedRule, day, fc.integer({ min: 0, max: 400 }), (rule, startsOn, ahead) => {
        const after = addDays(startsOn, ahead);
        const walked = series(rule, startsOn, 420).find((each) => each > after);
        expect(nextDue(rule, startsOn, after)).toBe(walked);
      }),
      { numRuns: 60 },
    );
  });

  it('weeks hold to their weekdays and to their turn', () => {
    fc.assert(
      fc.property(interval, fc.uniqueArray(weekday, { minLength: 1 }), day, (weeks, weekdays, startsOn) => {
        const monday = addDays(startsOn, 1 - weekdayOf(startsOn));
        for (const each of series({ every: 'weeks', interval: weeks, weekdays }, startsOn, 12)) {
          expect(weekdays).toContain(weekdayOf(each));
          expect(Math.floor(daysBetween(monday, each) / 7) % weeks).toBe(0);
        }
      }),
    );
  });

  it.each<RepeatRule>([
    { every: 'days', interval: 0 },
    { every: 'weeks', interval: 1.5, weekdays: [1] },
    { every: 'weeks', interval: 1, weekdays: [] },
    { every: 'months', interval: -1, monthDay: 1 },
    { every: 'after_done', days: 0 },
  ])('when a rule names no days, it is refused: %o', (rule) => {
    expect(() => nextDue(rule, START, START)).toThrow(DomainError);
  });
});

describe('the day after work was settled', () => {
  const weekly: RepeatRule = { every: 'weeks', interval: 1, weekdays: [1] };

  it('when done late, the days in between are not asked for', () => {
    expect(dueAfter({ every: 'days', interval: 1 }, START, '2026-02-01', '2026-02-10')).toBe('2026-02-11');
  });

  it('when done early, the day that it was meant for is settled too', () => {
    expect(dueAfter(weekly, START, '2026-02-02', '2026-01-31')).toBe('2026-02-09');
  });

  it('when counted from the day it was done, it moves with it', () => {
    expect(dueAfter({ every: 'after_done', days: 14 }, START, '2026-02-02', '2026-02-05')).toBe('2026-02-19');
  });

  it('when it does not repeat, nothing more comes', () => {
    expect(dueAfter(null, START, START, START)).toBeNull();
  });

  it('each settling moves the due day on', () => {
    fc.assert(
      fc.property(countedRule, day, day, (rule, startsOn, settledOn) => {
        const due = firstDue(rule, startsOn) ?? startsOn;
        const next = dueAfter(rule, startsOn, due, settledOn);
        expect(next !== null && next > due && next > settledOn).toBe(true);
      }),
    );
  });

  it.each<[Repeat, number]>([
    [null, 0],
    [{ every: 'days', interval: 1 }, 0],
    [{ every: 'days', interval: 3 }, 1],
    [{ every: 'weeks', interval: 1, weekdays: [1] }, 3],
    [{ every: 'weeks', interval: 1, weekdays: [1, 3, 5] }, 0],
    [{ every: 'months', interval: 1, monthDay: 1 }, 3],
    [{ every: 'after_done', days: 2 }, 0],
  ])('how early it may count follows from how often it comes: %o', (rule, days) => {
    expect(mayBeDoneEarly(rule)).toBe(days);
  });
});
