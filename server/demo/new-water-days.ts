import type { CartridgeStage } from '../../shared/domain/cartridges.ts';
import { MS_PER_DAY, MS_PER_HOUR } from '../../shared/domain/days.ts';
import type { Actor, Write } from '../db/write.ts';
import { installCartridge, logMakeUpReading } from '../services/make-up-service.ts';
import { mixSaltBatch } from '../services/salt-batch-service.ts';
import { setWaterChangePlan } from '../services/water-change-plan-service.ts';
import type { Chance } from './chance.ts';
import { needSupply } from './supply-days.ts';
import type { World } from './world.ts';

/** The make-up water is looked at every week, over so many weeks before the end. */
const WEEKS = 52;
const LITRES_A_WEEK = 1450;
/** TDS comes through the resin after so many weeks and it is replaced; at the end it is so many weeks old. */
const RESIN_WEEKS = 11;
const RESIN_AGE_WEEKS = 7;
/** Filters before the membrane were replaced so many days before the end: half a year is over soon. */
const FILTERS_BEFORE = [345, 165];
const SALT_G_PER_L = 38;

type Put = (daysBefore: number, actor: Actor, act: (write: Write) => void) => void;

/** Puts the make-up water's log, its cartridges, the habits of water changes and new salt water on the agenda. */
export function planNewWater(world: World): void {
  // Ids of its own leave those of the rest of the farm as they are.
  const ids = world.chance('new water ids');
  const put: Put = (daysBefore, actor, act) => {
    const at = Math.round(world.now - daysBefore * MS_PER_DAY - 2.5 * MS_PER_HOUR);
    world.agenda.put(at, actor, (write) => act({ ...write, newId: () => ids.uuid() }));
  };
  const first = Math.min(world.days.length - 2, WEEKS * 7);
  put(first, world.staff.owner, (write) => setHabits(world, write));
  planUnit(world, put, first);
  planMixes(world, put);
}

function setHabits(world: World, write: Write): void {
  for (const { spec, id } of world.systems) {
    const habit = spec.kind === 'quarantine' ? { everyDays: 7, fraction: 0.12 } : { everyDays: 14, fraction: 0.06 };
    setWaterChangePlan(write, id, habit);
  }
}

function planUnit({ chance, staff }: World, put: Put, first: number): void {
  const inUse = new Map<CartridgeStage, string>();
  const install =
    (stage: CartridgeStage, name: string, life: { lifeDays?: number; limit?: number }) => (write: Write) => {
      const replacesId = inUse.get(stage) ?? null;
      inUse.set(stage, installCartridge(write, { stage, name, note: '', replacesId, ...life }).id);
    };
  const resin = install('resin', 'Mixed-bed resin', { limit: 1 });
  put(first, staff.owner, install('membrane', 'Membrane, thin film', { lifeDays: 730, limit: 90 }));
  put(first, staff.owner, resin);
  for (const before of FILTERS_BEFORE.filter((day) => day < first)) {
    put(before, staff.grower, install('sediment', 'Sediment, 5 µm', { lifeDays: 180 }));
    put(before, staff.grower, install('carbon', 'Carbon block', { lifeDays: 180 }));
  }
  const taps = chance('make-up water');
  for (let week = Math.floor(first / 7) - 1; week >= 0; week -= 1) {
    const isThrough = week > 0 && (week - RESIN_AGE_WEEKS) % RESIN_WEEKS === 0;
    put(week * 7, week % 3 === 0 ? staff.grower2 : staff.grower, (write) => {
      look(write, taps, WEEKS - week, isThrough);
      if (isThrough) resin(write);
    });
  }
}

/** A membrane lets a little more through every month. */
function look(write: Write, chance: Chance, membraneWeeks: number, isThrough: boolean): void {
  const tdsIn = Math.round(chance.normal(312, 14));
  logMakeUpReading(write, {
    ...{ tdsIn, tdsMembrane: Math.round(tdsIn * (0.02 + 0.0004 * membraneWeeks) + chance.between(-0.5, 0.5)) },
    ...{ tdsOut: isThrough ? 2 : chance.happens(0.1) ? 1 : 0 },
    ...{ litresMade: Math.round(chance.normal(LITRES_A_WEEK, 120) / 10) * 10, note: '' },
  });
}

/** One mix that is tested and ready, one that still turns. */
function planMixes(world: World, put: Put): void {
  const { grower, grower2 } = world.staff;
  const mix = (litres: number, tested: object) => (write: Write) => {
    const saltG = litres * SALT_G_PER_L;
    needSupply(world, write, world.items.salt, saltG);
    mixSaltBatch(write, { litres, saltG, readyHours: 18, note: '', ...tested });
  };
  const tested = { salinity: 35.1, alkalinityMeqL: 3, calciumMgL: 428, magnesiumMgL: 1340, temperatureC: 25.1 };
  put(1, grower, mix(300, tested));
  put(0, grower2, mix(240, { salinity: 34.8 }));
}
