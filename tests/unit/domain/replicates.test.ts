import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { meanOfTests } from '../../../shared/domain/replicates.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

/**
 * Twenty readings of a temperature, °C, with the mean, scatter and standard uncertainty that JCGM 100:2008 (GUM) gives
 * for them in 4.4.3 and table 1: 100.145, 1.489 and 0.333.
 */
const GUM_READINGS = [
  ...[96.9, 98.18, 98.25, 98.61, 99.03, 99.49, 99.56, 99.74, 99.89, 100.07],
  ...[100.33, 100.42, 100.68, 100.95, 101.11, 101.2, 101.57, 101.84, 102.36, 102.72],
];

const value = fc.double({ min: 0, max: 2000, noNaN: true });
const sd = fc.double({ min: 0.01, max: 50, noNaN: true });

describe('meanOfTests', () => {
  it('agrees with the worked example of the GUM where no repeatability is known', () => {
    const result = meanOfTests(GUM_READINGS, 1, 0);

    expect(result.mean).toBeCloseTo(100.145, 3);
    expect(result.scatter).toBeCloseTo(1.489, 3);
    expect(result.sd).toBeCloseTo(0.333, 3);
    expect(result.degreesOfFreedom).toBe(19);
  });

  it('one test has the repeatability of its method', () => {
    expect(meanOfTests([8.2], 0.15)).toMatchObject({ mean: 8.2, sd: 0.15, scatter: null, tests: 1 });
  });

  it('a pair as far apart as the method scatters narrows the error by the root of two; a wild pair widens it', () => {
    const usual = meanOfTests([8.2 - 0.15 / Math.SQRT2, 8.2 + 0.15 / Math.SQRT2], 0.15);
    expect(usual.sd).toBeCloseTo(0.15 / Math.SQRT2, 9);
    expect(meanOfTests([7, 9], 0.15).sd).toBeGreaterThan(0.15);
  });

  it('the order of the tests does not matter, and the mean lies among them', () => {
    fc.assert(
      fc.property(fc.array(value, { minLength: 1, maxLength: 12 }), sd, (values, repeatability) => {
        const result = meanOfTests(values, repeatability);
        expect(result.mean).toBeGreaterThanOrEqual(Math.min(...values) - 1e-9);
        expect(result.mean).toBeLessThanOrEqual(Math.max(...values) + 1e-9);
        expect(meanOfTests([...values].reverse(), repeatability).sd).toBeCloseTo(result.sd, 9);
        expect(result.sd).toBeGreaterThan(0);
      }),
    );
  });

  it('moves and stretches with the scale: another unit gives the same result', () => {
    fc.assert(
      fc.property(
        fc.array(value, { minLength: 1, maxLength: 8 }),
        sd,
        fc.double({ min: 0.1, max: 10, noNaN: true }),
        (values, repeatability, factor) => {
          const here = meanOfTests(values, repeatability);
          const there = meanOfTests(
            values.map((each) => each * factor + 3),
            repeatability * factor,
          );
          expect(there.mean).toBeCloseTo(here.mean * factor + 3, 6);
          expect(there.sd).toBeCloseTo(here.sd * factor, 6);
        },
      ),
    );
  });

  it.each([
    ['no value', [], 0.1, 10],
    ['a value that is none', [Number.NaN], 0.1, 10],
    ['no repeatability', [1], 0, 10],
    ['one test with nothing behind it', [1], 0.1, 0],
  ])('refuses %s', (_, values, repeatability, earlier) => {
    expect(domainErrorOf(() => meanOfTests(values, repeatability, earlier)).code).toBe('domain.out_of_range');
  });
});
