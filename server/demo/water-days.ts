import { weekdayOf, type Day } from '../../shared/domain/days.ts';
import type { Write } from '../db/write.ts';
import { logDose } from '../services/dose-service.ts';
import { refillReservoir } from '../services/refill-service.ts';
import { changeOver } from '../services/reservoir-changeover.ts';
import { logLevel } from '../services/reservoir-service.ts';
import { logWaterChange } from '../services/water-change-service.ts';
import type { Chance } from './chance.ts';
import { trueDemand } from './coral-truth.ts';
import { vigourOn } from './heat.ts';
import { needSupply } from './supply-days.ts';
import { advance, CYCLE_DAYS, mixFor, onlineOf, readLevel, standbyOf, wantedStrength } from './water-system.ts';
import type { WaterTests } from './water-tests.ts';
import { daysToEnd, growerOf, timeOn, type DemoReservoir, type DemoSystem, type World } from './world.ts';

/** A new mix is made so long before it is put online. */
const MIXED_BEFORE_DAYS = 2;
/** In the last weeks these systems are run by the book, so that one holds and one slips for one reason alone. */
const BY_THE_BOOK_DAYS = 24;
/** Where the system that slips stands at the end, meq/L: below its band. */
const SLIPPED = 2.56;
/** Part of the day's limewater ceiling that the crowded system needs in its last weeks; the others need less. */
const CROWDED = 0.93;
const ROOMY = 0.85;
const LAST_WEEKS_DAYS = 28;
const SATURATED_MEQ_L = 40.3;

/** Below it a supplement helps; quarantine, which has no limewater, is helped sooner. */
const DOSE_BELOW = { growout: 2.76, broodstock: 2.76, quarantine: 2.83 };
const DOSE_TO = 2.93;
const NEW_WATER = { alkalinityMeqL: 3, saltGPerL: 36 };

/** Puts a day's water work on the agenda. */
export function planWater(world: World, tests: WaterTests, chance: Chance, index: number, day: Day): void {
  const grower = growerOf(world, index);
  world.systems.forEach((system, number) => {
    startDay(world, system, chance, index, day);
    const after = (minute: number) => timeOn(day, minute + number * 11);
    world.agenda.put(after(8 * 60 + 5), grower, (write) => {
      const shown = tests.round(system, index, day, write.now, grower);
      if (isLevelDay(day)) lookAtLevel(write, system);
      if (shown !== null && shown < DOSE_BELOW[system.spec.kind] && mayDose(world, system, index))
        dose(world, write, system, shown);
    });
    if (isChangeOver(world, system, index)) {
      world.agenda.put(after(9 * 60 + 40), grower, (write) => putOnline(write, system));
    }
    if (isWaterChange(system, number, index, day)) {
      world.agenda.put(after(14 * 60), grower, (write) => changeWater(world, write, system));
    }
    if (isMixing(world, system, index)) {
      world.agenda.put(after(15 * 60 + 10), grower, (write) => mixStandby(world, write, system, chance, index));
    }
  });
}

/** On the first day both reservoirs are mixed and the first goes online. */
export function startLimewater(world: World, write: Write): void {
  for (const system of world.systems) {
    system.demand = trueDemand(world, system, 0);
    system.flow = usualFlow(system);
    const [first, second] = system.reservoirs;
    if (!first || !second) continue;
    const strength = wantedStrength(system, 0);
    mix(world, write, first, fullFor(system, first), strength);
    mix(world, write, second, fullFor(system, second), strength);
    putOnline(write, system);
  }
}

/** The corals grew, were cut and sold: what they take from today on. */
export function startDay(world: World, system: DemoSystem, chance: Chance, index: number, day: Day): void {
  advance(system, timeOn(day, 0));
  system.vigour = vigourOn(world, system, index);
  system.demand = trueDemand(world, system, index) * chance.normal(1, 0.01);
  system.flow = usualFlow(system) * seasonOf(day);
  if (daysToEnd(world, index) > LAST_WEEKS_DAYS || system.reservoirs.length === 0) return;
  const saturated = (system.demand * system.spec.netVolumeL) / SATURATED_MEQ_L;
  system.flow = system.spec.code === 'A' ? saturated / CROWDED : Math.max(system.flow, saturated / ROOMY);
}

export function lookAtLevel(write: Write, system: DemoSystem): void {
  const online = onlineOf(system);
  if (!online) return;
  advance(system, write.now);
  online.levelL = readLevel(online.levelL);
  logLevel(write, online.id, { levelL: online.levelL, note: '' });
}

function usualFlow({ spec }: DemoSystem): number {
  return spec.evaporation * spec.netVolumeL;
}

/** Warm dry air of the late summer takes most. */
function seasonOf(day: Day): number {
  const dayOfYear = (Date.parse(`${day}T00:00:00Z`) - Date.parse(`${day.slice(0, 4)}-01-01T00:00:00Z`)) / 86_400_000;
  return 1 + 0.1 * Math.cos((2 * Math.PI * (dayOfYear - 225)) / 365);
}

function isLevelDay(day: Day): boolean {
  return [1, 3, 5, 7].includes(weekdayOf(day));
}

