import { instantAt, type Day } from '../../shared/domain/days.ts';
import type { GROWTH_FORMS } from '../../shared/domain/growth.ts';
import type { Sqlite } from '../db/client.ts';
import type { Actor } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import type { Agenda } from './agenda.ts';
import type { Chance } from './chance.ts';
import { FARM, type StaffKey } from './scenario/farm.ts';
import type { LineSpec } from './scenario/lines.ts';
import type { ItemKey, ItemSpec } from './scenario/supplies.ts';
import type { SystemSpec } from './scenario/systems.ts';
import type { ParameterCode } from '../../shared/domain/units.ts';
import type { DemoTruth, SystemTruth } from './truth.ts';

/** The whole simulated farm: the records it keeps (through `deps`) and what is really so (the rest). */
export interface World {
  deps: Deps;
  sqlite: Sqlite;
  agenda: Agenda;
  chance: (name: string) => Chance;
  /** The end of the history. */
  now: number;
  /** Days of ordinary work, oldest first. The day of the end is played separately. */
  days: readonly Day[];
  staff: Record<StaffKey, Actor>;
  buyers: readonly Actor[];
  items: Record<ItemKey, DemoItem>;
  systems: readonly DemoSystem[];
  kits: DemoKits;
  lines: readonly DemoLine[];
  mothers: DemoMother[];
  batches: DemoBatch[];
  truth: DemoTruth;
}

export interface DemoItem extends ItemSpec {
  id: string;
  /** Packs on their way. */
  ordered: boolean;
}

export interface DemoSystem {
  spec: SystemSpec;
  id: string;
  racks: DemoRack[];
  reservoirs: DemoReservoir[];
  /** Alkalinity now, meq/L, and the instant that it is worked out for. */
  alkalinity: number;
  at: number;
  /** What the corals take today, meq/L, and what evaporates today, L. */
  demand: number;
  flow: number;
  /** Part of the usual calcification, lower after a heat event. */
  vigour: number;
  truth: SystemTruth;
}

export interface DemoReservoir {
  id: string;
  volumeL: number;
  belowIntakeL: number;
  levelL: number;
  strength: number;
  online: boolean;
}

export interface DemoRack {
  id: string;
  code: string;
  system: DemoSystem;
  stage: 'nursery' | 'grow' | 'mothers';
  free: number;
  withheld: boolean;
}

/** What a parameter is tested with now. */
export interface DemoKit {
  methodId: string;
  method: string;
  unit: string;
  repeatabilitySd: number;
  kitLotId: string | null;
  /** The last check, and how much too high it found the kit to read. */
  check: { id: string; bias: number; biasSd: number } | null;
}
export type DemoKits = Record<ParameterCode, DemoKit>;

export interface DemoLine {
  spec: LineSpec;
  form: (typeof GROWTH_FORMS)[number];
  id: string;
  mmPerWeek: number;
  survival: number;
  /** How much stores want it; 1 is usual. */
  wanted: number;
}

export interface DemoMother {
  id: string;
  code: string;
  line: DemoLine;
  system: DemoSystem;
  restDays: number;
  sizeMm: number;
  /** Index of the day of its last cut. */
  lastCut: number | null;
  from: number;
}

export interface DemoPlug {
  code: string;
  batch: DemoBatch;
  rack: DemoRack | null;
  state: 'bench' | 'rack' | 'order' | 'gone';
  /** Its size beside the mean of its batch. */
  relative: number;
}

export interface DemoBatch {
  id: string;
  code: string;
  line: DemoLine;
  system: DemoSystem;
  /** Index of the day of the cut. */
  cutIndex: number;
  startMm: number;
  plugs: DemoPlug[];
}

/** The instant of a time of day, minutes after midnight. Noon is never skipped by a clock change. */
export function timeOn(day: Day, minute: number): number {
  return instantAt(day, 720, FARM.timeZone) + (minute - 720) * 60_000;
}

/** Index from 0; ends fall below zero only before the first day. */
export function daysToEnd(world: World, index: number): number {
  return world.days.length - index;
}

/** Who does today's work in the wet. */
export function growerOf(world: World, index: number): Actor {
  return index % 7 < 4 ? world.staff.grower : world.staff.grower2;
}
