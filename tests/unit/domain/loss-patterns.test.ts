import { describe, expect, it } from 'vitest';
import { chanceOfAsMany, falseDiscoveryRates, lossOdds } from '../../../shared/domain/loss-patterns.ts';

describe('chanceOfAsMany', () => {
  it('when 2 are expected, 5 or more come in 5.27 % of cases (Poisson tables)', () => {
    expect(chanceOfAsMany({ lost: 5, expected: 2 })).toBeCloseTo(0.05265, 5);
    expect(chanceOfAsMany({ lost: 0, expected: 2 })).toBe(1);
    expect(chanceOfAsMany({ lost: 1, expected: 2 })).toBeCloseTo(1 - Math.exp(-2), 12);
  });

  it('when losses are not a count, is refused', () => {
    expect(() => chanceOfAsMany({ lost: 1.5, expected: 2 })).toThrow('Losses are zero or more.');
    expect(() => chanceOfAsMany({ lost: 1, expected: -1 })).toThrow('Losses are zero or more.');
  });
});

describe('falseDiscoveryRates', () => {
  it('when given the fifteen p values of Benjamini & Hochberg 1995 (section 3.2), lets four stand at 0.05', () => {
    const chances = [
      0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.324, 0.4262, 0.5719, 0.6528, 0.759, 1,
    ];

    const rates = falseDiscoveryRates(chances);

    expect(rates.filter((q) => q <= 0.05)).toHaveLength(4);
    expect(rates[3]).toBeCloseTo((0.0095 * 15) / 4, 12);
    expect(falseDiscoveryRates(chances.toReversed())).toEqual(rates.toReversed());
  });
});

describe('lossOdds', () => {
  it('when one of many parts lost far more than expected, only that one stands', () => {
    const usual = Array.from({ length: 30 }, () => ({ lost: 2, expected: 2 }));

    const odds = lossOdds([...usual, { lost: 14, expected: 2 }]);

    expect(odds.filter(({ q }) => q <= 0.05)).toHaveLength(1);
    expect(odds.at(-1)?.q).toBeLessThan(1e-5);
  });
});
