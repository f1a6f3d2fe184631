import { eq } from 'drizzle-orm';
import type { OrderLine, OrderPage, PackOrder } from '../../shared/contracts/orders.ts';
import { orderAmounts } from '../../shared/domain/order-amounts.ts';
import { DomainError } from '../../shared/errors.ts';
import { items, orderLines, orders } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { leftOf, showOrder } from '../queries/order-page.ts';
import { orderLinesOf, orderRow, paymentsOf, refundsOf, type OrderRow } from '../queries/orders.ts';
import { freeHolds } from './cancel-order.ts';
import { addRefund } from './refund-service.ts';
import { useSupply } from './supply-use.ts';

/**
 * Closes the boxes of an order. What could not be picked is left out and paid back, when staff say so.
 *
 * @throws {DomainError} `order.wrong_state`; `rule.refused` with what is missing, unless that is accepted;
 *   `input.invalid` for what is no packing supply; `supply.not_enough`
 */
export function packOrder(write: Write, orderId: string, { boxes, acceptMissing, supplies }: PackOrder): OrderPage {
  const order = orderRow(write.tx, orderId);
  const wanted = orderLinesOf(write.tx, orderId);
  assertPackable(order, wanted);
  const short = wanted.filter(({ picked, quantity }) => picked < quantity);
  if (short.length > 0 && !acceptMissing) throw stillMissing(short);

  for (const { id, quantity, picked } of short) {
    write.tx
      .update(orderLines)
      .set({ missing: quantity - picked })
      .where(eq(orderLines.id, id))
      .run();
  }
  if (short.length > 0) refundMissing(write, order);
  freeHolds(write, orderId);
  takePacking(write, orderId, supplies);
  write.tx
    .update(orders)
    .set({ state: 'packed', packedAt: write.now, boxes, version: order.version + 1 })
    .where(eq(orders.id, orderId))
    .run();
  write.audit({
    action: 'order.packed',
    entity: 'order',
    entityId: orderId,
    before: { state: order.state },
    after: {
      state: 'packed',
      boxes,
      supplies,
      missing: short.map(({ lineCode, quantity, picked }) => ({ lineCode, pieces: quantity - picked })),
    },
  });
  return showOrder(write.tx, orderId);
}

/** Boxes, heat packs and the like leave the shelf with the order that they go out with. */
function takePacking(write: Write, orderId: string, supplies: PackOrder['supplies']): void {
  for (const [index, { itemId, quantity }] of supplies.entries()) {
    const item = write.tx.select({ kind: items.kind }).from(items).where(eq(items.id, itemId)).get();
    if (item?.kind !== 'packing') {
      const message = 'Choose one of the packing supplies.';
      throw new DomainError('input.invalid', message, { fields: [{ path: `supplies.${index}.itemId`, message }] });
    }
    useSupply(write, { itemId, quantity, cause: 'packing', causeId: orderId, at: write.now });
  }
}

/** Gives back the difference between the order and what is packed, tax included; never more than is left. */
function refundMissing(write: Write, order: OrderRow): void {
  const packed = orderLinesOf(write.tx, order.id).map(({ quantity, missing, priceMinor }) => ({
    quantity: quantity - missing,
    priceMinor,
  }));
  const { totalMinor } = orderAmounts(packed, order.currency, order.taxPercent / 100);
  const given = refundsOf(write.tx, order.id);
  const payment = paymentsOf(write.tx, order.id).find((each) => leftOf(each, given) > 0);
  if (!payment) return;
  const amount = Math.min(order.totalMinor - totalMinor, leftOf(payment, given));
  if (amount > 0) addRefund(write, payment, amount, 'Pieces that could not be packed.');
}

function assertPackable({ state, number }: OrderRow, wanted: readonly OrderLine[]): void {
  if (state !== 'picking') {
    throw new DomainError('order.wrong_state', `Order ${number} is not being picked. Pick its plugs first.`);
  }
  if (wanted.every(({ picked }) => picked === 0)) {
    throw new DomainError('order.wrong_state', 'Nothing is picked. If none of it can be sent, cancel the order.');
  }
}

function stillMissing(short: readonly OrderLine[]): DomainError {
  const words = short.map(({ lineCode, quantity, picked }) => `${quantity - picked} of ${lineCode}`).join(', ');
  return new DomainError('rule.refused', `Still missing: ${words}. Pick them, or pack without and pay them back.`, {
    fields: [{ path: 'acceptMissing', message: `Still missing: ${words}.` }],
    details: { missing: short.map(({ id, quantity, picked }) => ({ orderLineId: id, pieces: quantity - picked })) },
  });
}
