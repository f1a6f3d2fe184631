import Stripe from 'stripe';

export interface CheckoutRequest {
  orderId: string;
  orderNumber: number;
  email: string;
  currency: string;
  lines: { name: string; quantity: number; unitAmountMinor: number }[];
  successUrl: string;
  cancelUrl: string;
  expiresAt: number;
  idempotencyKey: string;
}

/** The hosted payment service, seen through what the product needs of it. */
export interface PaymentService {
  createCheckout(request: CheckoutRequest): Promise<{ sessionId: string; url: string }>;
  expireCheckout(sessionId: string): Promise<void>;
  refund(request: {
    intentId: string;
    amountMinor: number;
    idempotencyKey: string;
  }): Promise<{ refundId: string; status: string }>;
  /** @throws when the signature does not fit the raw body */
  readEvent(rawBody: Buffer, signature: string): Stripe.Event;
}

/** Stripe through its SDK; `apiUrl` (empty: the real service) points it at a stand-in with the same protocol. */
export function stripePayments(options: { secretKey: string; webhookSecret: string; apiUrl: string }): PaymentService {
  const stripe = new Stripe(options.secretKey, { ...hostOf(options.apiUrl), maxNetworkRetries: 2, timeout: 10_000 });
  return {
    async createCheckout(request) {
      const session = await stripe.checkout.sessions.create(
        {
          mode: 'payment',
          client_reference_id: request.orderId,
          metadata: { orderId: request.orderId, orderNumber: String(request.orderNumber) },
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
        },
        { idempotencyKey: request.idempotencyKey },
      );
      if (!session.url) throw new Error('The payment service gave no page to pay on.');
      return { sessionId: session.id, url: session.url };
    },
    async expireCheckout(sessionId) {
      await stripe.checkout.sessions.expire(sessionId);
    },
    async refund({ intentId, amountMinor, idempotencyKey }) {
      const refund = await stripe.refunds.create({ payment_intent: intentId, amount: amountMinor }, { idempotencyKey });
      return { refundId: refund.id, status: refund.status ?? 'pending' };
    },
    readEvent(rawBody, signature) {
      return stripe.webhooks.constructEvent(rawBody, signature, options.webhookSecret);
    },
  };
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
