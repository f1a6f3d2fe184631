import { desc, eq, isNull, sql, sum } from 'drizzle-orm';
import type { DosingRate } from '../../shared/contracts/dosing.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { emptyAt } from '../../shared/domain/reservoir-use.ts';
import { factorAt, type DatedFactor } from '../../shared/domain/pump-calibration.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { dosingBookings, dosingPumps, dosingRates, items, lots, systems } from '../db/schema/index.ts';
import { type RateRow, windowOf } from './dosed-amounts.ts';
import { factorsByPump } from './dosing-pumps.ts';
import { systemRow } from './systems.ts';

/** Beside the running ones so many that ended are shown. */
const MOST_SHOWN = 20;
/** What lasts longer than that lasts long enough. */
const FORESEEN_DAYS = 730;

/** What is dosed steadily now, in every system. */
export function runningRates(db: Db, now: number): DosingRate[] {
  return toRates(db, rates(db).where(isNull(dosingRates.toAt)).orderBy(systems.code, items.name).all(), now);
}

/** Steady dosing of a system: running ones first, then the latest that ended. */
export function systemRates(db: Db, systemId: string, now: number): DosingRate[] {
  systemRow(db, systemId);
  const rows = rates(db)
    .where(eq(dosingRates.systemId, systemId))
    .orderBy(desc(sql`${dosingRates.toAt} IS NULL`), desc(dosingRates.fromAt))
    .limit(MOST_SHOWN)
    .all();
  return toRates(db, rows, now);
}

/** @throws {DomainError} `record.not_found` */
export function showRate(db: Db, rateId: string, now: number): DosingRate {
  const [shown] = toRates(db, rates(db).where(eq(dosingRates.id, rateId)).all(), now);
  if (!shown) throw new DomainError('record.not_found', 'This dose is not known. Someone may have taken it back.');
  return shown;
}

/** @throws {DomainError} `record.not_found` */
export function rateRow(db: Db, rateId: string): RateRow {
  const row = db.select().from(dosingRates).where(eq(dosingRates.id, rateId)).get();
  if (!row) throw new DomainError('record.not_found', 'This dose is not known. Someone may have taken it back.');
  return row;
}

function rates(db: Db) {
  return db
    .select({ rate: dosingRates, system: systems, item: items, pumpCode: dosingPumps.code })
    .from(dosingRates)
    .innerJoin(systems, eq(systems.id, dosingRates.systemId))
    .innerJoin(items, eq(items.id, dosingRates.itemId))
    .leftJoin(dosingPumps, eq(dosingPumps.id, dosingRates.pumpId))
    .$dynamic();
}

function toRates(db: Db, rows: ReturnType<ReturnType<typeof rates>['all']>, now: number): DosingRate[] {
  const factors = factorsByPump(db);
  const lasts = lastsUntil(db, factors, now);
  return rows.map(({ rate, system, item, pumpCode }) => {
    const { id, systemId, itemId, pumpId, amountPerDay, fromAt, toAt, by, endedBy, note } = rate;
    const givenPerDay = givenBy(rate, factors, Math.min(now, toAt ?? now));
    const per = (amount: number | null) => (givenPerDay * (amount ?? 0)) / system.netVolumeL;
    return {
      ...{ id, systemId, systemCode: system.code, itemId, itemName: item.name, unit: item.unit, pumpId, pumpCode },
      ...{ amountPerDay, givenPerDay, window: windowOf(rate), fromAt, toAt, by, endedBy, note },
      brings: {
        ...{ alkalinityMeqL: per(item.strength), calciumMgL: per(item.calciumMg), magnesiumMgL: per(item.magnesiumMg) },
      },
      unbooked: unbookedOf(db, id),
      lastsUntil: toAt === null ? (lasts.get(itemId) ?? null) : null,
    };
  });
}

function givenBy({ pumpId, amountPerDay }: RateRow, factors: ReadonlyMap<string, DatedFactor[]>, at: number): number {
  return amountPerDay * factorAt(pumpId === null ? [] : (factors.get(pumpId) ?? []), at);
}

/** When each supplement that runs now is through, all that it runs into counted together. */
function lastsUntil(db: Db, factors: ReadonlyMap<string, DatedFactor[]>, now: number): Map<string, number | null> {
  const perDay = new Map<string, number>();
  for (const rate of db.select().from(dosingRates).where(isNull(dosingRates.toAt)).all()) {
    perDay.set(rate.itemId, (perDay.get(rate.itemId) ?? 0) + givenBy(rate, factors, now));
  }
  return new Map(
    [...perDay].map(([itemId, use]) => {
      const at = emptyAt(onHandOf(db, itemId), use, now);
      return [itemId, at !== null && at < now + FORESEEN_DAYS * MS_PER_DAY ? at : null];
    }),
  );
}

function onHandOf(db: Db, itemId: string): number {
  const held = db
    .select({ amount: sum(lots.remaining) })
    .from(lots)
    .where(eq(lots.itemId, itemId))
    .get();
  return Number(held?.amount ?? 0);
}

function unbookedOf(db: Db, rateId: string): number {
  const row = db
    .select({ amount: sql<number>`total(${dosingBookings.amount} - ${dosingBookings.booked})` })
    .from(dosingBookings)
    .where(eq(dosingBookings.rateId, rateId))
    .get();
  return row?.amount ?? 0;
}
