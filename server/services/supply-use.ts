import { and, asc, eq, gt, sql } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import { fifo, type LotTake } from '../../shared/domain/supplies.ts';
import type { Write } from '../db/write.ts';
import { consumptions, items, lots } from '../db/schema/index.ts';

type ConsumptionRow = typeof consumptions.$inferSelect;

export interface SupplyUse {
  itemId: string;
  /** In the item's own unit. */
  quantity: number;
  cause: ConsumptionRow['cause'];
  causeId: string;
  systemId?: string | null;
  at: number;
}

/**
 * Takes an amount from the item's lots, oldest first, with its share of each lot's cost.
 * @returns the cost taken, in micro-units of the farm's currency
 * @throws {DomainError} `supply.not_enough` when the lots hold less; nothing is taken then
 */
export function useSupply(write: Write, use: SupplyUse): number {
  if (use.quantity === 0) return 0;
  const open = openLots(write, use.itemId);
  assertEnough(write, use, open);
  const { takes, costMicro } = fifo(
    open.map((lot) => ({ lotId: lot.id, quantity: lot.remaining, costMicro: lot.remainingMicro })),
    use.quantity,
  );
  for (const take of takes) takeFromLot(write, use, take);
  return costMicro;
}

/** @throws {DomainError} `supply.not_enough` when the lots hold less */
export function assertOnHand(write: Write, use: Pick<SupplyUse, 'itemId' | 'quantity'>): void {
  assertEnough(write, use, openLots(write, use.itemId));
}

function assertEnough(
  write: Write,
  use: Pick<SupplyUse, 'itemId' | 'quantity'>,
  open: readonly { remaining: number }[],
): void {
  const onHand = open.reduce((sum, lot) => sum + lot.remaining, 0);
  if (onHand < use.quantity) throw notEnough(write, use, onHand);
}

/** Lots that still hold something, in the order in which they are used up. */
function openLots(write: Write, itemId: string) {
  return write.tx
    .select()
    .from(lots)
    .where(and(eq(lots.itemId, itemId), gt(lots.remaining, 0)))
    .orderBy(asc(lots.receivedOn), asc(lots.createdAt), asc(lots.id))
    .all();
}

function takeFromLot(write: Write, use: SupplyUse, take: LotTake): void {
  write.tx
    .update(lots)
    .set({
      // A difference below rounding of the stored amount is an empty lot.
      remaining: sql`max(0, ${lots.remaining} - ${take.quantity})`,
      remainingMicro: sql`${lots.remainingMicro} - ${take.costMicro}`,
    })
    .where(eq(lots.id, take.lotId))
    .run();
  write.tx
    .insert(consumptions)
    .values({
      id: write.newId(),
      itemId: use.itemId,
      lotId: take.lotId,
      quantity: take.quantity,
      costMicro: take.costMicro,
      cause: use.cause,
      causeId: use.causeId,
      systemId: use.systemId ?? null,
      at: use.at,
      by: write.actor.name,
    })
    .run();
}

function notEnough(write: Write, use: Pick<SupplyUse, 'itemId' | 'quantity'>, onHand: number): DomainError {
  const item = write.tx.select().from(items).where(eq(items.id, use.itemId)).get();
  const name = item?.name ?? 'this item';
  const unit = item?.unit ?? '';
  return new DomainError(
    'supply.not_enough',
    `Only ${Number(onHand.toFixed(1))} ${unit} of ${name} is on hand and ${use.quantity} ${unit} is needed. Receive a delivery first, or use less.`,
    { details: { itemId: use.itemId, onHand, needed: use.quantity } },
  );
}
