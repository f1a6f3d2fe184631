import type { PaymentService, CheckoutRequest, RefundRequest } from '../../server/outside/payment-service.ts';
import { availableByBatch } from '../../server/queries/availability.ts';
import { inWrite, type Actor, type Write } from '../../server/db/write.ts';
import { confirmPayment } from '../../server/services/confirm-payment.ts';
import { createListing } from '../../server/services/listing-service.ts';
import { packOrder } from '../../server/services/pack-order.ts';
import { pickPlug } from '../../server/services/pick-service.ts';
import { placeOrder } from '../../server/services/place-order.ts';
import { startPayment } from '../../server/services/start-payment.ts';
import type { LogCut } from '../../shared/contracts/stock.ts';
import type { ShopOrder } from '../../shared/contracts/shop.ts';
import { dayOf } from '../../shared/domain/days.ts';
import type { DomainError } from '../../shared/errors.ts';
import { givenColony, givenLine, givenSaleableBatch } from './given-stock.ts';
import type { TestFarm } from './start-farm.ts';

export interface Offered {
  lineId: string;
  colonyId: string;
  listingId: string;
  batchId: string;
  batchCode: string;
  /** Codes of the plugs of its first batch. */
  codes: string[];
}

/** A line with one saleable batch, offered at a price in the grade that it has on the farm's day: usually large. */
export function givenOffer(
  farm: TestFarm,
  fields: { code?: string; tradeName?: string; pieces?: number; priceMinor?: number } = {},
): Offered {
  const { code, tradeName, pieces = 10, priceMinor = 1800 } = fields;
  const lineId = givenLine(farm, { ...(code ? { code } : {}), ...(tradeName ? { tradeName } : {}) });
  const colonyId = givenColony(farm, { lineId });
  const batch = givenSaleableBatch(farm, { colonyId, pieces });
  const day = dayOf(farm.deps.clock.now(), 'Europe/Lisbon');
  const grade = availableByBatch(farm.db, { lineId, day })[0]?.grade ?? 'large';
  const listing = farm.write((write) => createListing(write, { lineId, grade, priceMinor }));
  const { batchId, batchCode, plugs } = batch;
  return { lineId, colonyId, listingId: listing.id, batchId, batchCode, codes: plugs.map((plug) => plug.code) };
}

/** Another saleable batch of an offered line, cut a week later, so that it is sold after the first. */
export function givenLaterBatch(farm: TestFarm, { lineId }: Offered, fields: Partial<LogCut> = {}) {
  return givenSaleableBatch(farm, { colonyId: givenColony(farm, { lineId }), cutOn: '2025-11-10', ...fields });
}

export function buyerOf(farm: TestFarm, storeId = farm.storeIds[0]): Actor {
  return { userId: null, name: 'Test buyer', role: 'buyer', storeId };
}

/** Something done by a buyer of the first store, or of the one given. */
export function asBuyer<T>(farm: TestFarm, act: (write: Write) => T, storeId = farm.storeIds[0]): T {
  return inWrite(farm.deps, buyerOf(farm, storeId), act);
}

export function givenOrder(
  farm: TestFarm,
  wanted: readonly { offer: Offered; quantity: number; priceMinor?: number }[],
  storeId = farm.storeIds[0],
): ShopOrder {
  const lines = wanted.map(({ offer, quantity, priceMinor = 1800 }) => ({
    listingId: offer.listingId,
    quantity,
    priceMinor,
  }));
  return asBuyer(farm, (write) => placeOrder(write, storeId, { lines, shipOn: null, note: '' }), storeId);
}

/** An order whose money has arrived. Needs `fakePayments`. */
export async function givenPaidOrder(
  farm: TestFarm,
  wanted: Parameters<typeof givenOrder>[1],
  storeId = farm.storeIds[0],
): Promise<ShopOrder> {
  const order = givenOrder(farm, wanted, storeId);
  await startPayment(farm.deps, buyerOf(farm, storeId), order.id);
  farm.write((write) =>
    confirmPayment(write, {
      sessionId: sessionOf(order.id),
      orderId: order.id,
      intentId: `pi_${order.number}`,
      amountMinor: order.totalMinor,
      currency: order.currency,
    }),
  );
  return order;
}

export function givenPicked(farm: TestFarm, orderId: string, codes: readonly string[]): void {
  farm.write((write) => {
    for (const code of codes) pickPlug(write, orderId, code);
  });
}

export function givenPacked(farm: TestFarm, orderId: string): void {
  farm.write((write) => packOrder(write, orderId, { boxes: 1, acceptMissing: false, supplies: [] }));
}

/** The session that `fakePayments` opens for the n-th try to pay an order. */
export function sessionOf(orderId: string, attempt = 1): string {
  return `cs_${orderId}_${attempt}`;
}

export interface FakePayments extends PaymentService {
  checkouts: CheckoutRequest[];
  expired: string[];
  refunds: RefundRequest[];
  /** What the next calls do instead. */
  fail: { createCheckout?: DomainError; expireCheckout?: DomainError; refund?: DomainError };
  /** Sessions that were paid, as `expireCheckout` finds them. */
  complete: Set<string>;
}

/** A payment service in memory. Its events are JSON signed with the word `right`. */
export function fakePayments(): FakePayments {
  const attempts = new Map<string, string[]>();
  const service: FakePayments = {
    checkouts: [],
    expired: [],
    refunds: [],
    fail: {},
    complete: new Set(),
    createCheckout(request) {
      if (service.fail.createCheckout) return Promise.reject(service.fail.createCheckout);
      service.checkouts.push(request);
      const keys = attempts.get(request.orderId) ?? [];
      if (!keys.includes(request.idempotencyKey)) keys.push(request.idempotencyKey);
      attempts.set(request.orderId, keys);
      const sessionId = sessionOf(request.orderId, keys.indexOf(request.idempotencyKey) + 1);
      return Promise.resolve({ sessionId, url: `https://pay.example.com/${sessionId}` });
    },
    expireCheckout(sessionId) {
      if (service.fail.expireCheckout) return Promise.reject(service.fail.expireCheckout);
      if (service.complete.has(sessionId)) return Promise.resolve('complete');
      service.expired.push(sessionId);
      return Promise.resolve('expired');
    },
    refund(request) {
      if (service.fail.refund) return Promise.reject(service.fail.refund);
      service.refunds.push(request);
      return Promise.resolve({ externalId: `re_${request.refundId}`, status: 'pending' });
    },
    readEvent(rawBody, signature) {
      if (signature !== 'right') throw new Error('No signatures found matching the expected signature for payload.');
      return JSON.parse(rawBody.toString('utf8')) as ReturnType<PaymentService['readEvent']>;
    },
  };
  return service;
}

let events = 0;

/** Delivers an event of the payment service to the webhook. */
export function deliver(
  farm: TestFarm,
  type: string,
  object: object,
  options: { id?: string; signature?: string } = {},
) {
  const { id = `evt_${(events += 1)}`, signature = 'right' } = options;
  return farm
    .anyone()
    .post('/api/webhooks/payments')
    .set('Stripe-Signature', signature)
    .set('Content-Type', 'application/json')
    .send(JSON.stringify({ id, type, data: { object } }));
}

/** The session of an order as a paid checkout's event shows it. */
export function paidSession(order: ShopOrder, fields: Record<string, unknown> = {}): object {
  return {
    id: sessionOf(order.id),
    client_reference_id: order.id,
    payment_status: 'paid',
    payment_intent: `pi_${order.number}`,
    amount_total: order.totalMinor,
    currency: order.currency.toLowerCase(),
    metadata: { orderId: order.id },
    ...fields,
  };
}
