import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { MS_PER_DAY } from '../../../shared/domain/days.ts';
import { estimateDemand, type AlkalinityReading, type WaterChange } from '../../../shared/domain/demand.ts';
import { day, inputs, known, reading, steady } from '../../support/demand-data.ts';

/** Exact levels of a system under a steady demand, by tiny steps of the plain bookkeeping. */
function levels(start: number, demand: number, supplyPerDay: number, changes: WaterChange[], days: number[]) {
  const events = [...days.map(day), ...changes.map(({ at }) => at)].sort((a, b) => a - b);
  let [level, at] = [start, 0];
  const seen = new Map<number, number>();
  for (const instant of events) {
    level += ((supplyPerDay - demand) * (instant - at)) / MS_PER_DAY;
    at = instant;
    if (!seen.has(instant)) seen.set(instant, level);
    const change = changes.find((each) => each.at === instant);
    if (change) level = (1 - change.fraction) * level + change.fraction * change.alkalinityMeqL;
  }
  return days.map((each) => reading(each, seen.get(day(each)) ?? Number.NaN));
}

describe('demand worked by hand', () => {
  it('when nothing is added, is the fall of the level', () => {
    const readings = [reading(0, 3), reading(2, 2.8), reading(4, 2.6)];
    const estimate = known(estimateDemand(inputs({ readings }), day(4)));
    expect(estimate.demandMeqLPerDay).toBeCloseTo(0.1, 12);
    expect(estimate.supplyMeqLPerDay).toBe(0);
    expect(estimate.readings).toBe(3);
  });

  it('when the level stands still, is what was added', () => {
    const readings = [reading(0, 3), reading(3, 3), reading(6, 3)];
    const estimate = known(estimateDemand(inputs({ readings, supply: [steady(0, 6, 0.4)] }), day(6)));
    expect(estimate.demandMeqLPerDay).toBeCloseTo(0.4, 12);
    expect(estimate.supplyMeqLPerDay).toBeCloseTo(0.4, 12);
  });

  // Three readings of sd 0.05 at days 0, 2, 4: slope error 0.05/√8 = 0.017678; t of one degree of freedom 12.706.
  it('has the error of the tests and the reach of Student', () => {
    const readings = [reading(0, 3), reading(2, 2.8), reading(4, 2.6)];
    const estimate = known(estimateDemand(inputs({ readings }), day(4)));
    expect(estimate.standardError).toBeCloseTo(0.0176777, 6);
    expect(estimate.high - estimate.demandMeqLPerDay).toBeCloseTo(12.706205 * 0.0176777, 5);
    expect(estimate.demandMeqLPerDay - estimate.low).toBeCloseTo(12.706205 * 0.0176777, 5);
  });

  // Ordinary regression of 3.0, 2.7, 2.8, 2.5 on 0..3 by hand: slope -0.14; residual sum of squares 0.032; s² 0.016;
  // error √(0.016/5) = 0.056569, larger than the tests' own 0.05/√5 = 0.022361.
  it('when readings scatter more than the tests should, the error grows', () => {
    const readings = [reading(0, 3), reading(1, 2.7), reading(2, 2.8), reading(3, 2.5)];
    const estimate = known(estimateDemand(inputs({ readings }), day(3)));
    expect(estimate.demandMeqLPerDay).toBeCloseTo(0.14, 12);
    expect(estimate.standardError).toBeCloseTo(0.0565685, 6);
  });

  it('gives a careful test more weight than a rough one', () => {
    const rough = [reading(0, 3), reading(2, 2.8), reading(4, 2.2, 0.5)];
    const careful = [reading(0, 3), reading(2, 2.8), reading(4, 2.2, 0.05)];
    const of = (readings: AlkalinityReading[]) => known(estimateDemand(inputs({ readings }), day(4))).demandMeqLPerDay;
    expect(of(rough)).toBeLessThan(of(careful));
    expect(of(rough)).toBeCloseTo(0.1, 1);
  });

  // 10 % of water at 4 meq/L into 3 meq/L lifts the level by 0.1 on day 2, which is no negative demand.
  it('does not take a water change for a rise or a fall', () => {
    const waterChanges = [{ at: day(2), fraction: 0.1, alkalinityMeqL: 4 }];
    const readings = [reading(0, 3), reading(1, 3), reading(3, 3.1), reading(4, 3.1)];
    const estimate = known(estimateDemand(inputs({ readings, waterChanges }), day(4)));
    expect(estimate.demandMeqLPerDay).toBeCloseTo(0, 12);
  });

  it('takes a test at the instant of a water change as made before it', () => {
    const waterChanges = [{ at: day(2), fraction: 0.5, alkalinityMeqL: 1 }];
    const readings = [reading(0, 3), reading(2, 3), reading(4, 2)];
    expect(known(estimateDemand(inputs({ readings, waterChanges }), day(4))).demandMeqLPerDay).toBeCloseTo(0, 12);
  });

  it('counts a single dose once, by its instant', () => {
    const supply = [{ from: day(1), to: day(1), meqL: 0.6 }];
    const readings = [reading(0, 3), reading(2, 3.2), reading(4, 2.8)];
    expect(known(estimateDemand(inputs({ readings, supply }), day(4))).demandMeqLPerDay).toBeCloseTo(0.2, 12);
  });

  it('shows the level as it would have been with nothing added', () => {
    const readings = [reading(0, 3), reading(3, 3), reading(6, 3)];
    const { points } = known(estimateDemand(inputs({ readings, supply: [steady(0, 6, 0.4)] }), day(6)));
    const [first, middle, last] = points.map(({ correctedMeqL }) => correctedMeqL);
    expect(first).toBeCloseTo(3, 12);
    expect(middle).toBeCloseTo(1.8, 12);
    expect(last).toBeCloseTo(0.6, 12);
    expect(points.map(({ measuredMeqL, fittedMeqL }) => measuredMeqL - fittedMeqL)).toEqual([
      expect.closeTo(0, 12),
      expect.closeTo(0, 12),
      expect.closeTo(0, 12),
    ]);
  });
});

