import { describe, expect, it } from 'vitest';
import { lossRates, type Life } from '../../../shared/domain/loss-rates.ts';

const lives = (line: string, lost: number, alive: number): Life[] => [
  ...Array.from({ length: lost }, () => ({ line, fromDay: 0, toDay: 3, lost: true })),
  ...Array.from({ length: alive }, () => ({ line, fromDay: 0, toDay: 200, lost: false })),
];

describe('lossRates', () => {
  it('when nothing is known, about 8 % are lost in half a year', () => {
    expect(1 - Math.exp(-lossRates([]).expected('any', 0, 180))).toBeCloseTo(0.086, 3);
  });

  it('when a line is well known, its own losses are expected of it', () => {
    const rates = lossRates([...lives('frail', 200, 800), ...lives('hardy', 0, 1000)]);

    expect(rates.expected('frail', 0, 7)).toBeCloseTo((7 * 200) / (800 * 7 + 200 * 3), 2);
    expect(rates.expected('hardy', 0, 7)).toBeLessThan(0.01);
  });

  it('when a line is new, the losses of the farm are expected of it', () => {
    const rates = lossRates(lives('frail', 2000, 8000));

    expect(rates.expected('new', 0, 7)).toBeCloseTo(rates.expected('frail', 0, 7), 1);
  });

  it('when a stretch is cut in two, both parts add up to the whole', () => {
    const rates = lossRates(lives('frail', 20, 80));

    expect(rates.expected('frail', 3, 40) + rates.expected('frail', 40, 90)).toBeCloseTo(
      rates.expected('frail', 3, 90),
      12,
    );
  });
});
