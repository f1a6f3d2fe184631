import { and, eq } from 'drizzle-orm';
import { gradeByCode } from '../../shared/domain/growth.ts';
import { DomainError } from '../../shared/errors.ts';
import { orders, payments } from '../db/schema/index.ts';
import { inWrite, type Actor, type Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import type { CheckoutRequest } from '../outside/payment-service.ts';
import { farmOf } from '../queries/farm.ts';
import { SHORTEST_CHECKOUT_MS } from '../queries/order-settings.ts';
import { orderLinesOf, ownOrderRow, paymentsOf, type OrderRow } from '../queries/orders.ts';
import { storeRow } from '../queries/stores.ts';

/**
 * Opens the payment service's page for an order, or gives the one that is open already. The order's hold lasts as long
 * as the page, so that what is paid is still there. It becomes paid only when the payment service says so.
 *
 * @throws {DomainError} `record.not_found`; `order.wrong_state`; `service.unavailable`
 */
export async function startPayment(deps: Deps, caller: Actor, orderId: string): Promise<{ url: string }> {
  const prepared = inWrite(deps, caller, (write) => prepare(write, orderId, deps.config.publicUrl));
  if ('url' in prepared) return prepared;
  const checkout = await deps.payments.createCheckout(prepared.request);
  const recorded = inWrite(deps, caller, (write) => recordCheckout(write, prepared.request, checkout));
  // The order may have ended while the payment service answered; a job then closes the page that was just recorded.
  assertUnpaid(ownOrderRow(deps.db, caller.storeId, orderId), deps.clock.now());
  return recorded;
}

function prepare(write: Write, orderId: string, publicUrl: string): { url: string } | { request: CheckoutRequest } {
  const order = ownOrderRow(write.tx, write.actor.storeId, orderId);
  const heldUntil = assertUnpaid(order, write.now);
  const open = write.tx
    .select()
    .from(payments)
    .where(and(eq(payments.orderId, orderId), eq(payments.state, 'open')))
    .get();
  if (open) return { url: open.url };

  const expiresAt = Math.max(heldUntil, write.now + SHORTEST_CHECKOUT_MS);
  // A second tap a moment later asks for the same: only a hold that has become too short is made longer.
  const isLongEnough = heldUntil - write.now > SHORTEST_CHECKOUT_MS - 45_000;
  const until = isLongEnough ? heldUntil : expiresAt;
  if (until !== heldUntil) {
    write.tx.update(orders).set({ holdUntil: until }).where(eq(orders.id, orderId)).run();
  }
  return { request: checkoutRequest(write, order, until, publicUrl) };
}

function checkoutRequest(write: Write, order: OrderRow, expiresAt: number, publicUrl: string): CheckoutRequest {
  const page = `${publicUrl}/shop/orders/${order.id}`;
  const tax =
    order.taxMinor > 0
      ? [{ name: `Tax ${order.taxPercent / 100} %`, quantity: 1, unitAmountMinor: order.taxMinor }]
      : [];
  return {
    orderId: order.id,
    orderNumber: order.number,
    description: `Order ${order.number} at ${farmOf(write.tx).name}`,
    email: storeRow(write.tx, order.storeId).email,
    currency: order.currency,
    lines: [
      ...orderLinesOf(write.tx, order.id).map(({ lineCode, tradeName, grade, quantity, priceMinor }) => ({
        name: `${lineCode} ${tradeName}, ${gradeByCode(grade).label.toLowerCase()}`,
        quantity,
        unitAmountMinor: priceMinor,
      })),
      ...tax,
    ],
    successUrl: `${page}?payment=returned`,
    cancelUrl: `${page}?payment=left`,
    expiresAt,
    // The same page for the same time: a call whose answer was lost does not open a second one.
    idempotencyKey: `checkout-${order.id}-${paymentsOf(write.tx, order.id).length + 1}-${expiresAt}`,
  };
}

function recordCheckout(
  write: Write,
  { orderId }: CheckoutRequest,
  { sessionId, url }: { sessionId: string; url: string },
): { url: string } {
  const order = ownOrderRow(write.tx, write.actor.storeId, orderId);
  if (!write.tx.select().from(payments).where(eq(payments.sessionId, sessionId)).get()) {
    const row = write.tx
      .insert(payments)
      .values({
        id: write.newId(),
        orderId,
        sessionId,
        url,
        amountMinor: order.totalMinor,
        currency: order.currency,
        state: 'open',
        createdAt: write.now,
      })
      .returning()
      .get();
    write.audit({
      action: 'payment.started',
      entity: 'order',
      entityId: orderId,
      after: { paymentId: row.id, amountMinor: row.amountMinor },
    });
  }
  return { url };
}

/** @returns until when the order keeps its pieces */
function assertUnpaid(order: OrderRow, now: number): number {
  if (order.state === 'cancelled') {
    throw new DomainError('order.wrong_state', 'This order is cancelled. Place a new one.');
  }
  if (order.state !== 'placed') throw new DomainError('order.wrong_state', 'This order is paid already.');
  if (order.holdUntil === null || order.holdUntil <= now) {
    throw new DomainError('order.wrong_state', 'The time to pay has run out. Place the order again.');
  }
  return order.holdUntil;
}
