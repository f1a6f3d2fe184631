import type { DayDemandInputs } from '../../shared/domain/demand/demand-by-day.ts';

/** A system whose demand is known: what was tested and added in its days, and what was really taken. */
export interface SimulatedSystem extends DayDemandInputs {
  /** True demand of each day from 0. */
  truth: number[];
}

export type Regime = 'steady' | 'growing' | 'shock' | 'harvest';

interface Choices {
  regime: Regime;
  testEveryDays: number;
  testSd: number;
  /** Part by which each day's supply differs from the logged one. */
  supplyError?: number;
  /** Part of the days that are tested where tests are daily; people miss some. */
  testedPart?: number;
  days?: number;
}

/**
 * A system that is run like a farm: supply is set anew each week after the last test, a tenth of the water is changed every
 * four weeks. Demand wanders by 0.008 meq/L a day each day; it grows, or falls at once, or is cut every six weeks.
 */
export function simulateSystem(seed: number, choices: Choices): SimulatedSystem {
  const { regime, testEveryDays, testSd, supplyError = 0.05, testedPart = 0.6, days = 300 } = choices;
  const chance = chanceFrom(seed);
  const [system, truth]: [DayDemandInputs & Lists, number[]] = [
    { readings: [], supply: [], waterChanges: [], testSd },
    [],
  ];
  let [demand, level, supply, setAt, shown] = [0.4, 3, 0.4, 0, 3];
  const shockDay = 60 + Math.floor(chance.even() * 120);
  const shock = chance.even() < 0.5 ? 0.6 : 1.5;
  const live = (length: number) => {
    level += (supply * (1 + (supplyError * chance.normal()) / Math.sqrt(length)) - demand) * length;
  };
  for (let day = 0; day < days; day += 1) {
    const growth = regime === 'growing' ? 1.002 : 1;
    if (day > 0) demand = Math.max(0.02, demand * growth + 0.008 * chance.normal());
    if (regime === 'shock' && day === shockDay) demand *= shock;
    if (regime === 'harvest' && day > 0 && day % 42 === 0) demand *= 0.85;
    truth.push(demand);
    if (day > 0 && day % 28 === 0) {
      level = 0.9 * level + 0.1 * 2.6;
      system.waterChanges.push([day, 0.1, 2.6]);
    }
    live(0.25);
    const isTested = testEveryDays > 1 ? day % testEveryDays === 0 : chance.even() < testedPart;
    if (isTested) {
      shown = level + testSd * chance.normal();
      system.readings.push([day + 0.25, shown]);
    }
    if (day % 7 === 0) {
      system.supply.push([setAt, day + 0.25, supply]);
      setAt = day + 0.25;
      supply = Math.min(1.5, Math.max(0, supply + (0.1 * (3 - shown)) / 7));
    }
    live(0.75);
  }
  system.supply.push([setAt, days, supply]);
  return { ...system, truth };
}

interface Lists {
  readings: [number, number][];
  supply: [number, number, number][];
  waterChanges: [number, number, number][];
}

/** Seeded chance: the same seed gives the same numbers (mulberry32, and normal ones by Box & Muller). */
function chanceFrom(seed: number): { even: () => number; normal: () => number } {
  let state = (seed * 2_654_435_761) >>> 0;
  const even = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
  return { even, normal: () => Math.sqrt(-2 * Math.log(1 - even())) * Math.cos(2 * Math.PI * even()) };
}
