import fc from 'fast-check';
import { expect, it } from 'vitest';
import { byUrgency, type LevelFacts } from '../../../shared/domain/water-urgency.ts';

const band = { low: 7.5, high: 9 };
const level = (value: number, changePerDay: number | null = 0): LevelFacts => ({ level: value, band, changePerDay });

it('when levels are put in order, those out come first, the furthest before, then those that leave soonest', () => {
  const far = level(6.8);
  const near = level(9.2);
  const soon = level(7.7, -0.1);
  const late = level(8.9, -0.1);
  const steady = level(8);

  expect([steady, late, null, near, soon, far].sort(byUrgency)).toEqual([far, near, soon, late, steady, null]);
});

it('when a level has no band or its change is not known, it is not urgent', () => {
  const free: LevelFacts = { level: 2, band: null, changePerDay: -1 };

  expect([level(8, null), free, level(8, -0.5)].sort(byUrgency)[0]).toEqual(level(8, -0.5));
});

it('the order does not depend on the order given', () => {
  const facts = fc.record({
    level: fc.integer({ min: 60, max: 100 }).map((value) => value / 10),
    band: fc.constantFrom(band, null),
    changePerDay: fc.constantFrom(null, -0.2, 0, 0.3),
  });
  fc.assert(
    fc.property(facts, facts, (a, b) => {
      expect(Math.sign(byUrgency(a, b)) + Math.sign(byUrgency(b, a))).toBe(0);
    }),
  );
});
