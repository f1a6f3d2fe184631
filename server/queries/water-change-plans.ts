import { and, asc, desc, eq, isNull, sql, sum } from 'drizzle-orm';
import type { WaterChangePlan, WaterChangePlans } from '../../shared/contracts/water-change-plans.ts';
import { addDays, type Day, dayOf, daysBetween } from '../../shared/domain/days.ts';
import { nextChangeOn, plannedChanges, saltForWater } from '../../shared/domain/water-change-plan.ts';
import type { Db } from '../db/client.ts';
import { items, lots, readings, saltBatches, systems, waterChangePlans, waterChanges } from '../db/schema/index.ts';
import { farmOf } from './farm.ts';
import { systemRow, type SystemRow } from './systems.ts';

const HORIZON_DAYS = 28;
/** New water is mixed to it; ppt. */
const USUAL_SALINITY = 35;
const MOVED = ['alkalinity', 'calcium', 'magnesium', 'nitrate', 'salinity'] as const;

/** When each system is due for a water change, and what the next weeks want. */
export function listWaterChangePlans(db: Db, now: number): WaterChangePlans {
  const active = db.select().from(systems).where(isNull(systems.retiredAt)).orderBy(asc(systems.code)).all();
  const plans = active.map((system) => toPlan(db, system, now));
  const stock = { readyL: readyLitres(db), saltOnHandG: saltOnHand(db) };
  return {
    items: plans,
    horizonDays: HORIZON_DAYS,
    coming: comingChanges(plans, dayOf(now, farmOf(db).timeZone), stock),
    salinity: USUAL_SALINITY,
    ...stock,
  };
}

/** @throws {DomainError} `record.not_found` */
export function showWaterChangePlan(db: Db, systemId: string, now: number): WaterChangePlan {
  return toPlan(db, systemRow(db, systemId), now);
}

function toPlan(db: Db, system: SystemRow, now: number): WaterChangePlan {
  const { timeZone } = farmOf(db);
  const today = dayOf(now, timeZone);
  const row = db.select().from(waterChangePlans).where(eq(waterChangePlans.systemId, system.id)).get();
  const changed = db
    .select()
    .from(waterChanges)
    .where(eq(waterChanges.systemId, system.id))
    .orderBy(desc(waterChanges.at))
    .limit(1)
    .get();
  const last = changed ? { at: changed.at, on: dayOf(changed.at, timeZone), litres: changed.litres } : null;
  const nextOn = row ? nextChangeOn(row, last?.on ?? null) : null;
  const { everyDays, fraction, startOn, by } = row ?? {};
  return {
    ...{ systemId: system.id, systemCode: system.code, systemName: system.name, netVolumeL: system.netVolumeL },
    plan:
      everyDays === undefined || fraction === undefined || startOn === undefined || by === undefined
        ? null
        : { everyDays, fraction, startOn, by, litres: fraction * system.netVolumeL },
    ...{ last, nextOn, daysLate: nextOn === null ? 0 : Math.max(0, daysBetween(nextOn, today)) },
    levels: latestLevels(db, system.id),
  };
}

function latestLevels(db: Db, systemId: string): WaterChangePlan['levels'] {
  const latest = MOVED.map((parameter) => {
    const row = db
      .select({ value: readings.value })
      .from(readings)
      .where(and(eq(readings.systemId, systemId), eq(readings.parameter, parameter)))
      .orderBy(desc(readings.takenAt))
      .limit(1)
      .get();
    return [parameter, row?.value ?? null] as const;
  });
  // Entries lose which keys there are; they are those of MOVED.
  return Object.fromEntries(latest) as WaterChangePlan['levels'];
}

/** Day by day what is to be changed, and what is left of new water and salt after each. */
function comingChanges(
  plans: readonly WaterChangePlan[],
  today: Day,
  { readyL, saltOnHandG }: { readyL: number; saltOnHandG: number },
): WaterChangePlans['coming'] {
  const until = addDays(today, HORIZON_DAYS);
  const changes = plans
    .flatMap(({ plan, last, systemId, systemCode }) =>
      plan === null
        ? []
        : plannedChanges(plan, last?.on ?? null, today, until).map((on) => ({
            ...{ on, systemId, systemCode, litres: plan.litres },
          })),
    )
    .sort((a, b) => a.on.localeCompare(b.on) || a.systemCode.localeCompare(b.systemCode));
  let [leftL, saltLeftG] = [readyL, saltOnHandG];
  return changes.map((change) => {
    const fromReady = Math.min(leftL, change.litres);
    leftL -= fromReady;
    const saltG = saltForWater(change.litres - fromReady, USUAL_SALINITY);
    saltLeftG -= saltG;
    return { ...change, saltG, leftL, saltLeftG };
  });
}

function readyLitres(db: Db): number {
  const row = db
    .select({ litres: sql<number>`total(${saltBatches.remainingL})` })
    .from(saltBatches)
    .where(isNull(saltBatches.discardedAt))
    .get();
  return row?.litres ?? 0;
}

function saltOnHand(db: Db): number {
  const row = db
    .select({ amount: sum(lots.remaining) })
    .from(lots)
    .innerJoin(items, eq(items.id, lots.itemId))
    .where(eq(items.kind, 'salt'))
    .get();
  return Number(row?.amount ?? 0);
}
