import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addDays,
  dayOf,
  daysBetween,
  eachDay,
  isDay,
  monthBounds,
  monthOf,
  MS_PER_HOUR,
  startOfDay,
  weekdayOf,
} from '../../../shared/domain/days.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const at = (iso: string) => Date.parse(iso);
const zones = [
  ...['UTC', 'Europe/Lisbon', 'America/Los_Angeles', 'Australia/Lord_Howe', 'Asia/Kathmandu', 'Pacific/Kiritimati'],
  ...['Pacific/Pago_Pago', 'America/Sao_Paulo', 'America/Havana', 'America/St_Johns', 'Asia/Beirut'],
];
const someDay = fc.integer({ min: 0, max: 25_000 }).map((count) => addDays('1990-01-01', count));

describe('the day of an instant', () => {
  it.each([
    ['2026-03-01T23:30:00Z', 'UTC', '2026-03-01'],
    ['2026-03-01T23:30:00Z', 'Europe/Berlin', '2026-03-02'],
    ['2026-03-01T06:30:00Z', 'America/Los_Angeles', '2026-02-28'],
    ['2026-03-01T10:30:00Z', 'Pacific/Kiritimati', '2026-03-02'],
    ['2028-02-29T12:00:00Z', 'UTC', '2028-02-29'],
    ['1969-12-31T23:59:59.999Z', 'UTC', '1969-12-31'],
  ])('when it is %s in %s, is %s', (instant, zone, day) => {
    expect(dayOf(at(instant), zone)).toBe(day);
  });

  it('when the zone is unknown, says to choose one', () => {
    expect(domainErrorOf(() => dayOf(0, 'Mars/Olympus')).code).toBe('input.invalid');
  });
});

describe('the start of a day', () => {
  it.each([
    ['2026-03-29', 'Europe/Berlin', '2026-03-28T23:00:00Z', 'clocks go forward later that day'],
    ['2026-03-30', 'Europe/Berlin', '2026-03-29T22:00:00Z', 'the day after'],
    ['2026-10-26', 'Europe/Berlin', '2026-10-25T23:00:00Z', 'the day after clocks went back'],
    ['2018-11-04', 'America/Sao_Paulo', '2018-11-04T03:00:00Z', 'midnight is skipped'],
    ['2026-11-01', 'America/Havana', '2026-11-01T04:00:00Z', 'midnight comes twice: the first counts'],
    ['2011-12-31', 'Pacific/Apia', '2011-12-30T10:00:00Z', 'after a day that never was'],
    ['2011-12-30', 'Pacific/Apia', '2011-12-30T10:00:00Z', 'a day that never was'],
  ])('%s in %s is %s (%s)', (day, zone, instant) => {
    expect(new Date(startOfDay(day, zone)).toISOString()).toBe(new Date(instant).toISOString());
  });

  it('is the first instant of its own day in every zone', () => {
    fc.assert(
      fc.property(someDay, fc.constantFrom(...zones), (day, zone) => {
        const start = startOfDay(day, zone);
        expect(dayOf(start, zone)).toBe(day);
        expect(dayOf(start - 1, zone) < day).toBe(true);
      }),
    );
  });

  it('leaves 23, 24 or 25 hours to a day, more or less half an hour', () => {
    fc.assert(
      fc.property(someDay, fc.constantFrom(...zones), (day, zone) => {
        const hours = (startOfDay(addDays(day, 1), zone) - startOfDay(day, zone)) / MS_PER_HOUR;
        expect(hours).toBeGreaterThanOrEqual(22.9);
        expect(hours).toBeLessThanOrEqual(25.1);
      }),
    );
  });
});

describe('counting days', () => {
  it.each([
    ['2026-02-28', 1, '2026-03-01'],
    ['2028-02-28', 1, '2028-02-29'],
    ['2026-01-01', -1, '2025-12-31'],
    ['2026-03-29', 0, '2026-03-29'],
  ])('%s and %i days is %s', (day, count, result) => {
    expect(addDays(day, count)).toBe(result);
  });

  it('adds and takes apart to the same number', () => {
    fc.assert(
      fc.property(someDay, fc.integer({ min: -9000, max: 9000 }), (day, count) => {
        expect(daysBetween(day, addDays(day, count))).toBe(count);
      }),
    );
  });

  it('lists every day with both ends, and none when the end is earlier', () => {
    expect(eachDay('2026-02-27', '2026-03-02')).toEqual(['2026-02-27', '2026-02-28', '2026-03-01', '2026-03-02']);
    expect(eachDay('2026-03-02', '2026-03-02')).toEqual(['2026-03-02']);
    expect(eachDay('2026-03-02', '2026-03-01')).toEqual([]);
  });

  it.each([
    ['half a day', () => addDays('2026-01-01', 0.5), 'input.invalid'],
    ['the year 10000', () => addDays('9999-12-31', 1), 'domain.out_of_range'],
    ['30 February', () => addDays('2026-02-30', 1), 'input.invalid'],
  ])('refuses %s', (_, act, code) => {
    expect(domainErrorOf(act).code).toBe(code);
  });

  // ISO 8601 weekdays.
  it.each([
    ['2024-12-30', 1],
    ['2026-01-01', 4],
    ['2021-01-03', 7],
    ['2028-02-29', 2],
  ])('%s is ISO weekday %i', (day, weekday) => {
    expect(weekdayOf(day)).toBe(weekday);
  });

  it('knows the month of a day and where it ends', () => {
    expect(monthOf('2026-12-31')).toBe('2026-12');
    expect(monthBounds('2026-12')).toEqual({ from: '2026-12-01', to: '2027-01-01' });
    expect(monthBounds('2028-02')).toEqual({ from: '2028-02-01', to: '2028-03-01' });
  });
});

describe('what is a day', () => {
  it.each(['2026-01-01', '2028-02-29', '9999-12-31', '0001-01-01'])('takes %s', (text) => {
    expect(isDay(text)).toBe(true);
  });

  it.each(['', '2026-1-1', '2026-02-29', '2026-13-01', '2026-00-10', '2026-01-01T00:00', '0000-01-01', 'today'])(
    'refuses "%s"',
    (text) => {
      expect(isDay(text)).toBe(false);
    },
  );
});
