import { and, asc, eq, gt, isNull } from 'drizzle-orm';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { litresPerDay } from '../../shared/domain/reservoir-use.ts';
import type { Db } from '../db/client.ts';
import { reservoirEvents, systems } from '../db/schema/index.ts';
import { reservoirsOfSystem } from './reservoir-feeds.ts';
import { systemUse } from './reservoir-use.ts';

/** How fast a system takes limewater, and the refills that say how it was mixed. */
export interface LimewaterUse {
  systemCode: string;
  litresPerDay: number;
  refills: { id: string; waterL: number }[];
}

/** A reservoir may stand full for weeks, so the mix is looked for over twice the days of the use. */
const MIX_WINDOWS = 2;

/**
 * Systems whose use of limewater over the last days is known from the levels of their reservoirs. Only one of them is
 * online at a time, so their uses follow one another and make one rate. Of a shared reservoir each has its part of the
 * use, and the whole refills, since only their water by lime counts.
 *
 * @param days length of the window of use
 */
export function limewaterUse(db: Db, now: number, days: number): LimewaterUse[] {
  const refills = refillsSince(db, now - MIX_WINDOWS * days * MS_PER_DAY);
  return activeSystems(db).flatMap(({ id, code }) => {
    const feeding = new Set(reservoirsOfSystem(db, id).map((reservoir) => reservoir.id));
    const own = refills.filter(({ reservoirId }) => feeding.has(reservoirId));
    if (own.length === 0) return [];
    const intervals = systemUse(db, id, now, days).flatMap((use) => use.intervals);
    const perDay = litresPerDay(intervals, now, days);
    return perDay === null ? [] : [{ systemCode: code, litresPerDay: perDay, refills: own }];
  });
}

function activeSystems(db: Db) {
  return db
    .select({ id: systems.id, code: systems.code })
    .from(systems)
    .where(isNull(systems.retiredAt))
    .orderBy(asc(systems.code))
    .all();
}

function refillsSince(db: Db, since: number) {
  return db
    .select({ id: reservoirEvents.id, waterL: reservoirEvents.waterL, reservoirId: reservoirEvents.reservoirId })
    .from(reservoirEvents)
    .where(and(eq(reservoirEvents.kind, 'refill'), gt(reservoirEvents.at, since)))
    .all()
    .map(({ waterL, ...refill }) => ({ ...refill, waterL: waterL ?? 0 }));
}
