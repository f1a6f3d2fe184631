import { daysToEnd, type DemoSystem, type World } from './world.ts';

/** The chiller of system C failed so many days before the end, for so many days. */
export const HEAT_SYSTEM = 'C';
export const HEAT_FROM = 236;
export const HEAT_DAYS = 4;
/** Part of the pieces that it killed within the days after. */
export const HEAT_LOSSES = 0.2;
/** How much calcification fell, and the days that it took to come back. */
const SLACK = 0.45;
const RECOVERY_DAYS = 28;

export function inHeat(world: World, { spec }: DemoSystem, index: number): boolean {
  const since = HEAT_FROM - daysToEnd(world, index);
  return spec.code === HEAT_SYSTEM && since >= 0 && since < HEAT_DAYS;
}

/** Part of the usual calcification on a day, 0 to 1. */
export function vigourOn(world: World, { spec }: DemoSystem, index: number): number {
  const since = HEAT_FROM - daysToEnd(world, index);
  if (spec.code !== HEAT_SYSTEM || since < 0 || since > RECOVERY_DAYS) return 1;
  return 1 - SLACK * (1 - since / RECOVERY_DAYS);
}