describe('demand of an exact system', () => {
  it('comes back whatever the supply, the water changes and the dates', () => {
    const change = fc.record({
      at: fc.double({ min: 0.5, max: 12.5, noNaN: true }).map(day),
      fraction: fc.double({ min: 0, max: 0.6, noNaN: true }),
      alkalinityMeqL: fc.double({ min: 1, max: 5, noNaN: true }),
    });
    fc.assert(
      fc.property(
        fc.double({ min: 1.5, max: 5, noNaN: true }),
        fc.double({ min: 0, max: 1.5, noNaN: true }),
        fc.double({ min: 0, max: 1.5, noNaN: true }),
        fc.uniqueArray(change, { maxLength: 4, selector: ({ at }) => at }),
        fc.uniqueArray(fc.integer({ min: 1, max: 12 }), { minLength: 2, maxLength: 8 }),
        (start, demand, perDay, waterChanges, others) => {
          const days = [0, ...others.sort((a, b) => a - b), 13];
          const readings = levels(start, demand, perDay, waterChanges, days);
          const estimate = known(
            estimateDemand(inputs({ readings, waterChanges, supply: [steady(-1, 14, perDay)] }), day(13)),
          );
          expect(estimate.demandMeqLPerDay).toBeCloseTo(demand, 8);
          expect(estimate.low).toBeLessThanOrEqual(demand + 1e-8);
          expect(estimate.high).toBeGreaterThanOrEqual(demand - 1e-8);
        },
      ),
    );
  });

  it('moves by a constant when all supply does, and not at all when all levels do', () => {
    const readings = [reading(0, 3), reading(2, 2.83), reading(5, 2.9), reading(9, 2.61)];
    const plain = known(estimateDemand(inputs({ readings }), day(9))).demandMeqLPerDay;
    const fed = known(estimateDemand(inputs({ readings, supply: [steady(0, 9, 0.25)] }), day(9))).demandMeqLPerDay;
    const lifted = readings.map((each) => ({ ...each, meqL: each.meqL + 1 }));
    expect(fed - plain).toBeCloseTo(0.25, 12);
    expect(known(estimateDemand(inputs({ readings: lifted }), day(9))).demandMeqLPerDay).toBeCloseTo(plain, 12);
  });

  it('when all the water was changed in between, still tells the demand', () => {
    const waterChanges = [{ at: day(1), fraction: 1, alkalinityMeqL: 3 }];
    const readings = levels(2, 0.2, 0, waterChanges, [0, 2, 4]);
    expect(known(estimateDemand(inputs({ readings, waterChanges }), day(4))).demandMeqLPerDay).toBeCloseTo(0.2, 10);
  });
});

