import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  changesToReach,
  levelAfterChange,
  levelAfterContinuous,
  levelInTheEnd,
  levelsAfterChanges,
  litresToReach,
  nextChangeOn,
  plannedChanges,
  saltForWater,
} from '../../../shared/domain/water-change-plan.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const level = fc.double({ min: 0, max: 500, noNaN: true });
const fraction = fc.double({ min: 0.01, max: 1, noNaN: true });
const count = fc.integer({ min: 0, max: 30 });

describe('dilution', () => {
  it('a change of half between 40 and 0 leaves 20, two of them 10', () => {
    expect(levelsAfterChanges({ level: 40, newWater: 0 }, 0.5, 2)).toEqual([20, 10]);
  });

  it('n changes come to the exact power law', () => {
    fc.assert(
      fc.property(level, level, fraction, count, (from, newWater, part, changes) => {
        const after = levelsAfterChanges({ level: from, newWater }, part, changes).at(-1) ?? from;
        expect(after).toBeCloseTo(newWater + (from - newWater) * (1 - part) ** changes, 6);
      }),
    );
  });

  it('changes follow on one another: n and then m are n + m', () => {
    fc.assert(
      fc.property(
        ...([level, level, fraction, count, count] as const),
        fc.double({ min: -5, max: 5, noNaN: true }),
        (from, newWater, part, n, m, drift) => {
          const first = levelsAfterChanges({ level: from, newWater, drift }, part, n).at(-1) ?? from;
          const both = levelsAfterChanges({ level: first, newWater, drift }, part, m).at(-1) ?? first;
          expect(both).toBeCloseTo(levelsAfterChanges({ level: from, newWater, drift }, part, n + m).at(-1) ?? from, 6);
        },
      ),
    );
  });

  it('water that runs through follows on itself, and many small changes come to it', () => {
    fc.assert(
      fc.property(level, level, fc.double({ min: 0, max: 3000, noNaN: true }), (from, newWater, litres) => {
        const half = levelAfterContinuous(from, newWater, litres / 2, 1000);
        const whole = levelAfterContinuous(from, newWater, litres, 1000);
        expect(levelAfterContinuous(half, newWater, litres / 2, 1000)).toBeCloseTo(whole, 6);
        const steps = 20_000;
        const small = newWater + (from - newWater) * (1 - litres / steps / 1000) ** steps;
        expect(Math.abs(small - whole)).toBeLessThan(0.05 * Math.max(1, Math.abs(from - newWater) * 0.01));
      }),
    );
  });

  it('a batch moves the level further than as much water that runs through', () => {
    const batch = levelAfterChange(40, 0, 0.3);
    expect(batch).toBeLessThan(levelAfterContinuous(40, 0, 300, 1000));
    expect(levelAfterContinuous(40, 0, 300, 1000)).toBeCloseTo(40 * Math.exp(-0.3), 9);
  });

  it('never goes beyond the new water or the level', () => {
    fc.assert(
      fc.property(level, level, fraction, (from, newWater, part) => {
        const after = levelAfterChange(from, newWater, part);
        expect(after).toBeGreaterThanOrEqual(Math.min(from, newWater) - 1e-9);
        expect(after).toBeLessThanOrEqual(Math.max(from, newWater) + 1e-9);
      }),
    );
  });

  it('endless changes end where one more moves nothing', () => {
    const from = { newWater: 0, drift: 3 };
    const end = levelInTheEnd(from, 0.06);
    expect(levelsAfterChanges({ ...from, level: end }, 0.06, 1)[0]).toBeCloseTo(end, 9);
    expect(levelsAfterChanges({ ...from, level: 10 }, 0.06, 400).at(-1)).toBeCloseTo(end, 3);
  });

  it.each([0, 1.01, Number.NaN])('when the part is %d, it is refused', (part) => {
    expect(domainErrorOf(() => levelAfterChange(1, 0, part)).code).toBe('domain.out_of_range');
  });
});

describe('litres to a target', () => {
  it('from 40 to 10 of nitrate in 1,000 L are 750 L at once or 1,386 L running through', () => {
    const litres = litresToReach(40, 0, 10, 1000);
    expect(litres?.batchL).toBeCloseTo(750, 6);
    expect(litres?.continuousL).toBeCloseTo(1000 * Math.log(4), 6);
  });

  it('come to the target when they are changed', () => {
    fc.assert(
      fc.property(level, level, fc.double({ min: 0.01, max: 0.99, noNaN: true }), (from, newWater, way) => {
        fc.pre(Math.abs(from - newWater) > 0.1);
        const target = from + (newWater - from) * way;
        const litres = litresToReach(from, newWater, target, 800);
        if (!litres) throw new Error('A target between the two can be reached.');
        expect(levelAfterChange(from, newWater, litres.batchL / 800)).toBeCloseTo(target, 6);
        expect(levelAfterContinuous(from, newWater, litres.continuousL, 800)).toBeCloseTo(target, 6);
      }),
    );
  });

  it('when the target lies beyond the new water, there are none', () => {
    expect(litresToReach(40, 5, 5, 1000)).toBeNull();
    expect(litresToReach(40, 5, 2, 1000)).toBeNull();
    expect(litresToReach(40, 5, 50, 1000)).toBeNull();
  });

  it('counts the changes that it takes, or says that they never do', () => {
    expect(changesToReach({ level: 40, newWater: 0 }, 0.5, 10)).toBe(2);
    expect(changesToReach({ level: 40, newWater: 0 }, 0.06, 10)).toBe(23);
    expect(changesToReach({ level: 40, newWater: 0, drift: 3 }, 0.06, 10)).toBeNull();
    expect(changesToReach({ level: 10, newWater: 0 }, 0.06, 10)).toBe(0);
    expect(changesToReach({ level: 2.5, newWater: 3 }, 0.5, 2.8)).toBe(2);
  });
});

describe('salt', () => {
  // 38 g a litre for 35 ppt, and 7.6 kg for 200 L: trade figures, from memory.
  it('for 200 L of 35 ppt weighs 7.6 kg', () => {
    expect(saltForWater(200, 35)).toBeCloseTo(7600, 6);
  });

  it('when the salinity is no seawater, it is refused', () => {
    expect(domainErrorOf(() => saltForWater(200, 60)).code).toBe('domain.out_of_range');
  });
});

describe('the days of changes', () => {
  const habit = { everyDays: 14, startOn: '2026-03-02' };

  it('begin on the first day, then follow what was done', () => {
    expect(nextChangeOn(habit, null)).toBe('2026-03-02');
    expect(nextChangeOn(habit, '2026-03-05')).toBe('2026-03-19');
    expect(nextChangeOn(habit, '2026-01-05')).toBe('2026-03-02');
  });

  it('when one was missed, it counts as made today and the next follow it', () => {
    expect(plannedChanges(habit, '2026-03-05', '2026-03-25', '2026-04-25')).toEqual([
      '2026-03-25',
      '2026-04-08',
      '2026-04-22',
    ]);
  });

  it('when none is due until the end, there are none', () => {
    expect(plannedChanges(habit, '2026-03-05', '2026-03-06', '2026-03-18')).toEqual([]);
  });
});
