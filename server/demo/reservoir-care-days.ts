import type { Day } from '../../shared/domain/days.ts';
import { strengthByConductivity } from '../../shared/domain/reservoir-strength.ts';
import type { Write } from '../db/write.ts';
import { changeLimewaterHabits } from '../services/limewater-habits-service.ts';
import { checkStrength, removeSludge } from '../services/reservoir-service.ts';
import { advance, CYCLE_DAYS, standbyOf } from './water-system.ts';
import { daysToEnd, growerOf, timeOn, type DemoSystem, type World } from './world.ts';

/** The farm's own reading of fresh saturated limewater, mS/cm, and what its level spoon holds, g. */
const FRESH_MS_CM = 9.9;
const SPOON_G = 2.6;
/** Days before a changeover that the next reservoir is mixed, and that it is checked. */
const MIXED_BEFORE_DAYS = 2;
const CHECKED_BEFORE_DAYS = 1;
/** One in so many mixes is checked; sludge is taken out of both reservoirs in two of so many cycles. */
const CHECK_EVERY = 4;
const SLUDGE_EVERY = 8;
const SLUDGE_L = 1;
/** Stronger than this there is vinegar in it, which spoils the reading. */
const WITHOUT_VINEGAR_MEQ_L = 38;
/** Nobody has taken the sludge out of system A for so long: it is due. */
const FORGOTTEN_DAYS = 62;

/** Puts a day's care of the reservoirs on the agenda: sludge out before a mix, strength checked after it. */
export function planReservoirCare(world: World, index: number, day: Day): void {
  const grower = growerOf(world, index);
  if (index === 1) {
    world.agenda.put(timeOn(day, 11 * 60), grower, (write) => changeLimewaterHabits(write, { spoonG: SPOON_G }));
  }
  world.systems.forEach((system, number) => {
    const toEnd = daysToEnd(world, index);
    const cycle = (before: number) => (toEnd - before - system.spec.changeOverOffset) / CYCLE_DAYS;
    const [mixing, checking] = [cycle(MIXED_BEFORE_DAYS), cycle(CHECKED_BEFORE_DAYS)];
    if (Number.isInteger(mixing) && mixing >= 0 && isSludgeCycle(system, mixing, toEnd)) {
      world.agenda.put(timeOn(day, 14 * 60 + 25 + number), grower, (write) => takeSludgeOut(write, system));
    }
    if (Number.isInteger(checking) && checking >= 0 && checking % CHECK_EVERY === 1) {
      world.agenda.put(timeOn(day, 10 * 60 + 40 + number), grower, (write) => check(write, system));
    }
  });
}

function isSludgeCycle({ spec }: DemoSystem, cycle: number, toEnd: number): boolean {
  const isForgotten = spec.code === 'A' && toEnd < FORGOTTEN_DAYS;
  return [2, 3].includes(cycle % SLUDGE_EVERY) && !isForgotten;
}

function takeSludgeOut(write: Write, system: DemoSystem): void {
  advance(system, write.now);
  const reservoir = standbyOf(system);
  if (!reservoir || reservoir.levelL < SLUDGE_L) return;
  const levelL = Math.round((reservoir.levelL - SLUDGE_L) * 10) / 10;
  removeSludge(write, reservoir.id, { levelBeforeL: reservoir.levelL, levelL, note: '' });
  reservoir.levelL = levelL;
}

/** The meter finds what was mixed: nothing is lost under a cover in a day. */
function check(write: Write, system: DemoSystem): void {
  const reservoir = standbyOf(system);
  if (!reservoir || reservoir.strength <= 0 || reservoir.strength > WITHOUT_VINEGAR_MEQ_L) return;
  const conductivityMsCm = readingFor(reservoir.strength);
  checkStrength(write, reservoir.id, { conductivityMsCm, freshMsCm: FRESH_MS_CM, note: '' });
}

/** What the meter shows for a strength, to its hundredths, by halving the range that it lies in. */
function readingFor(strengthMeqL: number): number {
  let [low, high] = [0.01, FRESH_MS_CM];
  for (let step = 0; step < 30; step += 1) {
    const middle = (low + high) / 2;
    if (strengthByConductivity(middle, FRESH_MS_CM) < strengthMeqL) low = middle;
    else high = middle;
  }
  return Math.round(high * 100) / 100;
}