describe('the window', () => {
  // Falls 0.3 a day until day 10 and 0.1 a day after.
  const readings = [0, 2, 4, 6, 8, 10, 12, 14, 16, 18, 20].map((at) =>
    reading(at, 6 - 0.3 * Math.min(at, 10) - 0.1 * Math.max(0, at - 10)),
  );

  it('when it holds enough tests, leaves older ones out', () => {
    const estimate = known(estimateDemand(inputs({ readings }), day(20), 10));
    expect(estimate).toMatchObject({ from: day(10), to: day(20), readings: 6 });
    expect(estimate.demandMeqLPerDay).toBeCloseTo(0.1, 12);
  });

  it('when it holds too few, is twice as long', () => {
    const estimate = known(estimateDemand(inputs({ readings }), day(20), 3));
    expect(estimate).toMatchObject({ from: day(14), to: day(20), readings: 4 });
  });

  it('leaves out tests from after its end', () => {
    expect(known(estimateDemand(inputs({ readings }), day(8), 8)).demandMeqLPerDay).toBeCloseTo(0.3, 12);
  });
});

describe('not enough data', () => {
  it.each([
    ['no readings', [], 'too_few_readings'],
    ['two readings', [reading(0, 3), reading(9, 2)], 'too_few_readings'],
    ['three in a day and a half', [reading(8, 3), reading(9, 3), reading(9.5, 3)], 'too_short'],
    ['three at one instant', [reading(9, 3), reading(9, 3), reading(9, 3)], 'too_short'],
    ['three, two of them long ago', [reading(-30, 3), reading(-26, 3), reading(9, 3)], 'too_few_readings'],
    ['three, one of them no number', [reading(1, 3), reading(5, Number.NaN), reading(9, 3)], 'too_few_readings'],
    ['three, one of them without an error', [reading(1, 3), reading(5, 3, 0), reading(9, 3)], 'too_few_readings'],
  ])('with %s, says so', (_, readings, reason) => {
    expect(estimateDemand(inputs({ readings }), day(10))).toMatchObject({ enough: false, reason });
  });

  it('never shows a figure that is no number', () => {
    const anyReading = fc.record({
      at: fc.integer({ min: 0, max: day(14) }),
      meqL: fc.double({ min: -1, max: 20 }),
      sd: fc.double({ min: 0, max: 2 }),
    });
    fc.assert(
      fc.property(fc.array(anyReading, { maxLength: 12 }), (readings) => {
        const estimate = estimateDemand(
          inputs({ readings: readings.filter(({ sd }) => !(sd > 0 && sd < 1e-3)) }),
          day(14),
        );
        const { from, to, supplyMeqLPerDay } = estimate;
        const more = estimate.enough
          ? [estimate.demandMeqLPerDay, estimate.standardError, estimate.low, estimate.high]
          : [];
        expect([from, to, supplyMeqLPerDay, ...more].every(Number.isFinite)).toBe(true);
      }),
    );
  });
});
