import { weekdayOf, type Day } from '../../shared/domain/days.ts';
import type { LossCause, LossSeen } from '../../shared/domain/losses.ts';
import type { Write } from '../db/write.ts';
import { logCut } from '../services/log-cut.ts';
import { measureStock } from '../services/measure-stock.ts';
import { placePlugs } from '../services/place-plugs.ts';
import { recordLoss } from '../services/remove-plugs.ts';
import { takeLabels } from '../services/take-labels.ts';
import type { Chance } from './chance.ts';
import { meanSize } from './coral-truth.ts';
import { deathsOf, heatDeaths, type Death } from './deaths.ts';
import { HEAT_DAYS, HEAT_FROM, HEAT_SYSTEM } from './heat.ts';
import { needSupply } from './supply-days.ts';
import {
  daysToEnd,
  growerOf,
  timeOn,
  type DemoBatch,
  type DemoMother,
  type DemoPlug,
  type DemoRack,
  type DemoSystem,
  type World,
} from './world.ts';

const CUT_WEEKDAYS = [2, 4];
/** A day on which two people in a hurry cut. */
export const ROUGH_DAY = 152;
/** Days after the cut on which pieces go on to brighter light, and are measured. */
const STEPS = [18, 68];
const MEASURED = [26, 54, 82, 110, 150, 200, 260];
const GLUE_G = 0.4;

export interface StockWork {
  plan(index: number, day: Day): void;
  cutNow(write: Write, index: number, day: Day, bench: boolean): DemoBatch | null;
}

/** The work with corals: cutting, placing, moving up in light, counting out the dead, measuring. */
export function stockWork(world: World): StockWork {
  const chance = world.chance('stock');
  const deaths = new Map<number, Death[]>();
  const addDeaths = (list: readonly Death[]) => {
    for (const death of list) deaths.set(death.index, [...(deaths.get(death.index) ?? []), death]);
  };

  function cutNow(write: Write, index: number, day: Day, bench: boolean): DemoBatch | null {
    const system = chooseSystem(world, chance);
    const mother = system && chooseMother(world, chance, index);
    if (!system || !mother) return null;
    const rack = system.racks.find(({ stage, free }) => stage === 'nursery' && free >= 60);
    if (!rack) return null;
    const pieces = piecesOf(mother, chance);
    const { plug, glue, label } = world.items;
    needSupply(world, write, plug, pieces);
    needSupply(world, write, glue, pieces * GLUE_G);
    needSupply(world, write, label, pieces);
    const { batchId, batchCode, plugs } = logCut(write, {
      ...{ colonyId: mother.id, cutOn: day, pieces, failedPieces: chance.int(4), note: '' },
      minutes: Math.round(pieces * chance.between(1.6, 2.4)),
      tool: mother.line.form.soldBy === 'size' ? 'Bone cutters' : 'Band saw',
      target: bench ? { kind: 'bench' } : { kind: 'rack', rackId: rack.id },
      ...{ plugItemId: plug.id, glueItemId: glue.id, gluePerPiece: GLUE_G },
    });
    takeLabels(write, { itemId: label.id, batchId, labels: pieces });
    mother.lastCut = index;
    const batch = newBatch(mother, system, batchId, batchCode, index);
    batch.plugs = plugs.map(({ code }) => newPlug(code, batch, bench ? null : rack, chance));
    if (!bench) rack.free -= pieces;
    world.batches.push(batch);
    addDeaths(deathsOf(batch, chance, daysToEnd(world, index) === ROUGH_DAY));
    return batch;
  }

  function plan(index: number, day: Day): void {
    const grower = growerOf(world, index);
    const toEnd = daysToEnd(world, index);
    if (CUT_WEEKDAYS.includes(weekdayOf(day)) || toEnd === ROUGH_DAY) planCuts(index, day);
    if (toEnd === HEAT_FROM - HEAT_DAYS + 2) addDeaths(heatDeaths(world, HEAT_SYSTEM, index, chance));
    const dead = deaths.get(index);
    if (dead) world.agenda.put(timeOn(day, 11 * 60 + 15), grower, (write) => countOut(write, dead));
    deaths.delete(index);
    for (const batch of world.batches) {
      const age = index - batch.cutIndex;
      if (STEPS.includes(age)) world.agenda.put(timeOn(day, 13 * 60), grower, (write) => moveUp(write, batch));
      if (MEASURED.includes(age))
        world.agenda.put(timeOn(day, 16 * 60), grower, (write) => measure(write, batch, index, chance));
    }
  }

  function planCuts(index: number, day: Day): void {
    const times = daysToEnd(world, index) === ROUGH_DAY ? 2 : 1;
    for (let number = 0; number < times; number += 1) {
      const at = timeOn(day, 10 * 60 + 30 + number * 75);
      const bench = chance.happens(0.3);
      world.agenda.put(at, growerOf(world, index + number * 4), (write) => {
        const batch = cutNow(write, index, day, bench);
        if (!batch || !bench) return;
        world.agenda.put(at + 3 * 3_600_000, write.actor, (later) => placeFromBench(later, batch));
      });
    }
  }

  return { plan, cutNow };
}

