import { and, eq, gt } from 'drizzle-orm';
import type { PlaceOrder } from '../../shared/contracts/shop.ts';
import { dayOf, type Day } from '../../shared/domain/days.ts';
import { holds, orderLines, orders, payments, refunds } from '../db/schema/index.ts';
import { SYSTEM, type Write } from '../db/write.ts';
import { activeListings, stockByGrade, type GradeStock } from '../queries/listings.ts';
import { confirmPayment } from '../services/confirm-payment.ts';
import { packOrder } from '../services/pack-order.ts';
import { pickPlug } from '../services/pick-service.ts';
import { placeOrder } from '../services/place-order.ts';
import { settleRefund } from '../services/refund-service.ts';
import { shipOrder } from '../services/ship-order.ts';
import { FARM } from './scenario/farm.ts';
import { leave } from './stock-days.ts';
import { needSupply } from './supply-days.ts';
import type { World } from './world.ts';

/** Frags that travel in one box. */
const PER_BOX = 24;
const CARRIER = 'Northway Overnight';

export interface Offer {
  listingId: string;
  priceMinor: number;
  lineId: string;
  stock: GradeStock;
}

/** What stores could order now. */
export function offersNow(write: Write): Offer[] {
  const stockOf = stockByGrade(write.tx, dayOf(write.now, FARM.timeZone));
  return activeListings(write.tx)
    .map(({ listing }) => {
      const { id: listingId, priceMinor, lineId, grade } = listing;
      return { listingId, priceMinor, lineId, stock: stockOf(lineId, grade) };
    })
    .filter(({ stock }) => stock.free > 0);
}

/** Places an order as its buyer. @returns its id */
export function order(
  write: Write,
  wanted: readonly { offer: Offer; quantity: number }[],
  shipOn: Day | null,
  note = '',
): string {
  const lines: PlaceOrder['lines'] = wanted.map(({ offer, quantity }) => ({
    ...{ listingId: offer.listingId, priceMinor: offer.priceMinor, quantity },
  }));
  return placeOrder(write, write.actor.storeId, { lines, shipOn, note }).id;
}

/** The payment service says that an order was paid. */
export function pay(write: Write, orderId: string): void {
  const row = write.tx.select().from(orders).where(eq(orders.id, orderId)).get();
  if (!row) throw new Error(`There is no order ${orderId}.`);
  const { number, totalMinor: amountMinor, currency } = row;
  confirmPayment(write, {
    sessionId: `cs_demo_${number}`,
    orderId,
    intentId: `pi_demo_${number}`,
    amountMinor,
    currency,
  });
}

/** Scans the promised plugs that are there, at most so many. @returns how many were picked */
export function pick(world: World, write: Write, orderId: string, most = Infinity): number {
  const promised = write.tx
    .select({ batchId: holds.batchId, pieces: holds.pieces })
    .from(holds)
    .innerJoin(orderLines, eq(orderLines.id, holds.orderLineId))
    .where(and(eq(orderLines.orderId, orderId), gt(holds.pieces, 0)))
    .orderBy(holds.id)
    .all();
  const plugs = promised.flatMap(({ batchId, pieces }) => {
    const batch = world.batches.find(({ id }) => id === batchId);
    const there = batch?.plugs.filter(({ state, rack }) => state === 'rack' && isForSale(rack));
    return there?.slice(0, pieces) ?? [];
  });
  const picked = plugs.slice(0, most);
  for (const plug of picked) {
    pickPlug(write, orderId, plug.code);
    leave(plug, 'order');
  }
  return picked.length;
}

function isForSale(rack: World['systems'][number]['racks'][number] | null): boolean {
  return rack !== null && !rack.withheld && rack.system.spec.kind !== 'quarantine';
}

/** Closes the boxes; what is missing is paid back a little later. Cold days need heat packs. */
export function pack(world: World, write: Write, orderId: string, pieces: number): void {
  const boxes = Math.ceil(pieces / PER_BOX);
  const { box, heatPack } = world.items;
  const month = Number(dayOf(write.now, FARM.timeZone).slice(5, 7));
  const packing = [
    { item: box, quantity: boxes },
    ...(month >= 11 || month <= 3 ? [{ item: heatPack, quantity: boxes * 2 }] : []),
  ];
  for (const { item, quantity } of packing) needSupply(world, write, item, quantity);
  const supplies = packing.map(({ item, quantity }) => ({ itemId: item.id, quantity }));
  packOrder(write, orderId, { boxes, acceptMissing: true, supplies });
  settleRefundsLater(world, write, orderId);
}

export function ship(write: Write, orderId: string): void {
  const number = write.tx.select({ number: orders.number }).from(orders).where(eq(orders.id, orderId)).get()?.number;
  shipOrder(write, orderId, { carrier: CARRIER, tracking: `NW${700_000 + (number ?? 0)}` });
}

/** Money on its way back arrives some minutes later, as the payment service reports it. */
export function settleRefundsLater(world: World, write: Write, orderId: string): void {
  world.agenda.put(write.now + 6 * 60_000, SYSTEM, (later) => {
    const waiting = later.tx
      .select({ refund: refunds })
      .from(refunds)
      .innerJoin(payments, eq(payments.id, refunds.paymentId))
      .where(and(eq(payments.orderId, orderId), eq(refunds.state, 'pending')))
      .all();
    for (const { refund } of waiting) settleRefund(later, refund, `re_demo_${refund.id.slice(0, 8)}`, 'succeeded');
  });
}
