import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { exactInterval, wilsonInterval } from '../../../shared/domain/binomial.ts';
import { gammaP, gammaQ, normalCdf, normalQuantile } from '../../../shared/domain/special-functions.ts';
import reference from '../../reference/binomial-intervals.json' with { type: 'json' };

const shares = fc
  .integer({ min: 1, max: 300 })
  .chain((of) => fc.tuple(fc.integer({ min: 0, max: of }), fc.constant(of)));

describe('intervals of a share', () => {
  it.each(reference.cases)('when $survived of $n live, are those of statsmodels ($confidence)', (given) => {
    const wilson = wilsonInterval(given.survived, given.n, given.confidence);
    const exact = exactInterval(given.survived, given.n, given.confidence);

    expect([wilson.low, wilson.high]).toEqual(given.wilson.map((value) => expect.closeTo(value, 9)));
    expect([exact.low, exact.high]).toEqual(given.clopper_pearson.map((value) => expect.closeTo(value, 9)));
  });

  it('when counts are any, hold the share between them and stay within 0 and 1', () => {
    fc.assert(
      fc.property(shares, ([count, of]) => {
        for (const { low, high } of [wilsonInterval(count, of), exactInterval(count, of)]) {
          expect(0 <= low && low <= count / of && count / of <= high && high <= 1).toBe(true);
        }
      }),
      { numRuns: 50 },
    );
  });

  it('when more live than there are, is refused', () => {
    expect(() => wilsonInterval(3, 2)).toThrow('A share is so many of at least one.');
    expect(() => exactInterval(0, 0)).toThrow('A share is so many of at least one.');
  });
});

describe('special functions', () => {
  it('when a Poisson count is asked for, the gamma function sums its tail', () => {
    const mean = 3.2;
    const upTo4 = [1, mean, mean ** 2 / 2, mean ** 3 / 6, mean ** 4 / 24].reduce((sum, each) => sum + each, 0);

    expect(gammaP(5, mean)).toBeCloseTo(1 - upTo4 * Math.exp(-mean), 13);
    expect(gammaQ(5, mean)).toBeCloseTo(upTo4 * Math.exp(-mean), 13);
  });

  it('when z is 1.959964, the normal distribution has 97.5 % below it (Abramowitz & Stegun table 26.1)', () => {
    expect(normalCdf(1.959963984540054)).toBeCloseTo(0.975, 13);
    expect(normalQuantile(0.975)).toBeCloseTo(1.959963984540054, 11);
  });
});