function isChangeOver(world: World, system: DemoSystem, index: number): boolean {
  return system.reservoirs.length > 0 && daysToEnd(world, index) % CYCLE_DAYS === system.spec.changeOverOffset;
}

function isMixing(world: World, system: DemoSystem, index: number): boolean {
  const toChange = daysToEnd(world, index) - MIXED_BEFORE_DAYS;
  return system.reservoirs.length > 0 && toChange >= 0 && toChange % CYCLE_DAYS === system.spec.changeOverOffset;
}

function isWaterChange({ spec }: DemoSystem, number: number, index: number, day: Day): boolean {
  if (weekdayOf(day) !== 4) return false;
  return spec.kind === 'quarantine' || Math.floor(index / 7) % 2 === number % 2;
}

function isByTheBook(world: World, { spec }: DemoSystem, index: number): boolean {
  return ['B', 'D'].includes(spec.code) && daysToEnd(world, index) <= BY_THE_BOOK_DAYS;
}

function mayDose(world: World, system: DemoSystem, index: number): boolean {
  return !isByTheBook(world, system, index);
}

function putOnline(write: Write, system: DemoSystem): void {
  advance(system, write.now);
  const former = onlineOf(system);
  const next = standbyOf(system);
  if (!next || next.levelL <= 0) return;
  if (former) former.levelL = readLevel(former.levelL);
  changeOver(write, next.id, { note: '', ...(former ? { formerLevelL: former.levelL } : {}) });
  if (former) former.online = false;
  next.online = true;
}

function mixStandby(world: World, write: Write, system: DemoSystem, chance: Chance, index: number): void {
  advance(system, write.now);
  const reservoir = standbyOf(system);
  if (!reservoir) return;
  const toEnd = daysToEnd(world, index);
  const slips = system.spec.code === 'D' && toEnd === system.spec.changeOverOffset + MIXED_BEFORE_DAYS;
  const runsOut = system.spec.changeOverOffset === 0 && toEnd === CYCLE_DAYS + MIXED_BEFORE_DAYS;
  const untilOnline = MIXED_BEFORE_DAYS - 0.2;
  const daysOnline = system.spec.changeOverOffset + 0.1;
  const guess = isByTheBook(world, system, index) ? 1 : chance.normal(1, 0.05);
  const strength = slips
    ? wantedStrength(system, untilOnline, SLIPPED, daysOnline)
    : wantedStrength(system, untilOnline) * guess;
  mix(world, write, reservoir, runsOut ? lastingUntil(world, system, reservoir) : fullFor(system, reservoir), strength);
}

/** Enough for a cycle and a little more. */
function fullFor(system: DemoSystem, { volumeL }: DemoReservoir): number {
  return Math.min(volumeL, Math.round(system.flow * CYCLE_DAYS * 1.08));
}

/** What a reservoir must hold when it goes online in two days, to be nearly empty at the end. */
function lastingUntil(world: World, system: DemoSystem, { belowIntakeL }: DemoReservoir): number {
  const online = system.at + (MIXED_BEFORE_DAYS - 0.22) * 86_400_000;
  return Math.round(belowIntakeL + system.flow * ((world.now - online) / 86_400_000 + 4 / 24));
}

function mix(world: World, write: Write, reservoir: DemoReservoir, levelL: number, strength: number): void {
  const restL = readLevel(Math.min(reservoir.levelL, levelL / 2));
  const weighed = mixFor(reservoir, restL, Math.round((levelL - restL) * 10) / 10, strength);
  const { lime, vinegar } = world.items;
  needSupply(world, write, lime, weighed.limeG);
  needSupply(world, write, vinegar, weighed.vinegarMl);
  const { event } = refillReservoir(write, reservoir.id, {
    ...weighed,
    levelBeforeL: restL,
    temperatureC: 25,
    note: '',
  });
  reservoir.levelL = event.levelL;
  reservoir.strength = event.alkalinityMeqL;
}

function changeWater(world: World, write: Write, system: DemoSystem): void {
  advance(system, write.now);
  const fraction = system.spec.kind === 'quarantine' ? 0.12 : 0.06;
  const litres = Math.round((system.spec.netVolumeL * fraction) / 10) * 10;
  const saltG = litres * NEW_WATER.saltGPerL;
  needSupply(world, write, world.items.salt, saltG);
  logWaterChange(write, { systemId: system.id, litres, alkalinityMeqL: NEW_WATER.alkalinityMeqL, saltG });
  const part = litres / system.spec.netVolumeL;
  system.alkalinity = (1 - part) * system.alkalinity + part * NEW_WATER.alkalinityMeqL;
}

function dose(world: World, write: Write, system: DemoSystem, shown: number): void {
  const { supplement } = world.items;
  const meqPerMl = supplement.strength ?? 1;
  const amount = Math.round(((DOSE_TO - shown) * system.spec.netVolumeL) / meqPerMl / 10) * 10;
  if (amount <= 0) return;
  needSupply(world, write, supplement, amount);
  logDose(write, { systemId: system.id, itemId: supplement.id, amount, note: '' });
  system.alkalinity += (amount * meqPerMl) / system.spec.netVolumeL;
}
