import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { MS_PER_DAY } from '../../../../shared/domain/days.ts';
import type { DemandInputs, LevelReading } from '../../../../shared/domain/demand/inputs.ts';
import { trackDemand, type DemandPoint } from '../../../../shared/domain/demand/track-demand.ts';
import { day, inputs, reading, steady } from '../../../support/demand-data.ts';

const days = (count: number) => Array.from({ length: count }, (_, index) => index);

/** Tests without error of a system that takes `demand` and is given `supply`, each a day. */
function exact(count: number, demand: number, supply: number, start = 3): DemandInputs {
  const readings = days(count).map((at) => reading(at, start + (supply - demand) * at));
  return inputs({ readings, supply: [steady(-3, count, supply)] });
}

function lastOf({ points }: { points: DemandPoint[] }): DemandPoint {
  const last = points.at(-1);
  if (!last) throw new Error('Expected a point.');
  return last;
}

describe('a system of steady demand', () => {
  it('when what is given is not what it takes, is told by the fall of its level', () => {
    const { demand, level } = lastOf(trackDemand(exact(30, 0.5, 0.3)));

    expect(demand.value).toBeCloseTo(0.5, 3);
    expect(demand.sd).toBeLessThan(0.03);
    expect(level.value).toBeCloseTo(3 - 29 * 0.2, 3);
  });

  // 10 % of water at 4 meq/L into 3 meq/L lifts the level by 0.1 on day 10, which is no negative demand.
  it('does not take a water change for a rise', () => {
    const readings = days(30).map((at) => reading(at, at <= 10 ? 3 : 3.1));
    const waterChanges = [{ at: day(10), fraction: 0.1, value: 4 }];
    const { points } = trackDemand(inputs({ readings, waterChanges }));

    for (const { demand } of points.slice(5)) expect(demand.value).toBeCloseTo(0, 3);
  });

  it('takes a test at the instant of a water change or of a dose as made before it', () => {
    const readings = days(12).map((at) => reading(at, at <= 5 ? 3 : 2));
    const halved = trackDemand(inputs({ readings, waterChanges: [{ at: day(5), fraction: 0.5, value: 1 }] }));
    const dosed = trackDemand(
      inputs({
        readings: days(12).map((at) => reading(at, at <= 5 ? 3 : 3.6)),
        supply: [{ from: day(5), to: day(5), meqL: 0.6 }],
      }),
    );

    expect(lastOf(halved).demand.value).toBeCloseTo(0, 3);
    expect(lastOf(dosed).demand.value).toBeCloseTo(0, 3);
  });

  it('gives a careful test more weight than a rough one', () => {
    const of = (sd: number) =>
      lastOf(trackDemand(inputs({ readings: [...days(8).map((at) => reading(at, 3)), reading(8, 2.9, sd)] }))).demand;

    expect(of(0.02).value).toBeGreaterThan(2 * of(0.2).value);
  });

  it('with the driver given, tells demand as a factor of the coral mass, and forecasts by it', () => {
    const massAt = (at: number) => 1 + at / day(50);
    // With demand 0.2 × mass the level falls by 0.2 (t + t²/100).
    const readings = days(51).map((at) => reading(at, 8 - 0.2 * (at + at ** 2 / 100)));
    const found = trackDemand({ ...inputs({ readings }), massAt }, { marks: [day(75)] });

    expect(found.points[50]?.demand.value).toBeCloseTo(0.4, 2);
    expect(lastOf(found).demand.value).toBeCloseTo(0.5, 2);
  });
});

