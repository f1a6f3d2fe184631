import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { MS_PER_DAY } from '../../../shared/domain/days.ts';
import {
  emptyAt,
  litresPerDay,
  reservoirUse,
  supplyPerDay,
  supplyToSystem,
  supplyWithin,
  type ReservoirEvent,
  type SupplyInterval,
  type UseInterval,
} from '../../../shared/domain/reservoir-use.ts';

const day = (count: number) => count * MS_PER_DAY;
const level = (at: number, litres: number): ReservoirEvent => ({ kind: 'level', at: day(at), litres });
const refill = (at: number, litresBefore: number, litresAfter: number, alkalinityMeqL = 40): ReservoirEvent => ({
  ...{ kind: 'change', at: day(at), litresBefore, litresAfter, alkalinityMeqL },
});

describe('what a reservoir gave', () => {
  // Worked by hand: 12 L at 40 meq/L is 480 meq; after the refill 10 L at 36 meq/L is 360.
  it('is the fall of its level between looks, at the strength of the time', () => {
    const use = reservoirUse([refill(0, 0, 50), level(3, 38), refill(7, 22, 50, 36), level(9, 40)]);

    expect(use.intervals).toEqual([
      { from: 0, to: day(3), litres: 12, alkalinityMeq: 480 },
      { from: day(3), to: day(7), litres: 16, alkalinityMeq: 640 },
      { from: day(7), to: day(9), litres: 10, alkalinityMeq: 360 },
    ]);
    expect(use).toMatchObject({ rises: [], level: { at: day(9), litres: 40 }, alkalinityMeqL: 36 });
  });

  it('does not depend on the order in which the events come', () => {
    const events = [refill(0, 0, 50), level(3, 38), refill(7, 22, 50, 36), level(9, 40)];
    fc.assert(
      fc.property(fc.shuffledSubarray(events, { minLength: 4 }), (shuffled) => {
        expect(reservoirUse(shuffled)).toEqual(reservoirUse(events));
      }),
    );
  });

  it('when the level rose without a refill, flags it and counts no use', () => {
    const use = reservoirUse([refill(0, 0, 50), level(2, 40), level(3, 47), level(4, 45)]);
    expect(use.rises).toEqual([{ at: day(3), litres: 7 }]);
    expect(use.intervals.map(({ litres }) => litres)).toEqual([10, 2]);
  });

  it('when a refill began higher than the last look, flags that too', () => {
    expect(reservoirUse([level(0, 20), refill(2, 30, 50)]).rises).toEqual([{ at: day(2), litres: 10 }]);
  });

  it('before the first refill carries no alkalinity unless its strength is given', () => {
    const events = [level(0, 30), level(2, 26)];
    expect(reservoirUse(events).intervals[0]).toMatchObject({ litres: 4, alkalinityMeq: 0 });
    expect(reservoirUse(events, 38).intervals[0]).toMatchObject({ litres: 4, alkalinityMeq: 152 });
  });

  it('when nothing is known, is nothing', () => {
    expect(reservoirUse([])).toEqual({ intervals: [], rises: [], level: null, alkalinityMeqL: 0 });
    expect(reservoirUse([level(1, 30)]).intervals).toEqual([]);
  });

  it('litres balance: first level and refills, less what was used, plus rises, is the last level', () => {
    const anEvent = fc.oneof(
      fc.record({ kind: fc.constant('level' as const), litres: fc.integer({ min: 0, max: 100 }) }),
      fc.record({
        kind: fc.constant('change' as const),
        litresBefore: fc.integer({ min: 0, max: 40 }),
        litresAfter: fc.integer({ min: 40, max: 100 }),
        alkalinityMeqL: fc.integer({ min: 10, max: 45 }),
      }),
    );
    fc.assert(
      fc.property(fc.array(anEvent, { minLength: 1, maxLength: 20 }), (list) => {
        const events: ReservoirEvent[] = list.map((event, index) => ({ ...event, at: day(index) }));
        const { intervals, rises, level: last } = reservoirUse(events);
        const [first] = events;
        const start = first?.kind === 'level' ? first.litres : (first?.litresBefore ?? 0);
        const filled = events.reduce((sum, e) => sum + (e.kind === 'change' ? e.litresAfter - e.litresBefore : 0), 0);
        const used = intervals.reduce((sum, { litres }) => sum + litres, 0);
        const risen = rises.reduce((sum, { litres }) => sum + litres, 0);
        expect(start + filled - used + risen).toBe(last?.litres);
        expect(intervals.every(({ litres, from, to }) => litres >= 0 && from < to)).toBe(true);
      }),
    );
  });
});

