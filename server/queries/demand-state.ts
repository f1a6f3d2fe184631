import { and, eq, isNull, sql } from 'drizzle-orm';
import type { Demand } from '../../shared/contracts/demand.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import type { Estimate } from '../../shared/domain/demand/track-demand.ts';
import { TOLD_BY_DAYS, toldBy } from '../../shared/domain/demand/told.ts';
import type { Db } from '../db/client.ts';
import { demandStates, systems } from '../db/schema/index.ts';
import { demandNow, rangeOf, type SystemTrack, trackSystem } from './demand-track.ts';
import type { Solute } from './supplement-supply.ts';
import type { SystemRow } from './systems.ts';

export type DemandStateRow = typeof demandStates.$inferSelect;

/** Demand of now with its standard deviation, from what is kept of it where that still holds. */
export function knownDemand(
  db: Db,
  system: SystemRow,
  now: number,
  solute: Solute = 'alkalinity',
): { demand: Demand; estimate: Estimate | null } {
  const kept = db
    .select()
    .from(demandStates)
    .where(and(eq(demandStates.systemId, system.id), eq(demandStates.parameter, solute)))
    .get();
  if (kept && kept.at <= now) return fromState(kept, now);
  const found = trackSystem(db, system, { now, solute });
  return { demand: found.demand, estimate: demandNow(found) };
}

/** Without a test since then the demand is as it was, and less sure from day to day. */
function fromState(kept: DemandStateRow, now: number): { demand: Demand; estimate: Estimate | null } {
  const { lacks, ...told } = toldBy(
    kept.testedAt.map((at) => ({ at })),
    now,
  );
  const basis = { ...told, windowDays: TOLD_BY_DAYS };
  if (lacks) return { demand: { enough: false, ...basis, reason: lacks }, estimate: null };
  const days = (now - kept.at) / MS_PER_DAY;
  const estimate = { value: kept.demand, sd: Math.sqrt(kept.variance + days * kept.driftVariance) };
  return { demand: { enough: true, ...basis, ...rangeOf(estimate) }, estimate };
}

/** What is to be kept of a system's demand; null where it has no tests at all. */
export function demandStateOf({ supply, track, trusted, now }: SystemTrack, systemId: string): DemandStateRow | null {
  const latest = track.points.at(-1);
  if (!latest) return null;
  return {
    ...{ systemId, parameter: supply.solute, at: now },
    ...{ demand: latest.demand.value, variance: latest.demand.sd ** 2, driftVariance: track.noise.driftVariance },
    testedAt: trusted.map(({ at }) => at).filter((at) => at >= now - TOLD_BY_DAYS * MS_PER_DAY),
  };
}

/** Systems in use that were tested and of whose demand nothing is kept. */
export function systemsToKeep(db: Db, solute: Solute): SystemRow[] {
  const { id } = systems;
  const isKept = sql`EXISTS (SELECT 1 FROM demand_state AS s WHERE s.system_id = ${id} AND s.parameter = ${solute})`;
  const isTested = sql`EXISTS (SELECT 1 FROM reading AS r WHERE r.system_id = ${id} AND r.parameter = ${solute})`;
  return db
    .select()
    .from(systems)
    .where(and(isNull(systems.retiredAt), sql`NOT ${isKept}`, isTested))
    .orderBy(systems.code)
    .all();
}
