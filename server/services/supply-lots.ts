import { eq, sql } from 'drizzle-orm';
import type { CountItem, Receive } from '../../shared/contracts/supplies.ts';
import { dayOf, type Day } from '../../shared/domain/days.ts';
import { microFromMinor, minorFromMicro } from '../../shared/domain/money.ts';
import { DomainError } from '../../shared/errors.ts';
import { lots, supplyCounts } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { itemRow } from './supply-items.ts';
import { useSupply } from './supply-use.ts';

/** Differences this small beside the amount are rounding of measured amounts, not stock. */
const ROUNDING = 1e-9;

/** Code of the lot that takes up what a count found beyond the books. It has cost nothing. */
const FOUND_LOT = 'count';

/**
 * Receives a delivery as a lot of its own.
 *
 * @returns the lot's id
 * @throws {DomainError} `input.invalid` for a day still to come or an expiry before it; `rule.refused` for a retired item
 */
export function receive(write: Write, input: Receive): string {
  const item = itemRow(write, input.itemId);
  if (item.retiredAt !== null) {
    throw new DomainError('rule.refused', 'This supply is retired. Bring it back before you receive more of it.');
  }
  const farm = farmOf(write.tx);
  const today = dayOf(write.now, farm.timeZone);
  const receivedOn = input.receivedOn ?? today;
  const expiresOn = input.expiresOn ?? null;
  assertDays(receivedOn, expiresOn, today);

  const row = addLot(write, {
    itemId: item.id,
    code: input.code,
    receivedOn,
    expiresOn,
    quantity: input.quantity,
    costMinor: input.costMinor,
    costMicro: microFromMinor(input.costMinor, farm.currency),
  });
  write.audit({ action: 'lot.received', entity: 'lot', entityId: row.id, after: row });
  return row.id;
}

/**
 * Takes back a receipt that was a mistake.
 *
 * @throws {DomainError} `record.in_use` when something of it was used; a count then puts the amount right
 */
export function undoReceipt(write: Write, lotId: string): void {
  const lot = write.tx.select().from(lots).where(eq(lots.id, lotId)).get();
  if (!lot) throw new DomainError('record.not_found', 'This lot is not known.');
  if (lot.remaining < lot.quantity) {
    throw new DomainError('record.in_use', 'Some of this lot was used already. Correct what is on hand by a count.');
  }
  write.tx.delete(lots).where(eq(lots.id, lotId)).run();
  write.audit({ action: 'lot.receipt_undone', entity: 'lot', entityId: lotId, before: lot });
}

/**
 * Sets what is on hand to what was counted. What is missing leaves the oldest lots at their cost; what was found becomes
 * a lot that cost nothing, so that no cost is made up.
 *
 * @returns the count's id
 */
export function countItem(write: Write, input: CountItem): string {
  const item = itemRow(write, input.itemId);
  const expected = onHand(write, item.id);
  const row = write.tx
    .insert(supplyCounts)
    .values({ id: write.newId(), ...input, expected, at: write.now, by: write.actor.name })
    .returning()
    .get();

  const difference = input.counted - expected;
  const isRounding = Math.abs(difference) <= ROUNDING * Math.max(1, expected);
  if (difference < 0 && !isRounding) {
    useSupply(write, { itemId: item.id, quantity: -difference, cause: 'count', causeId: row.id, at: write.now });
  } else if (difference > 0 && !isRounding) {
    const receivedOn = dayOf(write.now, farmOf(write.tx).timeZone);
    const found = { itemId: item.id, code: FOUND_LOT, receivedOn, expiresOn: null };
    addLot(write, { ...found, quantity: difference, costMinor: 0, costMicro: 0 });
  }
  write.audit({ action: 'item.counted', entity: 'item', entityId: item.id, before: { onHand: expected }, after: row });
  return row.id;
}

function onHand(write: Write, itemId: string): number {
  const row = write.tx
    .select({ amount: sql<number>`total(${lots.remaining})` })
    .from(lots)
    .where(eq(lots.itemId, itemId))
    .get();
  return row?.amount ?? 0;
}

/** A lot that the farm made itself, at what went into it; its price in minor units is that, rounded. */
export function addMadeLot(
  write: Write,
  lot: Pick<NewLot, 'itemId' | 'code' | 'receivedOn' | 'quantity' | 'costMicro'>,
): typeof lots.$inferSelect {
  const { currency } = farmOf(write.tx);
  const row = addLot(write, { ...lot, expiresOn: null, costMinor: minorFromMicro(lot.costMicro, currency) });
  write.audit({ action: 'lot.received', entity: 'lot', entityId: row.id, after: row });
  return row;
}

interface NewLot {
  itemId: string;
  code: string;
  receivedOn: Day;
  expiresOn: Day | null;
  quantity: number;
  costMinor: number;
  costMicro: number;
}

function addLot(write: Write, { costMicro, ...lot }: NewLot): typeof lots.$inferSelect {
  return write.tx
    .insert(lots)
    .values({
      ...lot,
      id: write.newId(),
      remaining: lot.quantity,
      remainingMicro: costMicro,
      receivedBy: write.actor.name,
      createdAt: write.now,
    })
    .returning()
    .get();
}

function assertDays(receivedOn: Day, expiresOn: Day | null, today: Day): void {
  const fields = [];
  if (receivedOn > today) fields.push({ path: 'receivedOn', message: 'This day is still to come.' });
  if (expiresOn !== null && expiresOn < receivedOn) {
    fields.push({ path: 'expiresOn', message: 'It can not expire before it came.' });
  }
  if (fields.length > 0) throw new DomainError('input.invalid', 'Check the days of this delivery.', { fields });
}
