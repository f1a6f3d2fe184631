import { describe, expect, it } from 'vitest';
import { formatClock, formatDay, formatInstant, formatLongDay, nearDay } from '../../../src/formatting/format-day.ts';
import { formatMinutes } from '../../../src/formatting/format-duration.ts';
import { formatMicro, formatMoney } from '../../../src/formatting/format-money.ts';
import {
  decimalsForError,
  formatFigures,
  formatNumber,
  formatWithError,
} from '../../../src/formatting/format-number.ts';
import { formatQuantity } from '../../../src/formatting/format-quantity.ts';
import { joinWords, plural } from '../../../src/formatting/plural.ts';

describe('numbers', () => {
  it('groups thousands and writes a real minus', () => {
    expect(formatNumber(-1204.5, { decimals: 1 })).toBe('−1,204.5');
  });

  it.each([
    [0.09, 2],
    [0.14, 2],
    [0.096, 2],
    [1.4, 1],
    [3, 0],
    [25, 0],
    [0, 0],
    [Number.NaN, 0],
  ])('an error of %d allows %d decimals', (error, decimals) => {
    expect(decimalsForError(error)).toBe(decimals);
  });

  it('a value ends at the decimal of its error', () => {
    expect(formatWithError(1.2345, 0.0912)).toEqual({ value: '1.23', error: '0.09' });
  });

  it.each([
    [0.01432, '0.0143'],
    [1234.4, '1,234'],
    [0, '0'],
    [Number.POSITIVE_INFINITY, '—'],
  ])('%d is shown with three figures as %s', (value, text) => {
    expect(formatFigures(value)).toBe(text);
  });
});

describe('quantities', () => {
  it('a stored alkalinity is shown in dKH with its error', () => {
    // 1 meq/L is 2.80385 dKH (20 / 56.077).
    expect(formatQuantity('alkalinity', 'dKH', 2.92, { error: 0.06 })).toBe('8.19 ± 0.17\u2009dKH');
  });

  it('a change of temperature in °F leaves the offset out', () => {
    expect(formatQuantity('temperature', 'F', 1, { difference: true, signed: true })).toBe('+1.8\u2009°F');
  });

  it('a change of salinity in mS/cm is told as it is in seawater', () => {
    // gsw 3.6.16 at 25 °C: S 35 conducts 53.07103 and S 36 conducts 54.41563 mS/cm.
    expect(formatQuantity('salinity', 'mS/cm', 1, { difference: true, decimals: 2 })).toBe('1.34\u2009mS/cm');
  });

  it('nothing is shown as a dash', () => {
    expect(formatQuantity('volume', 'L', null)).toBe('—');
  });
});

describe('money', () => {
  it.each([
    [120450, 'EUR', '1,204.50\u2009EUR'],
    [1204, 'JPY', '1,204\u2009JPY'],
    [1204, 'KWD', '1.204\u2009KWD'],
    [null, 'EUR', '—'],
  ])('%s minor units of %s are %s', (minor, currency, text) => {
    expect(formatMoney(minor, currency)).toBe(text);
  });

  it('a cost below two minor units keeps two figures', () => {
    expect(formatMicro(60_000, 'EUR')).toBe('0.06');
    expect(formatMicro(430, 'EUR')).toBe('0.00043');
    expect(formatMicro(0, 'EUR')).toBe('0.00');
    expect(formatMicro(14_000, 'EUR')).toBe('0.014');
    expect(formatMicro(4_610_000, 'EUR')).toBe('4.61');
  });
});

describe('days', () => {
  it('leaves out the year of today only', () => {
    expect(formatDay('2026-03-12', '2026-12-01')).toBe('12 Mar');
    expect(formatDay('2025-03-12', '2026-12-01')).toBe('12 Mar 2025');
  });

  it('names the day at the head of a page', () => {
    expect(formatLongDay('2026-12-01')).toBe('Tuesday, 1 December');
  });

  it.each([
    ['2026-12-01', 'today'],
    ['2026-12-02', 'tomorrow'],
    ['2026-11-30', 'yesterday'],
    ['2026-12-03', 'Thursday'],
    ['2026-12-08', '8 Dec'],
    ['2026-11-28', '28 Nov'],
  ])('%s is called %s', (day, words) => {
    expect(nearDay(day, '2026-12-01')).toBe(words);
  });

  it('shows instants on the clock of the farm, across midnight', () => {
    const instant = Date.parse('2026-07-01T23:30:00Z');

    expect(formatClock(instant, 'Europe/Lisbon')).toBe('00:30');
    expect(formatInstant(instant, 'Europe/Lisbon', instant)).toBe('2 Jul, 00:30');
  });
});

describe('words', () => {
  it('counts in the plural but for one', () => {
    expect([plural(1, 'frag'), plural(0, 'frag'), plural(1412, 'batch', 'batches')]).toEqual([
      '1 frag',
      '0 frags',
      '1,412 batches',
    ]);
  });

  it.each([
    [40, '40 minutes'],
    [60, '1 hour'],
    [90, '90 minutes'],
    [150, '2 hours and 30 minutes'],
    [720, '12 hours'],
  ])('says a span of %i minutes as %s', (minutes, words) => {
    expect(formatMinutes(minutes)).toBe(words);
  });

  it('joins with commas and a last and', () => {
    expect([joinWords([]), joinWords(['a']), joinWords(['a', 'b', 'c'])]).toEqual(['', 'a', 'a, b and c']);
  });
});
