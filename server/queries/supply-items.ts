import { and, eq, isNotNull, isNull, like, or, sql } from 'drizzle-orm';
import type { Item, ListItems, SupplyUse } from '../../shared/contracts/supplies.ts';
import { dayOf, type Day } from '../../shared/domain/days.ts';
import { reorderAdvice } from '../../shared/domain/supplies.ts';
import { supplyState, SUPPLY_STATES } from '../../shared/domain/supply-items.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { items, lots, suppliers } from '../db/schema/index.ts';
import { farmOf } from './farm.ts';
import { likePattern } from './like-pattern.ts';
import { supplyForecast } from './supply-forecast.ts';

/** All supplies that match, the most urgent first. */
export function listItems(db: Db, query: ListItems, now: number): Item[] {
  const pattern = query.search ? likePattern(query.search) : null;
  const rows = itemsWithStock(db)
    .where(
      and(
        query.retired === 'yes' ? isNotNull(items.retiredAt) : isNull(items.retiredAt),
        query.kind ? eq(items.kind, query.kind) : undefined,
        pattern ? or(matches(items.name, pattern), matches(items.code, pattern)) : undefined,
      ),
    )
    .all();
  return toItems(db, rows, now).sort(byUrgency);
}

/** @throws {DomainError} `record.not_found` */
export function supplyItem(db: Db, itemId: string, now: number): Item {
  const [item] = toItems(db, itemsWithStock(db).where(eq(items.id, itemId)).all(), now);
  if (!item) throw new DomainError('record.not_found', 'This supply is not known.');
  return item;
}

function itemsWithStock(db: Db) {
  return db
    .select({
      item: items,
      supplierName: suppliers.name,
      onHand: sql<number>`total(${lots.remaining})`,
      onHandMicro: sql<number>`coalesce(sum(${lots.remainingMicro}), 0)`,
      nextExpiry: sql<Day | null>`min(CASE WHEN ${lots.remaining} > 0 THEN ${lots.expiresOn} END)`,
      firstReceipt: sql<Day | null>`min(${lots.receivedOn})`,
    })
    .from(items)
    .leftJoin(suppliers, eq(suppliers.id, items.supplierId))
    .leftJoin(lots, eq(lots.itemId, items.id))
    .groupBy(items.id)
    .$dynamic();
}

type ItemRow = ReturnType<ReturnType<typeof itemsWithStock>['all']>[number];

function toItems(db: Db, rows: readonly ItemRow[], now: number): Item[] {
  const { timeZone } = farmOf(db);
  const today = dayOf(now, timeZone);
  const uses = supplyForecast(
    db,
    rows.map(({ item, firstReceipt }) => ({ ...item, firstReceipt })),
    { now, timeZone },
  );
  return rows.map((row) => toItem(row, uses.get(row.item.id) ?? NOTHING_KNOWN, today));
}

const NOTHING_KNOWN: SupplyUse = {
  perDay: null,
  sdPerDay: 0,
  basis: 'none',
  windowDays: 0,
  taken: 0,
  takes: 0,
  systems: [],
  demandPerDay: null,
};

function toItem({ item, supplierName, onHand, onHandMicro, nextExpiry }: ItemRow, use: SupplyUse, today: Day): Item {
  const advice = reorderAdvice({
    ...item,
    onHand,
    usePerDay: use.perDay ?? 0,
    sdPerDay: use.sdPerDay,
    today,
  });
  const state = supplyState(onHand, advice.orderByDay, today);
  return {
    ...item,
    retired: item.retiredAt !== null,
    supplierName,
    onHand,
    onHandMicro,
    nextExpiry,
    state,
    advice,
    use,
  };
}

function matches(column: typeof items.name | typeof items.code, pattern: string) {
  return sql`${like(column, pattern)} ESCAPE '\\'`;
}

const FAR_DAY = '9999-12-31';

function byUrgency(a: Item, b: Item): number {
  const urgency = (item: Item) => SUPPLY_STATES.indexOf(item.state);
  const day = (item: Item) => item.advice.orderByDay ?? FAR_DAY;
  return urgency(b) - urgency(a) || day(a).localeCompare(day(b)) || a.name.localeCompare(b.name);
}
