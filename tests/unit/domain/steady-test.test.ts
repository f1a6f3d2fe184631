import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { MS_PER_DAY } from '../../../shared/domain/days.ts';
import { type LevelTest, steadiness } from '../../../shared/domain/steady-test.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const until = 100 * MS_PER_DAY;
const limits = { windowDays: 21, tolerance: 0.18 };

/** A test every so many days before the end, the newest first; its value by its age in days. */
function tests(everyDays: number, count: number, valueAt: (daysAgo: number) => number, sd = 0.05): LevelTest[] {
  return Array.from({ length: count }, (_, index) => {
    const daysAgo = index * everyDays;
    return { at: until - daysAgo * MS_PER_DAY, value: valueAt(daysAgo), sd };
  });
}

describe('steadiness', () => {
  it('when three weeks of tests scatter about one level, is steady', () => {
    const found = steadiness(
      tests(1, 21, (daysAgo) => 2.9 + (daysAgo % 2 ? 0.03 : -0.03)),
      until,
      limits,
    );
    expect(found).toMatchObject({ enough: true, steady: true, tests: 21, days: 20 });
  });

  it('when the level falls 0.02 a day, is not, and the slope is found', () => {
    const found = steadiness(
      tests(1, 21, (daysAgo) => 2.9 + 0.02 * daysAgo),
      until,
      limits,
    );
    expect(found).toMatchObject({ enough: true, steady: false, slopePerDay: expect.closeTo(-0.02, 10) });
  });

  it('when weekly tests are too loose to tell a trend but drift beyond the tolerance, is not steady', () => {
    const found = steadiness(
      tests(7, 4, (daysAgo) => 2.9 + 0.012 * daysAgo, 0.2),
      until,
      limits,
    );
    expect(found).toMatchObject({ enough: true, steady: false });
    if (found.enough) expect(found.low <= 0 && found.high >= 0).toBe(true);
  });

  it('when very close tests find a trend, is not steady even within the tolerance', () => {
    const found = steadiness(
      tests(1, 21, (daysAgo) => 2.9 - 0.005 * daysAgo, 0.001),
      until,
      limits,
    );
    expect(found).toMatchObject({ steady: false, low: expect.closeTo(0.005, 3) });
  });

  it('has the interval of weighted least squares (worked by hand: four tests a week apart, sd 0.1)', () => {
    // Σ(t − t̄)² = 245 d²; se = 0.1 / √245 = 0.006389; t(2) = 4.3027; reach 0.02749.
    const found = steadiness(
      tests(7, 4, () => 2.9, 0.1),
      until,
      limits,
    );
    expect(found).toMatchObject({ slopePerDay: expect.closeTo(0, 10), high: expect.closeTo(0.02749, 5) });
  });

  it('when tests are few, or span too little of the window, says which', () => {
    expect(
      steadiness(
        tests(7, 3, () => 3),
        until,
        limits,
      ),
    ).toMatchObject({ enough: false, reason: 'too_few_tests' });
    expect(
      steadiness(
        tests(1, 10, () => 3),
        until,
        limits,
      ),
    ).toMatchObject({ enough: false, reason: 'too_short' });
    expect(steadiness([], until, limits)).toEqual({ enough: false, reason: 'too_few_tests', tests: 0, days: 0 });
  });

  it('counts the tests of the window alone', () => {
    const old = tests(1, 60, (daysAgo) => (daysAgo > 21 ? 9 : 2.9));
    expect(steadiness(old, until, limits)).toMatchObject({ steady: true, tests: 22 });
  });

  it('when the same tests run backwards, has the slope turned round', () => {
    const values = fc.array(fc.double({ min: 2, max: 4, noNaN: true }), { minLength: 22, maxLength: 22 });
    fc.assert(
      fc.property(values, (given) => {
        const forth = steadiness(
          tests(1, 22, (day) => given[day] ?? 0),
          until,
          limits,
        );
        const back = steadiness(
          tests(1, 22, (day) => given[21 - day] ?? 0),
          until,
          limits,
        );
        if (!forth.enough || !back.enough) throw new Error('There are tests enough.');
        expect(back.slopePerDay).toBeCloseTo(-forth.slopePerDay, 8);
        expect(back.steady).toBe(forth.steady);
      }),
    );
  });

  it.each([
    { windowDays: 0, tolerance: 1 },
    { windowDays: 21, tolerance: 0 },
    { windowDays: Number.NaN, tolerance: 1 },
  ])('refuses a window of $windowDays days with a tolerance of $tolerance', (wrong) => {
    expect(domainErrorOf(() => steadiness([], until, wrong)).code).toBe('domain.out_of_range');
  });
});
