import fc from 'fast-check';
import { expect, it } from 'vitest';
import { saturatedStrength } from '../../../shared/domain/limewater-ceiling.ts';
import { partOfSaturated, strengthByConductivity, vinegarMlPerL } from '../../../shared/domain/reservoir-strength.ts';

// PHREEQC 3.8.9 with phreeqc.dat at 25 °C: conductivity of 2 to 20 mmol/L beside 7.99 mS/cm of the saturated 20.6 mmol/L.
it.each([
  [0.95, 2],
  [2.24, 5],
  [4.21, 10],
  [6.04, 15],
  [7.09, 18],
  [7.77, 20],
])('partOfSaturated: %d mS/cm of 7.99 is %d mmol/L of 20.6', (conductivity, millimoles) => {
  expect(partOfSaturated(conductivity, 7.99)).toBeCloseTo(millimoles / 20.6, 3);
});

it('partOfSaturated: half strength reads 54 % of full (the same runs)', () => {
  expect(partOfSaturated(5.4, 10)).toBeCloseTo(0.5, 2);
});

it('partOfSaturated: a reading above the fresh one is saturated, not more', () => {
  expect(partOfSaturated(10.4, 10)).toBe(1);
  expect(strengthByConductivity(10, 10)).toBeCloseTo(saturatedStrength(), 12);
});

it('partOfSaturated: grows with the reading, never faster than the reading itself from zero', () => {
  const part = fc.double({ min: 0.001, max: 1, noNaN: true });
  fc.assert(
    fc.property(part, part, (a, b) => {
      const [less, more] = [Math.min(a, b), Math.max(a, b)];
      expect(partOfSaturated(less, 1)).toBeLessThanOrEqual(partOfSaturated(more, 1));
      expect(partOfSaturated(less, 1)).toBeLessThanOrEqual(less + 1e-12);
    }),
  );
});

it.each([
  [0, 10],
  [5, 0],
  [Number.NaN, 10],
])('partOfSaturated: %d of %d mS/cm is refused', (conductivity, fresh) => {
  expect(() => partOfSaturated(conductivity, fresh)).toThrow('above zero');
});

it('vinegarMlPerL: joins by mixes, thins by plain water, is gone with a cleaning', () => {
  const mixed = { kind: 'refill', levelBeforeL: 10, levelL: 50, vinegarMl: 200, acidPercent: 5 } as const;
  const topped = { kind: 'topped_up', levelBeforeL: 25, levelL: 50, vinegarMl: null, acidPercent: null } as const;
  const cleaned = { kind: 'cleaned', levelBeforeL: 4, levelL: 0, vinegarMl: null, acidPercent: null } as const;

  expect(vinegarMlPerL([mixed])).toBe(4);
  expect(vinegarMlPerL([mixed, topped])).toBe(2);
  expect(vinegarMlPerL([mixed, topped, cleaned])).toBe(0);
  expect(vinegarMlPerL([{ ...mixed, acidPercent: 10 }])).toBe(8);
});
