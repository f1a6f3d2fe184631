import { eq } from 'drizzle-orm';
import type { Refund, RefundOrder } from '../../shared/contracts/orders.ts';
import { DomainError } from '../../shared/errors.ts';
import { payments, refunds } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { leftOf, toRefund } from '../queries/order-page.ts';
import { orderRow, paymentsOf, refundsOf } from '../queries/orders.ts';
import { storeRow } from '../queries/stores.ts';
import { queueMail } from './mail-templates.ts';
import { moneyText } from './money-text.ts';

export type PaymentRow = typeof payments.$inferSelect;
type RefundRow = typeof refunds.$inferSelect;

/**
 * Gives back a part or all of what was paid. The money goes back through the payment service a moment later, by a job.
 *
 * @throws {DomainError} `rule.refused` at `amountMinor` for more than is left, and for all of an order that is still to be
 *   packed, which is to be cancelled instead; `order.wrong_state` where nothing was paid
 */
export function refundOrder(write: Write, orderId: string, { amountMinor, reason }: RefundOrder): Refund {
  const order = orderRow(write.tx, orderId);
  const given = refundsOf(write.tx, orderId);
  const paid = paymentsOf(write.tx, orderId).filter(({ state }) => state === 'paid');
  if (paid.length === 0) throw new DomainError('order.wrong_state', 'Nothing was paid for this order yet.');
  const most = Math.max(...paid.map((payment) => leftOf(payment, given)));
  const payment = paid.find((each) => leftOf(each, given) >= amountMinor);
  if (!payment) {
    const message = most > 0 ? `At most ${moneyText(most, order.currency)} can be given back.` : 'All was given back.';
    throw new DomainError('rule.refused', message, { fields: [{ path: 'amountMinor', message }] });
  }
  if (amountMinor === most && (order.state === 'paid' || order.state === 'picking')) {
    throw new DomainError('rule.refused', 'To give back all, cancel the order: that frees its stock too.');
  }
  return toRefund(addRefund(write, payment, amountMinor, reason));
}

/** Gives back all that is left of what was paid. @returns the amount in minor units */
export function refundAll(write: Write, orderId: string, reason: string): number {
  const given = refundsOf(write.tx, orderId);
  return paymentsOf(write.tx, orderId).reduce((sum, payment) => {
    const left = leftOf(payment, given);
    if (left > 0) addRefund(write, payment, left, reason);
    return sum + left;
  }, 0);
}

/** Notes money to be given back, in minor units; a job sends it. The caller sees to it that so much is left. */
export function addRefund(write: Write, payment: PaymentRow, amountMinor: number, reason: string): RefundRow {
  const row = write.tx
    .insert(refunds)
    .values({
      id: write.newId(),
      paymentId: payment.id,
      amountMinor,
      reason,
      state: 'pending',
      createdAt: write.now,
      by: write.actor.name,
    })
    .returning()
    .get();
  write.audit({
    action: 'refund.started',
    entity: 'order',
    entityId: payment.orderId,
    after: { refundId: row.id, amountMinor, reason },
  });
  return row;
}

/**
 * Takes over what the payment service says of a refund. Its answer and its events come in any order: a refund that went
 * through can still fail later, and nothing else goes back.
 */
export function settleRefund(write: Write, row: RefundRow, externalId: string | null, status: string): void {
  const state = stateOf(status);
  const isNews = state !== row.state && row.state !== 'failed' && state !== 'pending';
  if (!isNews && row.externalId === externalId) return;
  write.tx
    .update(refunds)
    .set({ externalId, ...(isNews ? { state } : {}) })
    .where(eq(refunds.id, row.id))
    .run();
  if (!isNews) return;
  const payment = write.tx.select().from(payments).where(eq(payments.id, row.paymentId)).get();
  if (!payment) return;
  write.audit({
    action: `refund.${state}`,
    entity: 'order',
    entityId: payment.orderId,
    after: { refundId: row.id, amountMinor: row.amountMinor },
  });
  if (state === 'succeeded') mailRefund(write, payment, row);
}

function mailRefund(write: Write, { orderId }: PaymentRow, { id }: RefundRow): void {
  const order = orderRow(write.tx, orderId);
  queueMail(write, 'order-refunded', storeRow(write.tx, order.storeId).email, { orderId, refundId: id });
}

function stateOf(status: string): RefundRow['state'] {
  if (status === 'succeeded') return 'succeeded';
  return status === 'failed' || status === 'canceled' ? 'failed' : 'pending';
}
