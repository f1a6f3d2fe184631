import { eq } from 'drizzle-orm';
import { orders, payments } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import type { OrderRow } from '../queries/orders.ts';
import { storeRow } from '../queries/stores.ts';
import { queueMail } from './mail-templates.ts';
import { addRefund, type PaymentRow } from './refund-service.ts';

/** A checkout that the payment service says was paid. */
export interface PaidCheckout {
  sessionId: string;
  orderId: string;
  intentId: string | null;
  amountMinor: number;
  currency: string;
}

/**
 * Marks an order paid. Money for an order that was cancelled or paid meanwhile goes back by itself; an amount that is not
 * the order's leaves the order unpaid for staff to look at.
 */
export function confirmPayment(write: Write, checkout: PaidCheckout): void {
  const found = paymentOf(write, checkout);
  if (!found || found.payment.state === 'paid') return;
  const { payment, order } = found;
  if (checkout.amountMinor !== payment.amountMinor || checkout.currency !== payment.currency) {
    return noteOtherAmount(write, payment, checkout);
  }
  write.tx
    .update(payments)
    .set({ state: 'paid', paidAt: write.now, intentId: checkout.intentId, refusal: '' })
    .where(eq(payments.id, payment.id))
    .run();
  write.audit({
    action: 'payment.paid',
    entity: 'order',
    entityId: order.id,
    after: { paymentId: payment.id, amountMinor: payment.amountMinor },
  });
  if (order.state === 'placed') return markPaid(write, order);
  const reason =
    order.state === 'cancelled'
      ? 'The order was cancelled before the payment arrived.'
      : 'The order had been paid already.';
  addRefund(write, payment, payment.amountMinor, reason);
}

function markPaid(write: Write, order: OrderRow): void {
  write.tx
    .update(orders)
    .set({ state: 'paid', paidAt: write.now, holdUntil: null, version: order.version + 1 })
    .where(eq(orders.id, order.id))
    .run();
  queueMail(write, 'order-paid', storeRow(write.tx, order.storeId).email, { orderId: order.id });
  write.audit({
    action: 'order.paid',
    entity: 'order',
    entityId: order.id,
    before: { state: order.state },
    after: { state: 'paid' },
  });
}

/** The payment of a checkout; one whose answer was lost on the way here is made from the event. */
function paymentOf(write: Write, checkout: PaidCheckout): { payment: PaymentRow; order: OrderRow } | null {
  const payment = write.tx.select().from(payments).where(eq(payments.sessionId, checkout.sessionId)).get();
  const orderId = payment?.orderId ?? checkout.orderId;
  const order = write.tx.select().from(orders).where(eq(orders.id, orderId)).get();
  if (!order) return null;
  if (payment) return { payment, order };
  const made = write.tx
    .insert(payments)
    .values({
      id: write.newId(),
      orderId,
      sessionId: checkout.sessionId,
      url: '',
      amountMinor: order.totalMinor,
      currency: order.currency,
      state: 'open',
      createdAt: write.now,
    })
    .returning()
    .get();
  return { payment: made, order };
}

function noteOtherAmount(write: Write, payment: PaymentRow, checkout: PaidCheckout): void {
  write.tx
    .update(payments)
    .set({
      state: 'failed',
      intentId: checkout.intentId,
      refusal: 'The amount paid is not the amount of the order. Look at it at the payment service.',
    })
    .where(eq(payments.id, payment.id))
    .run();
  write.audit({
    action: 'payment.amount_differed',
    entity: 'order',
    entityId: payment.orderId,
    before: { amountMinor: payment.amountMinor, currency: payment.currency },
    after: { amountMinor: checkout.amountMinor, currency: checkout.currency },
  });
}
