import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import Stripe from 'stripe';
import { onTestFinished } from 'vitest';
import { startPayments, type PaymentsOptions, type RunningPayments } from '../../../fakes/payments/server.ts';

export const API_KEY = 'sk_test_of_the_tests';
export const WEBHOOK_SECRET = 'whsec_of_the_tests';

export interface Shop {
  payments: RunningPayments;
  stripe: Stripe;
}

/** The stand-in on a free port with the real SDK pointed at it; both are gone after the test. */
export async function startShop(options: PaymentsOptions = {}): Promise<Shop> {
  const payments = await startPayments({ port: 0, apiKey: API_KEY, webhookSecret: WEBHOOK_SECRET, ...options });
  onTestFinished(() => payments.close());
  return { payments, stripe: sdkFor(payments) };
}

export function sdkFor(payments: RunningPayments, apiKey = API_KEY): Stripe {
  return new Stripe(apiKey, {
    host: '127.0.0.1',
    port: payments.ports.http,
    protocol: 'http',
    maxNetworkRetries: 0,
  });
}

export const anOrder = {
  mode: 'payment',
  client_reference_id: 'LS-1047',
  customer_email: 'buyer@example.com',
  metadata: { orderId: 'order-1' },
  payment_intent_data: { metadata: { orderId: 'order-1' } },
  success_url: 'http://127.0.0.1:3000/orders/1047?paid={CHECKOUT_SESSION_ID}',
  cancel_url: 'http://127.0.0.1:3000/orders/1047',
  line_items: [
    { quantity: 12, price_data: { currency: 'usd', unit_amount: 1800, product_data: { name: 'Ember Plate & <co>' } } },
    { quantity: 1, price_data: { currency: 'usd', unit_amount: 2950, product_data: { name: 'Box' } } },
  ],
} satisfies Stripe.Checkout.SessionCreateParams;
export const ORDER_TOTAL = 24_550;

/** Fills in the form of the hosted page as a browser sends it, and does not follow the redirect. */
export async function pay(url: string | null, number: string, fields: Record<string, string> = {}): Promise<Response> {
  const form = { number, expiry: '12 / 39', cvc: '123', name: 'Test Buyer', ...fields };
  return fetch(url ?? '', { method: 'POST', body: new URLSearchParams(form), redirect: 'manual' });
}

export interface Receiver {
  url: string;
  /** Events whose signature the SDK found right, in the order they came. */
  events: Stripe.Event[];
  /** Count of deliveries, the refused ones included. */
  deliveries: number;
  /** Status codes of the next answers; afterwards 200. */
  nextStatuses: number[];
}

/** A webhook address that checks each delivery with the SDK, as the product does. */
export async function startReceiver(): Promise<Receiver> {
  const receiver: Receiver = { url: '', events: [], deliveries: 0, nextStatuses: [] };
  const server = createServer((req, res) => {
    const chunks: Buffer[] = [];
    req.on('data', (chunk: Buffer) => chunks.push(chunk));
    req.on('end', () => {
      receiver.deliveries += 1;
      const status = receiver.nextStatuses.shift() ?? 200;
      if (status === 200) {
        const signature = req.headers['stripe-signature'] ?? '';
        receiver.events.push(Stripe.webhooks.constructEvent(Buffer.concat(chunks), signature, WEBHOOK_SECRET));
      }
      res.writeHead(status).end();
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  onTestFinished(() => {
    server.closeAllConnections();
    server.close();
  });
  // A server that listens on a host and a port has an address of this shape.
  receiver.url = `http://127.0.0.1:${(server.address() as AddressInfo).port}/webhooks`;
  return receiver;
}
