import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { driftSince, factorAt, leftBy, pumpFactor, type DatedFactor } from '../../../shared/domain/pump-calibration.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const DAY = 86_400_000;
const check = (day: number, found: number, adjusted = false): DatedFactor => ({ at: day * DAY, found, adjusted });

describe('the factor of a pump', () => {
  it('is the mean of what came over what was asked, with its standard error', () => {
    // Mean 9.2, standard deviation 0.2: 0.2 / sqrt(3) / 10.
    const { factor, error } = pumpFactor({ askedMl: 10, measuredMl: [9, 9.2, 9.4] });
    expect(factor).toBeCloseTo(0.92, 12);
    expect(error).toBeCloseTo(0.2 / Math.sqrt(3) / 10, 12);
  });

  it('when it was measured once, has no error that could be told', () => {
    expect(pumpFactor({ askedMl: 10, measuredMl: [9.7] })).toEqual({ factor: 0.97, error: null });
  });

  it.each([
    [0, [1]],
    [10, [0]],
    [10, [Number.NaN]],
  ])('when %d mL were asked and %j came, is refused', (askedMl, measuredMl) => {
    expect(domainErrorOf(() => pumpFactor({ askedMl, measuredMl })).code).toBe('domain.out_of_range');
  });

  it('when nothing was measured, asks for it', () => {
    expect(domainErrorOf(() => pumpFactor({ askedMl: 10, measuredMl: [] })).code).toBe('input.invalid');
  });
});

// Beyond 10 % the tube wants cleaning: common practice, no source.
describe('drift', () => {
  it.each([
    [0.9, 1, false],
    [0.899, 1, true],
    [1.1, 1, false],
    [1.101, 1, true],
    [0.95, 1.06, true],
  ])('from %d left to %d found', (found, left, clean) => {
    expect(driftSince(found, left).clean).toBe(clean);
  });
});

describe('the factor in time', () => {
  it('when a pump was never checked, it gives what is asked', () => {
    expect(factorAt([], 0)).toBe(1);
  });

  it('drifts evenly from how a check left it to how the next found it', () => {
    const checks = [check(10, 0.95, true), check(20, 0.9), check(30, 0.8, true)];
    expect(factorAt(checks, 0)).toBe(0.95);
    expect(factorAt(checks, 10 * DAY)).toBe(1);
    expect(factorAt(checks, 15 * DAY)).toBeCloseTo(0.95, 12);
    expect(factorAt(checks, 20 * DAY)).toBeCloseTo(0.9, 12);
    expect(factorAt(checks, 25 * DAY)).toBeCloseTo(0.85, 12);
    expect(factorAt(checks, 40 * DAY)).toBe(1);
  });

  it('stays between what was left and what was found', () => {
    const found = fc.double({ min: 0.5, max: 1.5, noNaN: true });
    fc.assert(
      fc.property(found, found, fc.boolean(), fc.double({ min: 1, max: 9, noNaN: true }), (a, b, adjusted, day) => {
        const checks = [check(0, a, adjusted), check(10, b)];
        const [low, high] = [Math.min(leftBy(check(0, a, adjusted)), b), Math.max(leftBy(check(0, a, adjusted)), b)];
        const at = factorAt(checks, day * DAY);
        expect(at).toBeGreaterThanOrEqual(low - 1e-12);
        expect(at).toBeLessThanOrEqual(high + 1e-12);
      }),
    );
  });
});
