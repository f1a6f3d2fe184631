import { isNull } from 'drizzle-orm';
import type { Db } from '../db/client.ts';
import { systems } from '../db/schema/index.ts';
import { knownDemand } from './demand-state.ts';

/** Alkalinity that the corals of all systems with a known demand take, meq a day; null where none is known. */
export function alkalinityTakenPerDay(db: Db, now: number): number | null {
  const rows = db.select().from(systems).where(isNull(systems.retiredAt)).all();
  const known = rows.flatMap((system) => {
    const { demand } = knownDemand(db, system, now);
    return demand.enough ? [Math.max(0, demand.demand) * system.netVolumeL] : [];
  });
  return known.length > 0 ? known.reduce((sum, meq) => sum + meq, 0) : null;
}
