import { describe, expect, it } from 'vitest';
import { demandByDay, type DayDemandInputs } from '../../../../shared/domain/demand/demand-by-day.ts';
import reference from '../../../reference/demand.json' with { type: 'json' };
import { simulateSystem, type Regime, type SimulatedSystem } from '../../../support/demand-simulation.ts';

/** The first days tell too little to be counted. */
const BURN_IN_DAYS = 7;

const published: SimulatedSystem[] = reference.series.map((series) => ({
  readings: series.readings.map(([day = 0, level = 0]) => [day, level] as const),
  supply: series.supply.map(([from = 0, to = 0, perDay = 0]) => [from, to, perDay] as const),
  waterChanges: series.waterChanges.map(([day = 0, fraction = 0, level = 0]) => [day, fraction, level] as const),
  testSd: series.testSd,
  truth: series.truth.map(([, demand = 0]) => demand),
}));

interface Miss {
  error: number;
  isCovered: boolean;
}

function missesOf(system: SimulatedSystem): { filtered: Miss[]; smoothed: Miss[] } {
  const found = demandByDay(system);
  const missOf = (value: number | undefined, sd: number | undefined, index: number): Miss => {
    const truth = system.truth[Math.floor(found.days[index] ?? 0)] ?? Number.NaN;
    const error = (value ?? Number.NaN) - truth;
    return { error, isCovered: Math.abs(error) <= 1.96 * (sd ?? 0) };
  };
  const isCounted = (_: unknown, index: number) => (found.days[index] ?? 0) - (found.days[0] ?? 0) >= BURN_IN_DAYS;
  return {
    filtered: found.demand.map((value, at) => missOf(value, found.demandSd[at], at)).filter(isCounted),
    smoothed: found.demandSmoothed.map((value, at) => missOf(value, found.demandSmoothedSd[at], at)).filter(isCounted),
  };
}

const rms = (errors: readonly number[]) => Math.sqrt(errors.reduce((sum, each) => sum + each ** 2, 0) / errors.length);
const coverage = (misses: readonly Miss[]) => misses.filter(({ isCovered }) => isCovered).length / misses.length;
const errorsOf = (misses: readonly Miss[]) => misses.map(({ error }) => error);

/** What two tests a day apart say: the fall of the level plus what was supplied between them. */
function plainErrors({ readings, supply, waterChanges, truth }: SimulatedSystem): number[] {
  return readings.slice(1).flatMap(([day, level], index) => {
    const [before = 0, levelBefore = 0] = readings[index] ?? [];
    if (day - before > 1.01 || waterChanges.some(([at]) => at >= before && at <= day)) return [];
    const given = supply.reduce(
      (sum, [from, to, perDay]) => sum + perDay * Math.max(0, Math.min(to, day) - Math.max(from, before)),
      0,
    );
    return [(levelBefore - level + given) / (day - before) - (truth[Math.floor(day)] ?? Number.NaN)];
  });
}

describe('systems of known demand that were simulated elsewhere', () => {
  it('when tests are daily, errs a third as much as plain differences of tests, or less', () => {
    const daily = published.filter((system) => plainErrors(system).length > 0);

    expect(daily).toHaveLength(3);
    for (const system of daily) {
      expect(rms(errorsOf(missesOf(system).filtered))).toBeLessThan(rms(plainErrors(system)) / 3);
    }
  });

  it('has 95 % intervals that cover 93 to 97 of 100 true demands, told at once or in hindsight', () => {
    const all = published.map(missesOf);

    for (const of of [all.flatMap(({ filtered }) => filtered), all.flatMap(({ smoothed }) => smoothed)]) {
      expect(of.length).toBeGreaterThan(400);
      expect(coverage(of)).toBeGreaterThan(0.93);
      expect(coverage(of)).toBeLessThan(0.97);
    }
  });

  it('flags none of their readings, since none is mistyped', () => {
    expect(published.flatMap((system) => demandByDay(system).flagged).filter(Boolean)).toEqual([]);
  });
});

describe('systems of known demand that are simulated here', () => {
  const SEEDS = Array.from({ length: 16 }, (_, index) => index + 1);
  const regimes: readonly [Regime, number, number][] = [
    ['steady', 1, 0.054],
    ['growing', 1, 0.054],
    ['growing', 7, 0.054],
    ['shock', 1, 0.054],
    ['harvest', 1, 0.107],
  ];

  // Weekly tests are few: the wide spread of what systems may do still counts there, so those intervals are wide.
  it.each(regimes)('when %s and tested every %i days with an error of %f, covers what it says', (regime, every, sd) => {
    const all = SEEDS.map((seed) => missesOf(simulateSystem(seed, { regime, testEveryDays: every, testSd: sd })));

    for (const of of [all.flatMap(({ filtered }) => filtered), all.flatMap(({ smoothed }) => smoothed)]) {
      expect(coverage(of)).toBeGreaterThan(0.93);
      expect(coverage(of)).toBeLessThan(every === 1 ? 0.98 : 0.99);
    }
  });

  it.each([
    ['half as large again as stated', 0.08, 0.05],
    ['two thirds of what is stated', 0.036, 0.05],
    ['as stated, but a fifth of the supply is not as logged', 0.054, 0.2],
  ])('when errors of tests are %s, intervals learn it', (_, testSd, supplyError) => {
    const all = SEEDS.map((seed) => {
      const system = simulateSystem(seed, { regime: 'growing', testEveryDays: 1, testSd, supplyError });
      return missesOf({ ...system, testSd: 0.054 });
    });

    expect(coverage(all.flatMap(({ filtered }) => filtered))).toBeGreaterThan(0.92);
    expect(coverage(all.flatMap(({ smoothed }) => smoothed))).toBeGreaterThan(0.92);
  });

  it('when readings end earlier, all that was told up to then is the same: no estimate knows the future', () => {
    const system = simulateSystem(7, { regime: 'shock', testEveryDays: 1, testSd: 0.054 });
    const short: DayDemandInputs = { ...system, readings: system.readings.slice(0, 60) };
    const [all, until] = [demandByDay(system), demandByDay(short)];

    expect(until.demand).toHaveLength(60);
    expect(all.demand.slice(0, 60)).toEqual(until.demand);
    expect(all.demandSd.slice(0, 60)).toEqual(until.demandSd);
    expect(all.demandSmoothed[59]).not.toBe(until.demandSmoothed[59]);
  });
});