describe('what one instant says', () => {
  it('before any two tests is what is given, and wide', () => {
    const [first] = trackDemand(exact(5, 0.5, 0.3)).points;

    expect(first?.demand.value).toBeCloseTo(0.3, 9);
    expect(first?.demand.sd).toBeGreaterThan(0.3);
    expect(first?.expected).toBeNull();
  });

  it('narrows with every test, and widens again without', () => {
    const marks = [12, 19, 26, 40].map(day);
    const { points } = trackDemand(exact(10, 0.5, 0.3), { marks });
    const errors = points.slice(1).map(({ demand }) => demand.sd);

    expect(errors.slice(0, 9)).toEqual([...errors.slice(0, 9)].sort((a, b) => b - a));
    expect(errors.slice(8)).toEqual([...errors.slice(8)].sort((a, b) => a - b));
    expect(points.slice(-4).map(({ reading: none }) => none)).toEqual([null, null, null, null]);
    for (const { demand } of points.slice(-4)) expect(demand.value).toBeCloseTo(points[9]?.demand.value ?? 0, 9);
  });

  it('in hindsight is surer than at once, and the same at the last test', () => {
    const { points } = trackDemand(exact(20, 0.5, 0.3));
    const last = points[19];

    for (const { demand, smoothedDemand } of points.slice(1, -1)) expect(smoothedDemand.sd).toBeLessThan(demand.sd);
    expect(last?.smoothedDemand.value).toBeCloseTo(last?.demand.value ?? 0, 3);
    expect((last?.smoothedDemand.sd ?? 0) / (last?.demand.sd ?? 1)).toBeCloseTo(1, 1);
  });

  it('with no readings at all, is nothing', () => {
    expect(trackDemand(inputs({}), { marks: [day(1)] }).points).toEqual([]);
  });
});

describe('a reading that cannot be', () => {
  const usual = exact(30, 0.4, 0.4);
  const withValue = (at: number, value: number): DemandInputs => ({
    ...usual,
    readings: usual.readings.map((each) => (each.at === day(at) ? { ...each, value } : each)),
  });
  const flaggedDays = (found: { points: DemandPoint[] }) =>
    found.points.filter(({ flagged }) => flagged).map(({ at }) => at / MS_PER_DAY);

  it('when one is mistyped tenfold, is flagged and kept, and moves the demand by less than its error', () => {
    const [wrong, right] = [trackDemand(withValue(15, 30)), trackDemand(usual)];

    expect(flaggedDays(wrong)).toEqual([15]);
    expect(wrong.points[15]).toMatchObject({ reading: { value: 30 }, flagged: true });
    expect(wrong.points[15]?.expected?.value).toBeCloseTo(3, 1);
    wrong.points.forEach(({ demand }, at) => {
      expect(Math.abs(demand.value - (right.points[at]?.demand.value ?? 0))).toBeLessThan(0.5 * demand.sd);
    });
  });

  it('when the last one is mistyped, is flagged at once', () => {
    expect(flaggedDays(trackDemand(withValue(29, 0.3)))).toEqual([29]);
  });

  it('when the very first is mistyped, the good ones after it win', () => {
    const { points } = trackDemand(withValue(0, 30));

    expect(points.at(-1)?.demand.value).toBeCloseTo(0.4, 1);
    expect(points.at(-1)?.flagged).toBe(false);
  });

  it('when two in a row are off to the same side, takes them for a step that nobody logged', () => {
    const overfilled = {
      ...usual,
      readings: usual.readings.map((each) => (each.at >= day(15) ? { ...each, value: each.value + 1 } : each)),
    };
    const found = trackDemand(overfilled);

    expect(flaggedDays(found)).toEqual([]);
    expect(found.points.filter(({ stepped }) => stepped).map(({ at }) => at / MS_PER_DAY)).toEqual([15]);
    expect(lastOf(found).level.value).toBeCloseTo(4, 1);
    expect(lastOf(found).demand.value).toBeCloseTo(0.4, 1);
    expect(found.points[13]?.smoothedLevel.value).toBeCloseTo(3, 1);
  });

  it('when two in a row are off to different sides, flags both', () => {
    const twice = withValue(15, 30);
    const readings = twice.readings.map((each) => (each.at === day(16) ? { ...each, value: 0.3 } : each));

    expect(flaggedDays(trackDemand({ ...twice, readings }))).toEqual([15, 16]);
  });

  it('when demand doubles under weekly tests, learns it from the second one on', () => {
    const readings = days(20).map((week) => reading(7 * week, 3 - 0.4 * Math.max(0, 7 * (week - 9))));
    const { points } = trackDemand(inputs({ readings, supply: [steady(0, 140, 0.4)] }));

    expect(points[12]?.demand.value).toBeCloseTo(0.8, 1);
    expect(points[12]?.flagged).toBe(false);
  });
});

