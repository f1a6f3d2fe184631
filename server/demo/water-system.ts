import { limeForStrength } from '../../shared/domain/limewater.ts';
import { saturatedStrength } from '../../shared/domain/limewater-ceiling.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import type { DemoReservoir, DemoSystem } from './world.ts';

/** Where the farm wants alkalinity to be, meq/L: 8.25 dKH. */
export const TARGET = 2.94;
const VINEGAR_ML_PER_L = 5;
const PURITY = 0.95;
/** Lime that nobody weighs to the last tenth leaves a little of the solubility unused. */
const NEARLY_FULL = 0.985;
/** Days that a reservoir is online. */
export const CYCLE_DAYS = 6;

/** Lets the corals take and the limewater flow up to an instant. */
export function advance(system: DemoSystem, to: number): void {
  const days = (to - system.at) / MS_PER_DAY;
  const online = onlineOf(system);
  const litres = online ? Math.min(online.levelL, system.flow * days) : 0;
  system.alkalinity += (litres * (online?.strength ?? 0)) / system.spec.netVolumeL - system.demand * days;
  if (online) online.levelL -= litres;
  system.at = to;
}

export function onlineOf({ reservoirs }: DemoSystem): DemoReservoir | undefined {
  return reservoirs.find(({ online }) => online);
}

export function standbyOf({ reservoirs }: DemoSystem): DemoReservoir | undefined {
  return reservoirs.find(({ online }) => !online);
}

/** Litres as a sight tube is read. */
export function readLevel(litres: number): number {
  return Math.round(Math.max(0, litres) * 10) / 10;
}

/** Limewater strength, meq/L, that keeps up with the corals for a cycle and brings alkalinity to where it is wanted. */
export function wantedStrength(system: DemoSystem, daysUntil: number, aim = TARGET, aimDays = CYCLE_DAYS): number {
  const { demand, alkalinity, flow, spec } = system;
  const online = onlineOf(system);
  const supply = online ? (flow * online.strength) / spec.netVolumeL : 0;
  const then = alkalinity + (supply - demand) * daysUntil;
  return Math.max(0, ((demand + (aim - then) / aimDays) * spec.netVolumeL) / flow);
}

export interface Mix {
  waterL: number;
  limeG: number;
  vinegarMl: number;
}

/**
 * What to weigh in so that a reservoir has a strength, as near as it dissolves.
 *
 * @param restL litres that are still in it, at the strength of the reservoir
 */
export function mixFor(reservoir: DemoReservoir, restL: number, waterL: number, strength: number): Mix {
  const fresh = Math.max(0, (strength * (restL + waterL) - reservoir.strength * restL) / waterL);
  const vinegarMl = fresh > saturatedStrength() * NEARLY_FULL ? Math.round(VINEGAR_ML_PER_L * waterL) : 0;
  const most = saturatedStrength(vinegarMl / waterL) * NEARLY_FULL;
  const mix = { waterL, purity: PURITY, temperatureC: 25, vinegarMl };
  const limeG = limeForStrength({ ...mix, alkalinityMeqL: Math.min(fresh, most) });
  return { waterL, limeG: Math.round(limeG), vinegarMl };
}