describe('use a day', () => {
  const use: UseInterval[] = [
    { from: day(0), to: day(10), litres: 20, alkalinityMeq: 800 },
    { from: day(10), to: day(12), litres: 10, alkalinityMeq: 400 },
  ];

  it('is the mean of the last days that level readings cover', () => {
    expect(litresPerDay(use, day(12), 7)).toBeCloseTo((5 * 2 + 2 * 5) / 7, 12);
    expect(litresPerDay(use, day(12), 2)).toBe(5);
    expect(litresPerDay(use, day(15), 7)).toBeCloseTo((2 * 2 + 2 * 5) / 4, 12);
  });

  it('when hardly anything is covered, is not known', () => {
    expect(litresPerDay([], day(12))).toBeNull();
    expect(litresPerDay(use, day(30), 7)).toBeNull();
    expect(litresPerDay([{ from: 0, to: day(0.4), litres: 5, alkalinityMeq: 200 }], day(1))).toBeNull();
  });

  it('tells when it runs empty', () => {
    expect(emptyAt(22, 4, day(10))).toBe(day(15.5));
    expect(emptyAt(0, 4, day(10))).toBe(day(10));
    expect(emptyAt(-3, 4, day(10))).toBe(day(10));
  });

  it.each([0, -1, Number.NaN])('when %d L a day are used, never runs empty', (perDay) => {
    expect(emptyAt(22, perDay, day(10))).toBeNull();
  });
});

describe('supply to a system', () => {
  // 800 meq, three quarters of it to a system of 600 L: 1 meq/L over ten days.
  it('is its share of the alkalinity, over its litres', () => {
    const use = [{ from: 0, to: day(10), litres: 20, alkalinityMeq: 800 }];
    expect(supplyToSystem(use, 0.75, 600)).toEqual([{ from: 0, to: day(10), meqL: 1 }]);
  });

  it('within a window counts the part of each stretch that lies inside', () => {
    const supply: SupplyInterval[] = [
      { from: 0, to: day(10), meqL: 1 },
      { from: day(4), to: day(4), meqL: 0.3 },
    ];
    expect(supplyWithin(supply, day(2), day(6))).toBeCloseTo(0.7, 12);
    expect(supplyPerDay(supply, day(2), day(6))).toBeCloseTo(0.175, 12);
    expect(supplyWithin(supply, day(10), day(20))).toBe(0);
    expect(supplyPerDay(supply, day(5), day(5))).toBe(0);
  });

  it('a single dose belongs to the window that ends with it, not to the one that begins with it', () => {
    const dose = [{ from: day(4), to: day(4), meqL: 0.3 }];
    expect(supplyWithin(dose, day(3), day(4))).toBe(0.3);
    expect(supplyWithin(dose, day(4), day(5))).toBe(0);
  });

  it('of two windows side by side adds up to that of both', () => {
    const stretch = fc
      .tuple(
        fc.integer({ min: 0, max: 100 }),
        fc.integer({ min: 0, max: 30 }),
        fc.double({ min: 0, max: 3, noNaN: true }),
      )
      .map(([from, length, meqL]) => ({ from: day(from), to: day(from + length), meqL }));
    fc.assert(
      fc.property(
        fc.array(stretch),
        fc.array(fc.integer({ min: 0, max: 130 }), { minLength: 3, maxLength: 3 }),
        (supply, cuts) => {
          const [a = 0, b = 0, c = 0] = cuts.sort((x, y) => x - y).map(day);
          const whole = supplyWithin(supply, a, c);
          expect(supplyWithin(supply, a, b) + supplyWithin(supply, b, c)).toBeCloseTo(whole, 9);
        },
      ),
    );
  });
});
