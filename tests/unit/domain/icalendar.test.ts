import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addDays,
  type Day,
  daysBetween,
  eachDay,
  monthBounds,
  monthOf,
  weekdayOf,
} from '../../../shared/domain/days.ts';
import { calendarText, escapedText, folded, recurrenceOf } from '../../../shared/domain/icalendar.ts';
import { firstDue, nextDue, type RepeatRule } from '../../../shared/domain/repeat-rule.ts';

/** RFC 5545, Internet Calendaring and Scheduling Core Object Specification; its examples are written down from memory. */

const octets = (text: string) => Buffer.byteLength(text, 'utf8');

/** Joins folded lines as section 3.1 says: a line break and the blank after it go. */
function unfolded(text: string): string[] {
  return text.replaceAll(/\r\n[ \t]/g, '').split('\r\n');
}

function series(rule: RepeatRule, startsOn: Day, count: number): Day[] {
  const days: Day[] = [];
  for (let day = firstDue(rule, startsOn); day !== null && days.length < count; day = nextDue(rule, startsOn, day))
    days.push(day);
  return days;
}

describe('content lines (RFC 5545, section 3.1)', () => {
  it('when a line is long, each piece has 75 octets at most and unfolding gives it back', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme', maxLength: 400 }), (text) => {
        const line = `SUMMARY:${escapedText(text)}`;
        const pieces = folded(line).split('\r\n');
        expect(pieces.every((piece) => octets(piece) <= 75)).toBe(true);
        expect(pieces.slice(1).every((piece) => piece.startsWith(' '))).toBe(true);
        expect(unfolded(folded(line))).toEqual([line]);
      }),
    );
  });

  it('when a line has 75 octets, it stays whole; one more breaks it', () => {
    expect(folded('x'.repeat(75))).toBe('x'.repeat(75));
    expect(folded('x'.repeat(76))).toBe(`${'x'.repeat(75)}\r\n x`);
  });

  it('when a character of several octets stands at the edge, it is not torn apart', () => {
    expect(folded(`${'x'.repeat(74)}°`)).toBe(`${'x'.repeat(74)}\r\n °`);
  });

  it('every line of a calendar ends in CRLF and none holds a bare break', () => {
    const text = calendarText('Tasks, all', [
      { uid: 'a', stamp: 0, summary: 'One\nTwo', description: 'x'.repeat(200), when: { day: '2026-03-02' } },
    ]);

    expect(text.endsWith('END:VCALENDAR\r\n')).toBe(true);
    expect(text.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
  });
});

describe('text values (RFC 5545, section 3.3.11)', () => {
  it('the example of the section is written as it stands there', () => {
    expect(escapedText('Project XYZ Final Review\nConference Room - 3B\nCome Prepared.')).toBe(
      'Project XYZ Final Review\\nConference Room - 3B\\nCome Prepared.',
    );
  });

  it.each([
    ['lime; vinegar, salt', 'lime\\; vinegar\\, salt'],
    ['C:\\tank', 'C:\\\\tank'],
    ['one\r\ntwo\rthree', 'one\\ntwo\\nthree'],
    ['a\u0000b\u0007', 'ab'],
  ])('%j', (text, escaped) => {
    expect(escapedText(text)).toBe(escaped);
  });
});

describe('events (RFC 5545, section 3.6.1)', () => {
  const event = { uid: 'task-1@farm', stamp: Date.parse('2007-04-23T12:34:32Z'), summary: 'Our Blissful Anniversary' };

  it('a whole day is a DATE without a zone and does not block the day', () => {
    const lines = unfolded(calendarText('Tasks', [{ ...event, when: { day: '1997-11-02' } }]));

    const from = lines.indexOf('BEGIN:VEVENT');
    expect(lines.slice(from, lines.indexOf('END:VEVENT') + 1)).toEqual([
      'BEGIN:VEVENT',
      'UID:task-1@farm',
      'DTSTAMP:20070423T123432Z',
      'DTSTART;VALUE=DATE:19971102',
      'SUMMARY:Our Blissful Anniversary',
      'TRANSP:TRANSPARENT',
      'END:VEVENT',
    ]);
  });

  it('a time is written in UTC with its length, and what must stand once stands once', () => {
    const at = Date.parse('2026-03-29T08:30:00Z');
    const lines = unfolded(
      calendarText('Tasks', [{ ...event, when: { at, minutes: 30 }, url: 'https://x.example/t' }]),
    );

    expect(lines).toContain('DTSTART:20260329T083000Z');
    expect(lines).toContain('DURATION:PT30M');
    for (const once of ['VERSION:2.0', 'PRODID:-//Limestead//Farm tasks//EN', 'UID:task-1@farm'])
      expect(lines.filter((line) => line === once)).toHaveLength(1);
  });
});

