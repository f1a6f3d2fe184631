import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { amountBetween, expandRate, type DosingRate } from '../../../shared/domain/dosing-rates.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const LISBON = 'Europe/Lisbon';
const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const at = (text: string) => Date.parse(text);
const allDay = (from: string, to: string | null = null): DosingRate => ({
  ...{ from: at(from), to: to === null ? null : at(to), amountPerDay: 48, window: null },
});
const night = { startMinute: 22 * 60, endMinute: 6 * 60 };

describe('a dose all day', () => {
  it('gives its amount a day, whatever is asked about', () => {
    const rate = allDay('2026-02-01T00:00:00Z');
    expect(amountBetween(rate, at('2026-02-03T10:00:00Z'), at('2026-02-04T10:00:00Z'), LISBON)).toBeCloseTo(48, 9);
    expect(amountBetween(rate, at('2026-02-03T10:00:00Z'), at('2026-02-03T11:00:00Z'), LISBON)).toBeCloseTo(2, 9);
  });

  it('gives nothing before it began and after it ended', () => {
    const rate = allDay('2026-02-01T12:00:00Z', '2026-02-02T00:00:00Z');
    expect(amountBetween(rate, at('2026-01-01T00:00:00Z'), at('2026-03-01T00:00:00Z'), LISBON)).toBeCloseTo(24, 9);
    expect(expandRate(rate, at('2026-02-02T00:00:00Z'), at('2026-03-01T00:00:00Z'), LISBON)).toEqual([]);
  });

  it('when the clocks go on an hour, the short day gets an hour less', () => {
    const stretches = expandRate(
      allDay('2026-03-01T00:00:00Z'),
      at('2026-03-29T00:00:00Z'),
      at('2026-03-30T23:00:00Z'),
      LISBON,
    );
    expect(stretches.map(({ amount }) => Math.round(amount))).toEqual([46, 48]);
  });
});

describe('a dose in a window', () => {
  const rate: DosingRate = { ...allDay('2026-02-01T00:00:00Z'), window: night };

  it('gives all of it in the night, over midnight', () => {
    const stretches = expandRate(rate, at('2026-02-03T12:00:00Z'), at('2026-02-04T12:00:00Z'), LISBON);
    expect(stretches).toEqual([{ from: at('2026-02-03T22:00:00Z'), to: at('2026-02-04T06:00:00Z'), amount: 48 }]);
  });

  it('when it begins in the middle of a window, gives the rest of that night', () => {
    const late = { ...rate, from: at('2026-02-04T02:00:00Z') };
    expect(amountBetween(late, at('2026-02-01T00:00:00Z'), at('2026-02-04T12:00:00Z'), LISBON)).toBeCloseTo(24, 9);
  });

  it('when the clocks go on in the window, the night still gives its amount', () => {
    const stretches = expandRate(rate, at('2026-03-28T12:00:00Z'), at('2026-03-29T12:00:00Z'), LISBON);
    expect(stretches).toHaveLength(1);
    expect(stretches[0]?.amount).toBe(48);
    expect((stretches[0]?.to ?? 0) - (stretches[0]?.from ?? 0)).toBe(7 * HOUR);
  });
});

it('parts of a time add up to the whole, with or without a window', () => {
  const start = at('2026-03-20T00:00:00Z');
  const hours = fc.integer({ min: 0, max: 24 * 30 });
  const window = fc.option(
    fc.record({ startMinute: fc.integer({ min: 0, max: 719 }), endMinute: fc.integer({ min: 720, max: 1439 }) }),
    { nil: null },
  );
  fc.assert(
    fc.property(hours, hours, hours, window, fc.boolean(), (a, b, c, between, ends) => {
      const [from = 0, middle = 0, to = 0] = [a, b, c].sort((x, y) => x - y).map((hour) => start + hour * HOUR);
      const rate = { ...{ from: start + DAY, to: ends ? start + 20 * DAY : null, amountPerDay: 10 }, window: between };
      const parts = amountBetween(rate, from, middle, LISBON) + amountBetween(rate, middle, to, LISBON);
      expect(parts).toBeCloseTo(amountBetween(rate, from, to, LISBON), 9);
    }),
  );
});

it('when the amount is below zero, is refused', () => {
  const rate = { ...allDay('2026-02-01T00:00:00Z'), amountPerDay: -1 };
  expect(domainErrorOf(() => expandRate(rate, 0, DAY, LISBON)).code).toBe('domain.out_of_range');
});
