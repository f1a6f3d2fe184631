import { describe, expect, it } from 'vitest';
import { tQuantile95 } from '../../../shared/domain/student-t.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

/** Probability within ±t by Simpson's rule on t = √n·tan(θ), where the density is a power of a cosine. */
function within(t: number, n: number): number {
  const steps = 2000;
  const simpson = (upper: number) => {
    const h = upper / steps;
    const f = (i: number) => Math.cos(i * h) ** (n - 1) * (i === 0 || i === steps ? 1 : i % 2 === 1 ? 4 : 2);
    return (h / 3) * Array.from({ length: steps + 1 }, (_, i) => f(i)).reduce((a, b) => a + b, 0);
  };
  return simpson(Math.atan(t / Math.sqrt(n))) / simpson(Math.PI / 2);
}

describe('the reach of a 95 % interval', () => {
  it.each([...Array.from({ length: 45 }, (_, index) => index + 1), 60, 120, 1000])(
    'with %i degrees of freedom holds 95 % of the distribution',
    (n) => {
      expect(within(tQuantile95(n), n)).toBeCloseTo(0.95, 6);
    },
  );

  it('shrinks with more data toward that of the normal distribution', () => {
    const reaches = [1, 2, 5, 10, 29, 30, 31, 50, 1000].map(tQuantile95);
    expect(reaches).toEqual([...reaches].sort((a, b) => b - a));
    expect(tQuantile95(1_000_000)).toBeCloseTo(1.95996, 4);
  });

  it.each([0, -1, 1.5, Number.NaN])('with %d degrees of freedom is refused', (n) => {
    expect(domainErrorOf(() => tQuantile95(n)).code).toBe('domain.out_of_range');
  });
});
