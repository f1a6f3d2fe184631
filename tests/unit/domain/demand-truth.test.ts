import { describe, expect, it } from 'vitest';
import { MS_PER_DAY } from '../../../shared/domain/days.ts';
import { demandHistory, estimateDemand } from '../../../shared/domain/demand.ts';
import reference from '../../reference/demand.json' with { type: 'json' };
import { day, inputs, reading, steady } from '../../support/demand-data.ts';

describe('demand of simulated systems with known truth', () => {
  const series = reference.series.map((system) => ({
    ...system,
    data: inputs({
      readings: system.readings.map(([at = 0, meqL = 0]) => reading(at, meqL, system.testSd)),
      supply: system.supply.map(([from = 0, to = 0, perDay = 0]) => steady(from, to, perDay)),
      waterChanges: system.waterChanges.map(([at = 0, fraction = 0, alkalinityMeqL = 0]) => ({
        ...{ at: day(at), fraction, alkalinityMeqL },
      })),
    }),
  }));

  type Series = (typeof series)[number];

  /** True mean demand between two instants. */
  function truthBetween({ truth }: Series, from: number, to: number): number {
    const inside = truth
      .filter(([at = 0]) => day(at) >= from - day(1) && day(at) <= to)
      .map(([, demand = 0]) => demand);
    return inside.reduce((sum, each) => sum + each, 0) / inside.length;
  }

  const rms = (errors: readonly number[]) =>
    Math.sqrt(errors.reduce((sum, each) => sum + each ** 2, 0) / errors.length);

  function historyErrors(system: Series, windowDays: number): number[] {
    return demandHistory(system.data, day(windowDays), day(300), windowDays).map(
      ({ from, to, demandMeqLPerDay }) => demandMeqLPerDay - truthBetween(system, from, to),
    );
  }

  /** What two tests alone say: fall of the level plus supply between them. */
  function plainErrors(system: Series): number[] {
    const { readings, supply, waterChanges } = system.data;
    return readings.slice(1).flatMap((next, index) => {
      const last = readings[index];
      if (!last || waterChanges.some(({ at }) => at >= last.at && at <= next.at)) return [];
      const pair = inputs({ readings: [last, next], supply });
      const basis = estimateDemand(pair, next.at, (next.at - last.at) / MS_PER_DAY + 1);
      const fall = (last.meqL - next.meqL) / ((next.at - last.at) / MS_PER_DAY);
      return [fall + basis.supplyMeqLPerDay - truthBetween(system, last.at, next.at)];
    });
  }

  it.each(series.filter(({ testEveryDays }) => testEveryDays === 1))(
    'seed $seed ($regime): a two-week window errs less than half of plain differences of tests',
    (system) => {
      const errors = historyErrors(system, 14);
      expect(errors.length).toBeGreaterThan(30);
      expect(rms(errors)).toBeLessThan(rms(plainErrors(system)) / 2);
      expect(rms(errors)).toBeLessThan(0.06);
    },
  );

  it('seed 103, tested weekly: four weeks of tests come within 0.03 meq/L a day', () => {
    const weekly = series.find(({ seed }) => seed === 103);
    expect(weekly && rms(historyErrors(weekly, 28))).toBeLessThan(0.03);
  });

  it('the 95 % interval covers the true mean about as often as it says', () => {
    const covered = series.flatMap((system) =>
      demandHistory(system.data, day(28), day(300), system.testEveryDays === 1 ? 14 : 28).map(
        ({ from, to, low, high }) => {
          const truth = truthBetween(system, from, to);
          return truth >= low && truth <= high;
        },
      ),
    );
    expect(covered.filter(Boolean).length / covered.length).toBeGreaterThan(0.9);
  });

  it('seed 103, tested weekly: the usual window is widened rather than left without an estimate', () => {
    const weekly = series.find(({ seed }) => seed === 103);
    const history = weekly ? demandHistory(weekly.data, day(28), day(300)) : [];
    expect(history.length).toBeGreaterThan(30);
    expect(weekly && rms(historyErrors(weekly, 14))).toBeLessThan(0.03);
  });

  it('gives one point a week, the newest at the end', () => {
    const [first] = series;
    const history = first ? demandHistory(first.data, day(20), day(48)) : [];
    expect(history.map(({ to }) => Math.round(to / MS_PER_DAY))).toHaveLength(5);
    expect(history.at(-1)?.to).toBeLessThanOrEqual(day(48));
    expect(history.at(-1)?.to).toBeGreaterThan(day(40));
  });
});
