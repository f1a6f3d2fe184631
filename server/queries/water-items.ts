import { and, asc, desc, eq, inArray, isNull, sum } from 'drizzle-orm';
import type { WaterItem } from '../../shared/contracts/water.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { consumptions, items, lots } from '../db/schema/index.ts';

const WATER_KINDS = ['lime', 'vinegar', 'salt', 'supplement'] as const;
export type WaterItemKind = (typeof WATER_KINDS)[number];
export type WaterItemRow = typeof items.$inferSelect & { kind: WaterItemKind };

/** Supplies that water work takes from; of each kind the one that was used last comes first. */
export function listWaterItems(db: Db): WaterItem[] {
  return WATER_KINDS.flatMap((kind) => usualFirst(db, kind)).map((item) => toWaterItem(db, item));
}

/**
 * The item that an act takes from: the one that was named, or the farm's usual one of the kind.
 *
 * @param field where the form names the item
 * @throws {DomainError} `input.invalid` where it is of another kind, or where the farm has none
 */
export function waterItem(db: Db, kind: WaterItemKind, itemId: string | undefined, field: string): WaterItemRow {
  const offered = usualFirst(db, kind);
  const item = itemId === undefined ? offered[0] : offered.find(({ id }) => id === itemId);
  if (item) return item;
  const message =
    itemId === undefined
      ? `There is no ${kind} among the supplies yet. Add the item and receive it first.`
      : `Choose an item that is ${kind}.`;
  throw new DomainError('input.invalid', message, { fields: [{ path: field, message }] });
}

function usualFirst(db: Db, kind: WaterItemKind): WaterItemRow[] {
  const rows = db
    .select()
    .from(items)
    .where(and(eq(items.kind, kind), isNull(items.retiredAt)))
    .orderBy(asc(items.createdAt), asc(items.code))
    .all();
  const usual = lastUsed(
    db,
    rows.map(({ id }) => id),
  );
  return [...rows].sort((a, b) => Number(b.id === usual) - Number(a.id === usual)).map((row) => ({ ...row, kind }));
}

function lastUsed(db: Db, itemIds: readonly string[]): string | undefined {
  if (itemIds.length < 2) return itemIds[0];
  return db
    .select({ itemId: consumptions.itemId })
    .from(consumptions)
    .where(
      and(
        inArray(consumptions.itemId, [...itemIds]),
        inArray(consumptions.cause, ['refill', 'water_change', 'salt_batch', 'dose']),
      ),
    )
    .orderBy(desc(consumptions.at))
    .limit(1)
    .get()?.itemId;
}

function toWaterItem(
  db: Db,
  { id, code, name, kind, unit, strength, calciumMg, magnesiumMg }: WaterItemRow,
): WaterItem {
  const held = db
    .select({ onHand: sum(lots.remaining) })
    .from(lots)
    .where(eq(lots.itemId, id))
    .get();
  return { id, code, name, kind, unit, strength, calciumMg, magnesiumMg, onHand: Number(held?.onHand ?? 0) };
}