function chooseSystem(world: World, chance: Chance): DemoSystem | undefined {
  const hasRoom = (system: DemoSystem) => system.racks.some(({ stage, free }) => stage === 'nursery' && free >= 60);
  const open = world.systems.filter((system) => system.spec.share > 0 && hasRoom(system));
  const total = open.reduce((sum, { spec }) => sum + spec.share, 0);
  let left = chance.next() * total;
  return open.find(({ spec }) => (left -= spec.share) < 0) ?? open[0];
}

/** The rested mother of the line that runs shortest. */
function chooseMother(world: World, chance: Chance, index: number): DemoMother | undefined {
  const alive = new Map<string, number>();
  for (const { line, plugs } of world.batches) {
    const count = plugs.filter(({ state }) => state === 'rack' || state === 'bench').length;
    alive.set(line.id, (alive.get(line.id) ?? 0) + count);
  }
  const score = ({ line }: DemoMother) => (alive.get(line.id) ?? 0) / line.wanted + chance.between(0, 25);
  return world.mothers
    .filter(
      ({ lastCut, restDays, system }) =>
        system.spec.kind !== 'quarantine' && (lastCut === null || index - lastCut >= restDays),
    )
    .map((mother) => ({ mother, score: score(mother) }))
    .sort((a, b) => a.score - b.score)[0]?.mother;
}

function piecesOf({ line, sizeMm }: DemoMother, chance: Chance): number {
  const most = line.form.soldBy === 'heads' || line.form.soldBy === 'eyes' ? 34 : 50;
  return Math.round(chance.between(0.65, 1.05) * most * Math.min(1.1, sizeMm / 140));
}

function newBatch(mother: DemoMother, system: DemoSystem, id: string, code: string, cutIndex: number): DemoBatch {
  return { id, code, line: mother.line, system, cutIndex, startMm: mother.line.form.startMm, plugs: [] };
}

function newPlug(code: string, batch: DemoBatch, rack: DemoRack | null, chance: Chance): DemoPlug {
  return { code, batch, rack, state: rack ? 'rack' : 'bench', relative: Math.exp(chance.normal(0, 0.12)) };
}

function placeFromBench(write: Write, batch: DemoBatch): void {
  const waiting = batch.plugs.filter(({ state }) => state === 'bench');
  const rack = batch.system.racks.find(({ stage, free }) => stage === 'nursery' && free >= waiting.length);
  if (rack) place(write, waiting, rack);
}

/** On to the emptiest racks of the system; what finds no room stays. */
function moveUp(write: Write, batch: DemoBatch): void {
  const left = batch.plugs.filter(({ state, rack }) => state === 'rack' && !rack?.withheld);
  const from = new Set(left.map(({ rack }) => rack));
  const racks = batch.system.racks
    .filter((rack) => rack.stage === 'grow' && !rack.withheld && !from.has(rack) && rack.free > 0)
    .sort((a, b) => b.free - a.free);
  for (const rack of racks) place(write, left.splice(0, rack.free), rack);
}

export function place(write: Write, plugs: readonly DemoPlug[], rack: DemoRack): void {
  if (plugs.length === 0) return;
  placePlugs(write, { codes: plugs.map(({ code }) => code), rackId: rack.id, loose: false, note: '' });
  for (const plug of plugs) {
    if (plug.rack) plug.rack.free += 1;
    plug.rack = rack;
    plug.state = 'rack';
  }
  rack.free -= plugs.length;
}

function countOut(write: Write, dead: readonly Death[]): void {
  const groups = new Map<string, Death[]>();
  for (const death of dead.filter(({ plug }) => plug.state === 'rack')) {
    const key = `${death.plug.batch.id} ${death.seen} ${death.cause}`;
    groups.set(key, [...(groups.get(key) ?? []), death]);
  }
  for (const group of groups.values()) {
    const [first] = group;
    if (first)
      lose(
        write,
        group.map(({ plug }) => plug),
        first.seen,
        first.cause,
      );
  }
}

export function lose(write: Write, plugs: readonly DemoPlug[], seen: LossSeen, cause: LossCause): void {
  recordLoss(write, { codes: plugs.map(({ code }) => code), seen, cause, note: '' });
  for (const plug of plugs) leave(plug, 'gone');
}

/** A plug leaves its rack. */
export function leave(plug: DemoPlug, state: 'order' | 'gone'): void {
  if (plug.rack) plug.rack.free += 1;
  plug.rack = null;
  plug.state = state;
}

function measure(write: Write, batch: DemoBatch, index: number, chance: Chance): void {
  const alive = batch.plugs.filter(({ state }) => state === 'rack');
  if (alive.length === 0) return;
  const sample = Array.from({ length: Math.min(6, alive.length) }, () => chance.pick(alive));
  const sizesMm = sample.map(({ relative }) =>
    Math.max(1, Math.round(meanSize(batch, index) * relative * chance.normal(1, 0.03))),
  );
  measureStock(write, { batchId: batch.id, sizesMm });
}
