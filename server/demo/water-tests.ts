import { weekdayOf, type Day } from '../../shared/domain/days.ts';
import type { ParameterCode } from '../../shared/domain/units.ts';
import { inHeat } from './heat.ts';
import { measured, readingWriter } from './readings.ts';
import { advance } from './water-system.ts';
import { daysToEnd, type DemoSystem, type World } from './world.ts';
import type { Actor } from '../db/write.ts';

type Other = Exclude<ParameterCode, 'alkalinity'>;

/** Where each parameter lingers and how far it strays from one day to the next. */
const LINGERS: Record<Other, { mean: number; stray: number }> = {
  calcium: { mean: 432, stray: 3 },
  magnesium: { mean: 1345, stray: 6 },
  salinity: { mean: 35, stray: 0.08 },
  temperature: { mean: 25.7, stray: 0.08 },
  ph: { mean: 8.18, stray: 0.015 },
  nitrate: { mean: 6, stray: 0.35 },
  phosphate: { mean: 0.06, stray: 0.004 },
};
/** Part of the way back to where it lingers that a parameter goes in a day. */
const RETURN = 0.08;
const HEAT_C = 3.4;

const OFTEN: readonly Other[] = ['temperature', 'salinity', 'ph'];
const WEEKLY: readonly Other[] = ['calcium', 'magnesium', 'nitrate', 'phosphate'];

/** While its photometer is away, the broodstock is tested on these days before the end only. */
const PHOTOMETER_AWAY_DAYS = 35;
const TESTED_ELSEWHERE = [19, 5];

/** How often a test is done twice, and how far the two lie from their mean then; canonical. */
const TWICE: Partial<Record<ParameterCode, { chance: number; apart: number }>> = {
  calcium: { chance: 0.2, apart: 5 },
  nitrate: { chance: 0.1, apart: 0.2 },
};

/** The morning's tests of one system: those that are due on this day, with the errors that tests have. */
export interface WaterTests {
  /** @returns the alkalinity that the test showed, or null where none was due */
  round(system: DemoSystem, index: number, day: Day, at: number, by: Actor): number | null;
}

export function waterTests(world: World): WaterTests {
  const write = readingWriter(world.sqlite, world.deps.newId);
  const chance = world.chance('tests');
  const doubles = world.chance('tests done twice');
  const drift = new Map(world.systems.map((system) => [system, driftOf(world, system)]));

  return {
    round(system, index, day, at, by) {
      advance(system, at);
      system.truth.days.push({ day, demandMeqLPerDay: system.demand, alkalinityMeqL: system.alkalinity });
      const values = drift.get(system)?.(index) ?? new Map<Other, number>();
      const log = (parameter: ParameterCode, value: number) => {
        const apart = doubles.happens(TWICE[parameter]?.chance ?? 0) ? (TWICE[parameter]?.apart ?? 0) : 0;
        const reading = { systemId: system.id, parameter, value, takenAt: at, note: '', apart };
        write(reading, world.kits[parameter], by, system.spec.code);
      };

      for (const [parameter, value] of values) {
        if (isDue(world, system, parameter, index, day)) log(parameter, measured(parameter, value, chance));
      }
      if (!isTested(world, system, index, day)) return null;
      const shown = measured('alkalinity', system.alkalinity, chance, errorsOf(world, system, index));
      log('alkalinity', shown);
      return shown;
    },
  };
}

/** The slow ways of a system's other parameters, day by day. */
function driftOf(world: World, system: DemoSystem): (index: number) => Map<Other, number> {
  const chance = world.chance(`drift ${system.spec.code}`);
  const values = new Map(Object.entries(LINGERS).map(([code, { mean }]) => [code as Other, mean]));
  return (index) => {
    for (const [code, value] of values) {
      const { mean, stray } = LINGERS[code];
      values.set(code, value + RETURN * (mean - value) + chance.normal(0, stray));
    }
    const shown = new Map(values);
    if (inHeat(world, system, index)) shown.set('temperature', (values.get('temperature') ?? 0) + HEAT_C);
    return shown;
  };
}

function isTested(world: World, { spec }: DemoSystem, index: number, day: Day): boolean {
  const toEnd = daysToEnd(world, index);
  if (spec.kind === 'broodstock' && toEnd <= PHOTOMETER_AWAY_DAYS) return TESTED_ELSEWHERE.includes(toEnd);
  return toEnd === 0 || spec.testDays.includes(weekdayOf(day));
}

function isDue(world: World, system: DemoSystem, parameter: Other, index: number, day: Day): boolean {
  if (parameter === 'temperature' && inHeat(world, system, index)) return true;
  const weekday = weekdayOf(day);
  if (OFTEN.includes(parameter)) return [1, 3, 5].includes(weekday);
  return WEEKLY.includes(parameter) && weekday === 1 + (world.systems.indexOf(system) % 5);
}

/** The last tests of the system that slips are lucky ones, so that its fall is plain to see. */
function errorsOf(world: World, { spec }: DemoSystem, index: number): number {
  return spec.code === 'D' && daysToEnd(world, index) <= 3 ? 0.15 : 1;
}
