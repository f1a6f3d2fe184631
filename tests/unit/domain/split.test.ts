import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { splitByWeights } from '../../../shared/domain/split.ts';
import reference from '../../reference/largest-remainder.json' with { type: 'json' };
import { domainErrorOf } from '../../support/domain-error.ts';

const sum = (parts: readonly number[]) => parts.reduce((all, part) => all + BigInt(part), 0n);
const weights = fc
  .array(fc.oneof(fc.integer({ min: 0, max: 1000 }), fc.double({ min: 1e-6, max: 1e6, noNaN: true })), {
    minLength: 1,
    maxLength: 30,
  })
  .filter((list) => list.some((weight) => weight > 0));
const total = fc.maxSafeInteger();

describe('sharing by weights', () => {
  it.each(reference.cases)('gives the published or exact parts: $id', ({ total: whole, weights: by, parts }) => {
    expect(splitByWeights(whole, by)).toEqual(parts);
  });

  it('when fractions tie, gives to the lower index', () => {
    expect(splitByWeights(2, [0.1, 0.1, 0.1])).toEqual([1, 1, 0]);
  });

  it('takes weights as the decimals they print as, so 0.1 + 0.2 and 0.3 are no different', () => {
    expect(splitByWeights(3, [0.1, 0.2, 0.3])).toEqual(splitByWeights(3, [1, 2, 3]));
  });

  it('when the total is 2^53 - 1, still adds up', () => {
    expect(sum(splitByWeights(Number.MAX_SAFE_INTEGER, [1, 1, 1, 7]))).toBe(BigInt(Number.MAX_SAFE_INTEGER));
  });

  it('when weights are of very different size, stays exact', () => {
    expect(splitByWeights(1_000_000, [1e-300, 1e300])).toEqual([0, 1_000_000]);
  });

  it('always adds up to the total', () => {
    fc.assert(fc.property(total, weights, (whole, by) => sum(splitByWeights(whole, by)) === BigInt(whole)));
  });

  it('keeps every part within one of its quota and of the right sign', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e9 }), weights, (whole, by) => {
        const all = by.reduce((a, b) => a + b, 0);
        splitByWeights(whole, by).forEach((part, index) => {
          expect(Math.abs(part - (whole * (by[index] ?? 0)) / all)).toBeLessThan(1 + 1e-3);
          expect(part).toBeGreaterThanOrEqual(0);
        });
      }),
    );
  });

  it('gives nothing to a weight of zero', () => {
    fc.assert(
      fc.property(total, weights, (whole, by) => {
        splitByWeights(whole, by).forEach((part, index) => {
          if (by[index] === 0) expect(part).toBe(0);
        });
      }),
    );
  });

  it('shares a credit as the charge with a minus', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e12 }), weights, (whole, by) => {
        const charge = splitByWeights(whole, by);
        const credit = splitByWeights(-whole, by);
        expect(credit.map((part, index) => part + (charge[index] ?? 0)).every((each) => each === 0)).toBe(true);
      }),
    );
  });

  it.each([
    ['every weight is zero', () => splitByWeights(10, [0, 0])],
    ['there are no weights', () => splitByWeights(10, [])],
    ['a weight is negative', () => splitByWeights(10, [1, -1])],
    ['a weight is not a number', () => splitByWeights(10, [1, Number.NaN])],
    ['a weight is endless', () => splitByWeights(10, [1, Number.POSITIVE_INFINITY])],
    ['the total is not whole', () => splitByWeights(10.5, [1])],
    ['the total is beyond 2^53', () => splitByWeights(2 ** 53, [1])],
  ])('when %s, refuses', (_, act) => {
    expect(domainErrorOf(act).code).toBe('domain.out_of_range');
  });
});
