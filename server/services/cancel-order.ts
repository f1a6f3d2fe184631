import { eq, inArray } from 'drizzle-orm';
import type { OrderPage } from '../../shared/contracts/orders.ts';
import type { ShopOrder } from '../../shared/contracts/shop.ts';
import { DomainError } from '../../shared/errors.ts';
import { holds, orderLines, orders } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { showOrder } from '../queries/order-page.ts';
import { orderRow, ownOrderRow, pickedPlugs, type OrderRow } from '../queries/orders.ts';
import { showShopOrder } from '../queries/shop.ts';
import { storeRow } from '../queries/stores.ts';
import { queueMail } from './mail-templates.ts';
import { refundAll } from './refund-service.ts';

/**
 * Cancels an order by staff: its stock is free again, and what was paid goes back.
 *
 * @throws {DomainError} `order.wrong_state` once it is packed, and while plugs are picked for it
 */
export function cancelOrder(write: Write, orderId: string, reason: string): OrderPage {
  const order = orderRow(write.tx, orderId);
  assertCancellable(order);
  const picked = pickedPlugs(write.tx, orderId).length;
  if (picked > 0) {
    throw new DomainError(
      'order.wrong_state',
      `${picked === 1 ? '1 plug is' : `${picked} plugs are`} picked for this order. Put them back first.`,
      { details: { picked } },
    );
  }
  const refundedMinor = refundAll(write, orderId, reason);
  closeOrder(write, order, reason, refundedMinor);
  return showOrder(write.tx, orderId);
}

/** Cancels an own order that is not paid. @throws {DomainError} `record.not_found`; `order.wrong_state` */
export function cancelOwnOrder(write: Write, orderId: string): ShopOrder {
  const order = ownOrderRow(write.tx, write.actor.storeId, orderId);
  if (order.state !== 'placed') {
    assertCancellable(order);
    throw new DomainError('order.wrong_state', 'This order is paid. Ask us to cancel it.');
  }
  closeOrder(write, order, 'Cancelled by the store.', 0);
  return showShopOrder(write.tx, orderRow(write.tx, orderId));
}

/** Cancels an order that was not paid in time. Nothing happens where it was paid or cancelled meanwhile. */
export function expireOrder(write: Write, orderId: string): void {
  const order = orderRow(write.tx, orderId);
  if (order.state !== 'placed' || order.holdUntil === null || order.holdUntil > write.now) return;
  closeOrder(write, order, 'It was not paid in time.', 0);
}

/** Promises of an order end: it is packed or cancelled. */
export function freeHolds(write: Write, orderId: string): void {
  const ofOrder = write.tx.select({ id: orderLines.id }).from(orderLines).where(eq(orderLines.orderId, orderId));
  write.tx.update(holds).set({ pieces: 0 }).where(inArray(holds.orderLineId, ofOrder)).run();
}

function closeOrder(write: Write, order: OrderRow, reason: string, refundedMinor: number): void {
  freeHolds(write, order.id);
  write.tx
    .update(orders)
    .set({
      state: 'cancelled',
      cancelledAt: write.now,
      cancelReason: reason,
      holdUntil: null,
      version: order.version + 1,
    })
    .where(eq(orders.id, order.id))
    .run();
  queueMail(write, 'order-cancelled', storeRow(write.tx, order.storeId).email, { orderId: order.id, refundedMinor });
  write.audit({
    action: 'order.cancelled',
    entity: 'order',
    entityId: order.id,
    before: { state: order.state },
    after: { state: 'cancelled', reason, refundedMinor },
  });
}

function assertCancellable({ state }: OrderRow): void {
  if (state === 'cancelled') throw new DomainError('order.wrong_state', 'This order is cancelled already.');
  if (state === 'packed' || state === 'shipped') {
    throw new DomainError('order.wrong_state', `This order is ${state}. Give money back with a refund instead.`);
  }
}
