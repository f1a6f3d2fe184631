import Stripe from 'stripe';
import { DomainError } from '../../shared/errors.ts';

export interface CheckoutRequest {
  orderId: string;
  orderNumber: number;
  /** Shown to the payer. */
  description: string;
  email: string;
  currency: string;
  lines: { name: string; quantity: number; unitAmountMinor: number }[];
  successUrl: string;
  cancelUrl: string;
  expiresAt: number;
  idempotencyKey: string;
}

export interface RefundRequest {
  intentId: string;
  amountMinor: number;
  /** Id of our own refund; it comes back with events, and a repeat gives money back only once. */
  refundId: string;
}

/**
 * The hosted payment service, seen through what the product needs of it. Calls reject with `service.unavailable` where it
 * does not answer, and with `rule.refused` where it will not do what was asked.
 */
export interface PaymentService {
  createCheckout(request: CheckoutRequest): Promise<{ sessionId: string; url: string }>;
  /** Closes a checkout, so that it can't be paid any more. 'complete': it was paid before. */
  expireCheckout(sessionId: string): Promise<'expired' | 'complete'>;
  refund(request: RefundRequest): Promise<{ externalId: string; status: string }>;
  /** @throws when the signature does not fit the raw body */
  readEvent(rawBody: Buffer, signature: string): Stripe.Event;
}

/** Stripe through its SDK; `apiUrl` (empty: the real service) points it at a stand-in with the same protocol. */
export function stripePayments(options: { secretKey: string; webhookSecret: string; apiUrl: string }): PaymentService {
  const stripe = new Stripe(options.secretKey, { ...hostOf(options.apiUrl), maxNetworkRetries: 2, timeout: 10_000 });
  return {
    async createCheckout(request) {
      const session = await answered(
        stripe.checkout.sessions.create(checkoutParams(request), { idempotencyKey: request.idempotencyKey }),
      );
      if (!session.url) throw new DomainError('service.unavailable', 'The payment service gave no page to pay on.');
      return { sessionId: session.id, url: session.url };
    },
    async expireCheckout(sessionId) {
      try {
        await stripe.checkout.sessions.expire(sessionId);
        return 'expired';
      } catch (error) {
        if (!(error instanceof Stripe.errors.StripeInvalidRequestError)) throw toDomainError(error);
        // Only open checkouts can be closed: this one was paid, has lapsed, or is not known there any more.
        if (error.code === 'resource_missing') return 'expired';
        const { status } = await answered(stripe.checkout.sessions.retrieve(sessionId));
        return status === 'complete' ? 'complete' : 'expired';
      }
    },
    async refund({ intentId, amountMinor, refundId }) {
      const refund = await answered(
        stripe.refunds.create(
          { payment_intent: intentId, amount: amountMinor, metadata: { refundId } },
          { idempotencyKey: `refund-${refundId}` },
        ),
      );
      return { externalId: refund.id, status: refund.status ?? 'pending' };
    },
    readEvent(rawBody, signature) {
      return stripe.webhooks.constructEvent(rawBody, signature, options.webhookSecret);
    },
  };
}

function checkoutParams(request: CheckoutRequest): Stripe.Checkout.SessionCreateParams {
  const metadata = { orderId: request.orderId, orderNumber: String(request.orderNumber) };
  return {
    mode: 'payment',
    client_reference_id: request.orderId,
    metadata,
    // A refused card is told by an event of the payment, which knows its own metadata only.
    payment_intent_data: { metadata, description: request.description },
    customer_email: request.email,
    line_items: request.lines.map((line) => ({
      quantity: line.quantity,
      price_data: {
        currency: request.currency.toLowerCase(),
        unit_amount: line.unitAmountMinor,
        product_data: { name: line.name },
      },
    })),
    success_url: request.successUrl,
    cancel_url: request.cancelUrl,
    expires_at: Math.floor(request.expiresAt / 1000),
  };
}

async function answered<T>(call: Promise<T>): Promise<T> {
  try {
    return await call;
  } catch (error) {
    throw toDomainError(error);
  }
}

function toDomainError(error: unknown): unknown {
  if (error instanceof Stripe.errors.StripeInvalidRequestError) {
    return new DomainError('rule.refused', `The payment service refused this: ${error.message}`);
  }
  if (error instanceof Stripe.errors.StripeError) {
    return new DomainError('service.unavailable', 'The payment service does not answer. Try again in a minute.');
  }
  return error;
}

function hostOf(apiUrl: string): Partial<Stripe.StripeConfig> {
  if (!apiUrl) return {};
  const url = new URL(apiUrl);
  return {
    host: url.hostname,
    port: url.port || (url.protocol === 'https:' ? '443' : '80'),
    protocol: url.protocol === 'https:' ? 'https' : 'http',
  };
}
