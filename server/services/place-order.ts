import { max } from 'drizzle-orm';
import type { PlaceOrder, ShopOrder } from '../../shared/contracts/shop.ts';
import { allocate, type Allocation } from '../../shared/domain/allocation.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { orderAmounts } from '../../shared/domain/order-amounts.ts';
import { DomainError, type FieldError } from '../../shared/errors.ts';
import { holds, orderLines, orders } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf, type FarmRow } from '../queries/farm.ts';
import { listingRow, stockByGrade, type ListingRow } from '../queries/listings.ts';
import { holdMinutes } from '../queries/order-settings.ts';
import { showShopOrder } from '../queries/shop.ts';
import { storeRow } from '../queries/stores.ts';
import { queueMail } from './mail-templates.ts';
import { moneyText } from './money-text.ts';

const FIRST_NUMBER = 1001;
/** What the payment service takes for one payment, in minor units. */
const LEAST_TOTAL = 50;
const LARGEST_TOTAL = 99_999_999;

interface Wanted {
  listing: ListingRow;
  quantity: number;
  allocation: Allocation;
}

/**
 * Places an order and promises its pieces, oldest batch first: all of it or nothing. The price is the one of now, and the
 * order is refused when the buyer saw another one.
 *
 * @param storeId the caller's own store
 * @throws {DomainError} `order.not_available` at each line that is short, with how many are left; `rule.refused`;
 *   `input.invalid`
 */
export function placeOrder(write: Write, storeId: string | null, input: PlaceOrder): ShopOrder {
  const farm = farmOf(write.tx);
  const store = storeRow(write.tx, storeId ?? '');
  const today = dayOf(write.now, farm.timeZone);
  if (store.retiredAt !== null) throw new DomainError('rule.refused', 'New orders are closed for your store. Ask us.');
  if (input.shipOn !== null && input.shipOn < today) throw tooEarly();
  const wanted = allocateAll(write, input, farm, today);
  const priced = wanted.map(({ listing, quantity }) => ({ quantity, priceMinor: listing.priceMinor }));
  const amounts = orderAmounts(priced, farm.currency, farm.taxPercent / 100);
  assertPayable(amounts.totalMinor, farm);

  const order = write.tx
    .insert(orders)
    .values({
      id: write.newId(),
      number: nextNumber(write),
      storeId: store.id,
      state: 'placed',
      currency: farm.currency,
      taxPercent: farm.taxPercent,
      ...amounts,
      shipOn: input.shipOn,
      note: input.note,
      placedAt: write.now,
      placedBy: write.actor.name,
      holdUntil: write.now + holdMinutes(farm) * 60_000,
    })
    .returning()
    .get();
  for (const each of wanted) holdPieces(write, order.id, each);
  queueMail(write, 'order-placed', store.email, { orderId: order.id });
  write.audit({
    action: 'order.placed',
    entity: 'order',
    entityId: order.id,
    after: { number: order.number, store: store.code, totalMinor: order.totalMinor, pieces: input.lines },
  });
  return showShopOrder(write.tx, order);
}

function allocateAll(write: Write, { lines }: PlaceOrder, farm: FarmRow, today: string): Wanted[] {
  const stockOf = stockByGrade(write.tx, today);
  const short: FieldError[] = [];
  const changed: FieldError[] = [];
  const available: Record<string, number> = {};
  const wanted = lines.map(({ listingId, quantity, priceMinor }, index): Wanted => {
    const { listing, line } = listingRow(write.tx, listingId);
    const stock = stockOf(line.id, listing.grade);
    const free = listing.active ? stock.batches : [];
    const allocation = allocate(
      quantity,
      free.map((batch) => ({ batchId: batch.batchId, free: batch.available, readyDay: batch.readyOn })),
    );
    const left = quantity - allocation.short;
    if (allocation.short > 0) short.push({ path: `lines.${index}.quantity`, message: leftMessage(left) });
    else if (listing.priceMinor !== priceMinor) {
      const message = `The price is now ${moneyText(listing.priceMinor, farm.currency)}. Look at your order again.`;
      changed.push({ path: `lines.${index}.priceMinor`, message });
    }
    if (allocation.short > 0) available[listingId] = left;
    return { listing, quantity, allocation };
  });
  if (short.length > 0) {
    throw new DomainError('order.not_available', 'Some of this has just been sold. Change the amounts, then order.', {
      fields: short,
      details: { available },
    });
  }
  if (changed.length > 0) {
    throw new DomainError('rule.refused', 'A price changed since you looked. Check it, then order.', {
      fields: changed,
    });
  }
  return wanted;
}

function holdPieces(write: Write, orderId: string, { listing, quantity, allocation }: Wanted): void {
  const line = write.tx
    .insert(orderLines)
    .values({
      id: write.newId(),
      orderId,
      listingId: listing.id,
      lineId: listing.lineId,
      grade: listing.grade,
      quantity,
      priceMinor: listing.priceMinor,
    })
    .returning()
    .get();
  for (const { batchId, pieces } of allocation.picks) {
    write.tx
      .insert(holds)
      .values({ id: write.newId(), orderLineId: line.id, batchId, pieces, createdAt: write.now })
      .run();
  }
}

function nextNumber(write: Write): number {
  const last = write.tx
    .select({ number: max(orders.number) })
    .from(orders)
    .get()?.number;
  return last ? last + 1 : FIRST_NUMBER;
}

function assertPayable(totalMinor: number, { currency }: FarmRow): void {
  if (totalMinor < LEAST_TOTAL) {
    throw new DomainError('rule.refused', `Order for ${moneyText(LEAST_TOTAL, currency)} or more.`);
  }
  if (totalMinor > LARGEST_TOTAL) {
    throw new DomainError('rule.refused', 'This is more than one payment can hold. Make two orders of it.');
  }
}

function leftMessage(left: number): string {
  if (left === 0) return 'None are left.';
  return left === 1 ? '1 is left.' : `${left} are left.`;
}

function tooEarly(): DomainError {
  const message = 'Choose today or a later day.';
  return new DomainError('input.invalid', message, { fields: [{ path: 'shipOn', message }] });
}