describe('recurrence (RFC 5545, sections 3.3.10 and 3.8.5.3)', () => {
  it.each<[string, RepeatRule, string, Day, Day[]]>([
    [
      'every 10 days',
      { every: 'days', interval: 10 },
      'FREQ=DAILY;INTERVAL=10',
      '1997-09-02',
      ['1997-09-02', '1997-09-12', '1997-09-22', '1997-10-02', '1997-10-12'],
    ],
    [
      'every other week on Monday, Wednesday and Friday',
      { every: 'weeks', interval: 2, weekdays: [1, 3, 5] },
      'FREQ=WEEKLY;INTERVAL=2;BYDAY=MO,WE,FR;WKST=MO',
      '1997-09-01',
      ['1997-09-01', '1997-09-03', '1997-09-05', '1997-09-15', '1997-09-17', '1997-09-19', '1997-09-29'],
    ],
    [
      'every other week on Tuesday and Sunday, weeks beginning on Monday',
      { every: 'weeks', interval: 2, weekdays: [2, 7] },
      'FREQ=WEEKLY;INTERVAL=2;BYDAY=TU,SU;WKST=MO',
      '1997-08-05',
      ['1997-08-05', '1997-08-10', '1997-08-19', '1997-08-24'],
    ],
    [
      'monthly on the first Friday',
      { every: 'months_on', interval: 1, week: 1, weekday: 5 },
      'FREQ=MONTHLY;INTERVAL=1;BYDAY=1FR',
      '1997-09-05',
      ['1997-09-05', '1997-10-03', '1997-11-07', '1997-12-05', '1998-01-02', '1998-02-06'],
    ],
  ])('the example "%s"', (_name, rule, text, startsOn, days) => {
    expect(recurrenceOf(rule)).toBe(text);
    expect(series(rule, startsOn, days.length)).toEqual(days);
  });

  it('when days are listed or counted from the last time, no rule can say it', () => {
    expect(recurrenceOf({ every: 'dates', dates: ['2026-03-02'] })).toBeNull();
    expect(recurrenceOf({ every: 'after_done', days: 14 })).toBeNull();
  });

  it('the text names the same days as the rule it is made from', () => {
    const interval = fc.integer({ min: 1, max: 3 });
    const weekday = fc.integer({ min: 1, max: 7 });
    const rule: fc.Arbitrary<RepeatRule> = fc.oneof(
      fc.record({ every: fc.constant('days' as const), interval }),
      fc.record({
        every: fc.constant('weeks' as const),
        interval,
        weekdays: fc.uniqueArray(weekday, { minLength: 1, maxLength: 7 }),
      }),
      fc.record({ every: fc.constant('months' as const), interval, monthDay: fc.integer({ min: 1, max: 31 }) }),
      fc.record({ every: fc.constant('months_on' as const), interval, week: fc.constantFrom(1, 2, 3, 4, -1), weekday }),
    );
    const start = fc.integer({ min: 0, max: 1500 }).map((count) => addDays('2024-01-01', count));
    fc.assert(
      fc.property(rule, start, (each, from) => {
        // Calendars count from the first event, which is one of the rule's own days.
        const first = firstDue(each, from) ?? from;
        const until = addDays(first, 220);
        const named = eachDay(first, until).filter((day) => namedBy(recurrenceOf(each) ?? '', first, day));
        expect(series(each, from, 230).filter((day) => day <= until)).toEqual(named);
      }),
      { numRuns: 40 },
    );
  });
});

/** Whether a rule names a day: section 3.3.10 read day by day, for the parts that are written here. */
function namedBy(text: string, start: Day, day: Day): boolean {
  const parts = new Map(text.split(';').map((part) => part.split('=') as [string, string]));
  const every = Number(parts.get('INTERVAL'));
  const codes = ['MO', 'TU', 'WE', 'TH', 'FR', 'SA', 'SU'];
  const monthsOf = (each: Day) => Number(each.slice(0, 4)) * 12 + Number(each.slice(5, 7));
  if (parts.get('FREQ') === 'DAILY') return daysBetween(start, day) % every === 0;
  if (parts.get('FREQ') === 'WEEKLY') {
    const monday = (each: Day) => addDays(each, 1 - weekdayOf(each));
    const turn = daysBetween(monday(start), monday(day)) / 7;
    return turn % every === 0 && (parts.get('BYDAY') ?? '').split(',').includes(codes[weekdayOf(day) - 1] ?? '');
  }
  if ((monthsOf(day) - monthsOf(start)) % every !== 0) return false;
  const { from, to } = monthBounds(monthOf(day));
  const month = eachDay(from, addDays(to, -1));
  if (parts.has('BYMONTHDAY')) {
    const wanted = (parts.get('BYMONTHDAY') ?? '').split(',').map(Number);
    const fitting = month.filter((each) => wanted.includes(Number(each.slice(8))));
    return (parts.has('BYSETPOS') ? fitting.slice(Number(parts.get('BYSETPOS'))) : fitting).includes(day);
  }
  const [, week = '', code = ''] = /^(-?\d+)([A-Z]{2})$/.exec(parts.get('BYDAY') ?? '') ?? [];
  const same = month.filter((each) => codes[weekdayOf(each) - 1] === code);
  return same.at(Number(week) > 0 ? Number(week) - 1 : Number(week)) === day;
}
