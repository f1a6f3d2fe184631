import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { poolPaces } from '../../../shared/domain/growth-fit/pool-paces.ts';
import { saleableCount, shareReaching, type PiecesThen } from '../../../shared/domain/saleable.ts';

const batch: PiecesThen = { alive: 96, meanMm: 26, meanSdMm: 2, variation: 0.12, survival: 0.97, isHealed: true };

describe('shareReaching', () => {
  it('when sizes are log-normal, half reach the median', () => {
    expect(shareReaching(30 * Math.sqrt(1.04), 0.2, 30)).toBeCloseTo(0.5, 12);
    expect(shareReaching(30, 0.2, 0)).toBe(1);
    expect(() => shareReaching(0, 0.2, 15)).toThrow('above zero');
  });
});

describe('saleableCount', () => {
  it('when the mean size is known and all live, the range is that of a binomial count', () => {
    const { expected, low, high } = saleableCount(
      { ...batch, meanSdMm: 0, survival: 1, meanMm: 25 * Math.sqrt(1.0144) },
      25,
    );

    expect(expected).toBeCloseTo(48, 9);
    // R: qbinom(c(0.1, 0.9), 96, 0.5); worked by hand as 48 ± 1.2816 · 4.9.
    expect([low, high]).toEqual([42, 54]);
  });

  it('when the mean size is less certain, the range is wider', () => {
    const sure = saleableCount({ ...batch, meanSdMm: 0.5 }, 25);
    const unsure = saleableCount({ ...batch, meanSdMm: 4 }, 25);

    expect(unsure.high - unsure.low).toBeGreaterThan(sure.high - sure.low);
  });

  it('when nothing has healed or nothing lives, none is saleable', () => {
    expect(saleableCount({ ...batch, isHealed: false }, 15)).toEqual({ expected: 0, low: 0, high: 0 });
    expect(saleableCount({ ...batch, alive: 0 }, 15)).toEqual({ expected: 0, low: 0, high: 0 });
  });

  it('when pieces are any, counts lie between none and all, and larger pieces are never fewer', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 150 }), fc.double({ min: 5, max: 80, noNaN: true }), (alive, meanMm) => {
        const small = saleableCount({ ...batch, alive, meanMm }, 25);
        const large = saleableCount({ ...batch, alive, meanMm: meanMm + 5 }, 25);
        expect(0 <= small.low && small.low <= small.high && small.high <= alive).toBe(true);
        expect(large.expected).toBeGreaterThanOrEqual(small.expected - 1e-9);
        expect(large.low).toBeGreaterThanOrEqual(small.low);
      }),
      { numRuns: 40 },
    );
  });
});

describe('poolPaces', () => {
  const of = (line: string, genus: string, ...ratios: number[]) => ratios.map((ratio) => ({ line, genus, ratio }));
  const observed = [
    ...of('fast', 'Acropora', 1.45, 1.6, 1.5, 1.55, 1.4, 1.6),
    ...of('few', 'Acropora', 0.9),
    ...of('usual', 'Favites', 1.05, 0.95, 1, 1.02),
  ];

  it('when nothing was measured, is as usual and says that it is not well known', () => {
    expect(poolPaces([]).of('any', 'Acropora')).toMatchObject({ ratio: expect.closeTo(1, 12), batches: 0 });
    expect(poolPaces([]).of('any', 'Acropora').sd).toBeGreaterThan(0.3);
  });

  it('when a line was measured often its own pace holds; when once, it borrows from its genus', () => {
    const pooled = poolPaces(observed);

    expect(pooled.of('fast', 'Acropora').ratio).toBeGreaterThan(1.4);
    expect(pooled.of('few', 'Acropora').ratio).toBeGreaterThan(0.91);
    expect(pooled.of('few', 'Acropora').sd).toBeGreaterThan(pooled.of('fast', 'Acropora').sd);
  });

  it('when a line was never measured, leans to its genus; when its genus was not either, to the farm', () => {
    const pooled = poolPaces(observed);

    expect(pooled.of('new', 'Favites').ratio).toBeLessThan(pooled.of('new', 'Acropora').ratio);
    expect(pooled.of('new', 'Zoanthus').ratio).toBeGreaterThan(1);
    expect(pooled.of('new', 'Zoanthus').sd).toBeGreaterThan(pooled.of('new', 'Favites').sd * 0.8);
  });
});
