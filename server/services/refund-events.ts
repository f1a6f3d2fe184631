import { and, eq, isNotNull } from 'drizzle-orm';
import type Stripe from 'stripe';
import { payments, refunds } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { addRefund, settleRefund } from './refund-service.ts';

type RefundRow = typeof refunds.$inferSelect;

/**
 * An event about one refund. It may come before the answer to our call was stored, so our own id in its metadata goes
 * first; one that was made at the payment service by hand is taken into the books.
 */
export function noteRefundEvent(write: Write, refund: Stripe.Refund): void {
  const row = knownRefund(write, refund) ?? refundFromOutside(write, refund);
  if (row) settleRefund(write, row, refund.id, refund.status ?? 'pending');
}

/** A charge of which all refunds are through settles those that still wait. */
export function settleRefundsOfCharge(write: Write, charge: Stripe.Charge): void {
  const payment = paymentOfIntent(write, charge.payment_intent);
  if (!payment) return;
  const sent = write.tx
    .select()
    .from(refunds)
    .where(and(eq(refunds.paymentId, payment.id), isNotNull(refunds.externalId)))
    .all()
    .filter(({ state }) => state !== 'failed');
  const total = sent.reduce((sum, { amountMinor }) => sum + amountMinor, 0);
  if (charge.amount_refunded < total) return;
  for (const row of sent) {
    if (row.state === 'pending' && row.externalId !== null) settleRefund(write, row, row.externalId, 'succeeded');
  }
}

function knownRefund(write: Write, refund: Stripe.Refund): RefundRow | undefined {
  const byExternalId = write.tx.select().from(refunds).where(eq(refunds.externalId, refund.id)).get();
  if (byExternalId) return byExternalId;
  const ownId = refund.metadata?.refundId;
  return ownId === undefined ? undefined : write.tx.select().from(refunds).where(eq(refunds.id, ownId)).get();
}

function refundFromOutside(write: Write, refund: Stripe.Refund): RefundRow | undefined {
  const payment = paymentOfIntent(write, refund.payment_intent);
  return payment && addRefund(write, payment, refund.amount, 'Given back at the payment service.');
}

function paymentOfIntent(write: Write, intent: string | Stripe.PaymentIntent | null) {
  const intentId = typeof intent === 'string' ? intent : intent?.id;
  if (intentId === undefined) return undefined;
  return write.tx.select().from(payments).where(eq(payments.intentId, intentId)).get();
}
