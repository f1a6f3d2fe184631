import { expect, it } from 'vitest';
import { saturatedStrength } from '../../../shared/domain/limewater-ceiling.ts';
import { strengthByConductivity, vinegarMlPerL } from '../../../shared/domain/reservoir-strength.ts';

it('strengthByConductivity: the fresh reading is saturated, 54 % of it half as strong (PHREEQC with phreeqc.dat)', () => {
  expect(strengthByConductivity(10, 10)).toBeCloseTo(saturatedStrength(), 9);
  expect(strengthByConductivity(5.4, 10) / saturatedStrength()).toBeCloseTo(0.5, 2);
});

it('strengthByConductivity: a reading far above the fresh one is refused', () => {
  expect(() => strengthByConductivity(12, 10)).toThrow('part of the fresh reading');
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
