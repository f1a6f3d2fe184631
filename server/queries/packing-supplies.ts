import { and, desc, eq, isNull, sql } from 'drizzle-orm';
import type { PackingSupply } from '../../shared/contracts/orders.ts';
import type { Db } from '../db/client.ts';
import { consumptions, items, lots, orders } from '../db/schema/index.ts';

/** Packing supplies in use by name, with what stands on the shelf and what the last packed order took for each box. */
export function packingSupplies(db: Db): PackingSupply[] {
  const onHand = sql<number>`coalesce(sum(${lots.remaining}), 0)`;
  const kept = db
    .select({ itemId: items.id, name: items.name, unit: items.unit, onHand })
    .from(items)
    .leftJoin(lots, eq(lots.itemId, items.id))
    .where(and(eq(items.kind, 'packing'), isNull(items.retiredAt)))
    .groupBy(items.id)
    .orderBy(items.name)
    .all();
  const lastTaken = takenByLastOrder(db);
  return kept.map((item) => ({ ...item, lastPerBox: lastTaken.get(item.itemId) ?? null }));
}

/** Of the orders packed before, the newest that took any supplies: amount for each box by item. */
function takenByLastOrder(db: Db): Map<string, number> {
  const ofOrder = and(eq(consumptions.cause, 'packing'), eq(consumptions.causeId, orders.id));
  const last = db
    .select({ id: orders.id, boxes: orders.boxes })
    .from(orders)
    .where(sql`${orders.packedAt} IS NOT NULL AND EXISTS (SELECT 1 FROM ${consumptions} WHERE ${ofOrder})`)
    .orderBy(desc(orders.packedAt))
    .limit(1)
    .get();
  if (!last) return new Map();
  const taken = db
    .select({ itemId: consumptions.itemId, quantity: sql<number>`sum(${consumptions.quantity})` })
    .from(consumptions)
    .where(and(eq(consumptions.cause, 'packing'), eq(consumptions.causeId, last.id)))
    .groupBy(consumptions.itemId)
    .all();
  return new Map(taken.map(({ itemId, quantity }) => [itemId, quantity / Math.max(1, last.boxes)]));
}