describe('laws', () => {
  const level = fc.double({ min: 1, max: 5, noNaN: true });
  const gap = fc.double({ min: 0.2, max: 9, noNaN: true });
  const change = fc.record({
    at: fc.double({ min: 0, max: 60, noNaN: true }).map(day),
    fraction: fc.double({ min: 0, max: 1, noNaN: true }),
    value: level,
  });
  const readingsIn = fc.array(fc.tuple(gap, level), { minLength: 2, maxLength: 12 }).map((pairs) => {
    let at = 0;
    return pairs.map(([days, value]): LevelReading => reading((at += days), value));
  });
  const problem = fc.record({ readings: readingsIn, waterChanges: fc.array(change, { maxLength: 4 }) });

  it('looking in between changes nothing: steps of any length are exact', () => {
    fc.assert(
      fc.property(problem, fc.array(fc.double({ min: 0, max: 60, noNaN: true }), { maxLength: 8 }), (each, marks) => {
        const asked = { ...inputs(each), supply: [steady(0, 20, 0.4), steady(10, 50, 0.2)] };
        const plain = trackDemand(asked).points;
        const marked = trackDemand(asked, { marks: marks.map(day) }).points.filter((point) => point.reading);

        marked.forEach((point, index) => {
          expect(point.demand.value).toBeCloseTo(plain[index]?.demand.value ?? Number.NaN, 6);
          expect(point.demand.sd).toBeCloseTo(plain[index]?.demand.sd ?? Number.NaN, 6);
          expect(point.smoothedDemand.value).toBeCloseTo(plain[index]?.smoothedDemand.value ?? Number.NaN, 6);
        });
      }),
      { numRuns: 60 },
    );
  });

  it('the order in which things were written down does not matter', () => {
    fc.assert(
      fc.property(problem, (each) => {
        const turned = {
          readings: [...each.readings].reverse(),
          waterChanges: [...each.waterChanges].reverse(),
        };
        const [one, other] = [trackDemand(inputs(each)), trackDemand(inputs(turned))];
        expect(other.points.map(({ demand }) => demand)).toEqual(one.points.map(({ demand }) => demand));
      }),
      { numRuns: 40 },
    );
  });

  it('calcium with twenty times the figures gives twenty times the demand', () => {
    fc.assert(
      fc.property(problem, ({ readings, waterChanges }) => {
        const twenty = (value: number) => value * 20;
        const scaled = inputs({
          readings: readings.map((each) => ({ ...each, value: twenty(each.value), sd: twenty(each.sd) })),
          waterChanges: waterChanges.map((each) => ({ ...each, value: twenty(each.value) })),
        });
        const one = lastOf(trackDemand(inputs({ readings, waterChanges })));
        const other = lastOf(trackDemand(scaled, { scale: 20 }));
        expect(other.demand.value).toBeCloseTo(twenty(one.demand.value), 5);
        expect(other.demand.sd).toBeCloseTo(twenty(one.demand.sd), 5);
      }),
      { numRuns: 40 },
    );
  });

  it('whatever is typed, every figure is a number and every error above zero', () => {
    const wild = fc.record({
      at: fc.integer({ min: 0, max: day(30) }),
      value: fc.double({ min: -1, max: 200, noNaN: true }),
      sd: fc.double({ min: 1e-3, max: 2, noNaN: true }),
    });
    fc.assert(
      fc.property(fc.array(wild, { maxLength: 14 }), (readings) => {
        for (const { demand, level: found, smoothedDemand } of trackDemand(inputs({ readings })).points) {
          const figures = [demand.value, found.value, smoothedDemand.value];
          expect(figures.every(Number.isFinite)).toBe(true);
          expect(Math.min(demand.sd, found.sd, smoothedDemand.sd)).toBeGreaterThan(0);
        }
      }),
    );
  });

  it.each([
    ['without an error', { at: 0, value: 3, sd: 0 }],
    ['that is no number', { at: 0, value: Number.NaN, sd: 0.05 }],
    ['without a time', { at: Number.NaN, value: 3, sd: 0.05 }],
  ])('a reading %s is refused', (_, wrong) => {
    expect(() => trackDemand(inputs({ readings: [wrong] }))).toThrow('an error above zero');
  });
});
