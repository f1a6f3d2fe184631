import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { calibrationBias, checkFor } from '../../../shared/domain/calibration.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const check = { found: [8.4, 8.5, 8.45], referenceValue: 8, referenceSd: 0.05, repeatabilitySd: 0.1 };

describe('calibrationBias', () => {
  it('is what was found less what the solution holds; squares of both uncertainties add', () => {
    const result = calibrationBias(check);

    expect(result.bias).toBeCloseTo(0.45, 9);
    // Pooled variance of one test: (10 × 0.1² + 2 × 0.05²) / 12, by hand.
    expect(result.biasSd).toBeCloseTo(Math.sqrt((0.1 + 0.005) / 12 / 3 + 0.05 ** 2), 9);
    expect(result.isDistinct).toBe(true);
  });

  it('with an exact solution the interval is Student’s: 2.2281 for one test with ten behind it (tables, 10 degrees)', () => {
    const { low, high, biasSd, bias } = calibrationBias({ ...check, found: [8.1], referenceSd: 0 });

    expect((high - low) / 2 / biasSd).toBeCloseTo(2.2281, 4);
    expect((low + high) / 2).toBeCloseTo(bias, 9);
  });

  it('where the solution’s own doubt is most of it, the interval is that of a normal error', () => {
    const { low, high } = calibrationBias({ ...check, referenceSd: 5 });

    expect((high - low) / 2 / Math.hypot(5, Math.sqrt((0.1 + 0.005) / 12 / 3))).toBeCloseTo(1.96, 2);
  });

  it('a small difference can not be told from none', () => {
    expect(calibrationBias({ ...check, found: [8.05] }).isDistinct).toBe(false);
  });

  it('a reading of the same kit less the bias is what the solution holds, whatever the kit’s fault', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 1500, noNaN: true }),
        fc.double({ min: -50, max: 50, noNaN: true }),
        fc.array(fc.double({ min: -5, max: 5, noNaN: true }), { minLength: 1, maxLength: 6 }),
        (truth, fault, noise) => {
          const found = noise.map((each) => truth + fault + each);
          const { bias, mean, low, high } = calibrationBias({ ...check, found, referenceValue: truth });
          expect(mean - bias).toBeCloseTo(truth, 6);
          expect(low).toBeLessThanOrEqual(bias);
          expect(high).toBeGreaterThanOrEqual(bias);
        },
      ),
    );
  });

  it('refuses a solution of negative doubt and a check without a reading', () => {
    expect(domainErrorOf(() => calibrationBias({ ...check, referenceSd: -1 })).code).toBe('domain.out_of_range');
    expect(domainErrorOf(() => calibrationBias({ ...check, found: [] })).code).toBe('domain.out_of_range');
  });
});

describe('checkFor', () => {
  const [early, late, other, whole] = [
    { at: 10, kitLotId: 'a' },
    { at: 20, kitLotId: 'a' },
    { at: 15, kitLotId: 'b' },
    { at: 12, kitLotId: null },
  ];

  it.each([
    ['before any check there is none', 9, 'a', null],
    ['the moment of the check counts', 10, 'a', early],
    ['the last of the lot or of the whole method counts', 14, 'a', whole],
    ['a later check of the lot takes over', 25, 'a', late],
    ['another lot has its own', 25, 'b', other],
    ['a reading without a lot has the method’s', 25, null, whole],
  ])('%s', (_, takenAt, kitLotId, expected) => {
    expect(checkFor([late, whole, early, other], { takenAt, kitLotId })).toBe(expected);
  });
});
