import type { Demand } from '../../shared/contracts/demand.ts';
import { CALCIUM_MG_PER_MEQ } from '../../shared/domain/dose-effect.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { TOLD_BY_DAYS, toldBy } from '../../shared/domain/demand/told.ts';
import {
  REACH_95,
  trackDemand,
  type DemandPoint,
  type DemandTrack,
  type Estimate,
} from '../../shared/domain/demand/track-demand.ts';
import type { Db } from '../db/client.ts';
import { systemSupply, type SystemSupply } from './demand-inputs.ts';
import type { Solute } from './supplement-supply.ts';
import type { SystemRow } from './systems.ts';

/** Tests of eight months tell the noises well; what is older adds next to nothing to the demand of now. */
const LOOK_BACK_DAYS = 240;
/** Before the first day that is asked for, there is as much to learn from. */
const LEARNING_DAYS = 60;

/** Usual sizes of demand beside that of alkalinity in meq/L: corals lay down little magnesium (no source). */
const SCALE: Record<Solute, number> = { alkalinity: 1, calcium: CALCIUM_MG_PER_MEQ, magnesium: 2 };

export interface SystemTrack {
  supply: SystemSupply;
  track: DemandTrack;
  /** The readings among the points that count. */
  trusted: DemandPoint[];
  now: number;
  demand: Demand;
}

/** Follows a system's level and demand up to now, at its tests and the marks. */
export function trackSystem(
  db: Db,
  system: SystemRow,
  { now, marks = [], solute = 'alkalinity' }: { now: number; marks?: readonly number[]; solute?: Solute },
): SystemTrack {
  const asked = marks.reduce((first, mark) => Math.min(first, mark), now) - LEARNING_DAYS * MS_PER_DAY;
  const from = Math.min(asked, now - LOOK_BACK_DAYS * MS_PER_DAY);
  const supply = systemSupply(db, system, { from, now, solute });
  const track = trackDemand(supply.demandInputs, { marks: [...marks, now], scale: SCALE[solute] });
  const trusted = track.points.filter(({ reading, flagged }) => reading && !flagged);
  return { supply, track, trusted, now, demand: demandAt(track, trusted, now) };
}

function demandAt(track: DemandTrack, trusted: readonly DemandPoint[], now: number): Demand {
  const { lacks, ...told } = toldBy(trusted, now);
  const basis = { ...told, windowDays: TOLD_BY_DAYS };
  const found = pointAt(track, now);
  if (lacks || !found) return { enough: false, ...basis, reason: lacks ?? 'too_few_readings' };
  const { demand, low, high } = rangeOf(found.demand);
  return { enough: true, ...basis, demand, low, high };
}

/** Demand of now with its standard deviation; null where tests don't tell it. */
export function demandNow({ track, demand, now }: SystemTrack): Estimate | null {
  return demand.enough ? (pointAt(track, now)?.demand ?? null) : null;
}

/** What is known at one of the marks. */
export function pointAt(track: DemandTrack, instant: number): DemandPoint | undefined {
  return track.points.findLast(({ at, reading }) => at === instant && !reading);
}

export function rangeOf({ value, sd }: Estimate): { demand: number; low: number; high: number } {
  return { demand: value, low: value - REACH_95 * sd, high: value + REACH_95 * sd };
}
