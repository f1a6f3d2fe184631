import { and, desc, eq } from 'drizzle-orm';
import type Stripe from 'stripe';
import { DomainError } from '../../shared/errors.ts';
import { orders, paymentEvents, payments } from '../db/schema/index.ts';
import { inWrite, SYSTEM, type Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { confirmPayment, type PaidCheckout } from './confirm-payment.ts';
import { noteRefundEvent, settleRefundsOfCharge } from './refund-events.ts';

/**
 * Takes an event of the payment service: once each, in whatever order they come. Unknown kinds change nothing.
 *
 * @throws {DomainError} `input.invalid` where the signature does not fit the bytes
 */
export function receivePaymentEvent(deps: Deps, rawBody: unknown, signature: string): void {
  const event = readEvent(deps, rawBody, signature);
  inWrite(deps, SYSTEM, (write) => {
    if (write.tx.select().from(paymentEvents).where(eq(paymentEvents.id, event.id)).get()) return;
    write.tx.insert(paymentEvents).values({ id: event.id, type: event.type, at: write.now }).run();
    handle(write, event);
  });
}

function readEvent(deps: Deps, rawBody: unknown, signature: string): Stripe.Event {
  if (Buffer.isBuffer(rawBody) && signature !== '') {
    try {
      return deps.payments.readEvent(rawBody, signature);
    } catch (error) {
      deps.log.warn({ err: error }, 'webhook with a wrong signature');
    }
  }
  throw new DomainError('input.invalid', 'The signature of this event is not right.');
}

function handle(write: Write, event: Stripe.Event): void {
  switch (event.type) {
    case 'checkout.session.completed':
    case 'checkout.session.async_payment_succeeded':
      return confirmCheckout(write, event.data.object);
    case 'checkout.session.expired':
      return closeCheckout(write, event.data.object.id, 'expired', '');
    case 'checkout.session.async_payment_failed':
      return closeCheckout(write, event.data.object.id, 'failed', 'The payment did not go through.');
    case 'payment_intent.payment_failed':
      return noteRefusal(write, event.data.object);
    case 'refund.created':
    case 'refund.updated':
    case 'refund.failed':
      return noteRefundEvent(write, event.data.object);
    case 'charge.refunded':
      return settleRefundsOfCharge(write, event.data.object);
    default:
  }
}

function confirmCheckout(write: Write, session: Stripe.Checkout.Session): void {
  // Slow ways to pay complete the checkout first and pay later.
  if (session.payment_status !== 'paid') return;
  const checkout: PaidCheckout = {
    sessionId: session.id,
    orderId: session.client_reference_id ?? session.metadata?.orderId ?? '',
    intentId: idOf(session.payment_intent),
    amountMinor: session.amount_total ?? 0,
    currency: (session.currency ?? '').toUpperCase(),
  };
  confirmPayment(write, checkout);
}

/** An event that comes late does not undo a payment. */
function closeCheckout(write: Write, sessionId: string, state: 'expired' | 'failed', refusal: string): void {
  write.tx
    .update(payments)
    .set({ state, refusal })
    .where(and(eq(payments.sessionId, sessionId), eq(payments.state, 'open')))
    .run();
}

/** A refused card leaves the checkout open: the buyer can try another. */
function noteRefusal(write: Write, intent: Stripe.PaymentIntent): void {
  const orderId = intent.metadata.orderId ?? '';
  const open = write.tx
    .select({ payment: payments })
    .from(payments)
    .innerJoin(orders, eq(orders.id, payments.orderId))
    .where(and(eq(payments.orderId, orderId), eq(payments.state, 'open')))
    .orderBy(desc(payments.createdAt))
    .get()?.payment;
  if (!open) return;
  const refusal = (intent.last_payment_error?.message ?? 'The payment was refused.').slice(0, 300);
  write.tx.update(payments).set({ refusal, intentId: intent.id }).where(eq(payments.id, open.id)).run();
  write.audit({
    action: 'payment.refused',
    entity: 'order',
    entityId: orderId,
    after: { paymentId: open.id, refusal },
  });
}

function idOf(reference: string | { id: string } | null): string | null {
  return typeof reference === 'string' ? reference : (reference?.id ?? null);
}
