import { beforeEach, describe, expect, it } from 'vitest';
import { orders, outboxMails, paymentEvents, payments, refunds } from '../../../server/db/schema/index.ts';
import { closeCheckouts } from '../../../server/jobs/close-checkouts.ts';
import { expireHolds } from '../../../server/jobs/expire-holds.ts';
import { sendRefunds } from '../../../server/jobs/send-refunds.ts';
import { DomainError } from '../../../shared/errors.ts';
import type { ShopOrder } from '../../../shared/contracts/shop.ts';
import {
  deliver,
  fakePayments,
  givenOffer,
  givenOrder,
  paidSession,
  sessionOf,
  type FakePayments,
  type Offered,
} from '../../support/given-orders.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

const MINUTE = 60_000;
const silent = new DomainError('service.unavailable', 'The payment service does not answer. Try again in a minute.');

describe('a store pays', () => {
  let farm: TestFarm;
  let service: FakePayments;
  let buyer: TestClient;
  let offer: Offered;
  let order: ShopOrder;

  beforeEach(async () => {
    service = fakePayments();
    farm = await startFarm({ payments: service });
    buyer = await farm.as('buyer');
    offer = givenOffer(farm, { code: 'WIG', tradeName: 'Wicket Green' });
    order = givenOrder(farm, [{ offer, quantity: 4 }]);
  });

  const pay = () => buyer.post(`/api/shop/orders/${order.id}/pay`).send();
  const stateNow = () => farm.db.select().from(orders).get()?.state;
  const paymentNow = () => farm.db.select().from(payments).get();
  const free = async () => (await buyer.get('/api/shop/availability')).body.offers[0].free as number;

  it('when it goes to pay, opens a page for the exact amount that lasts as long as the hold', async () => {
    const { body } = await pay().expect(200);

    expect(body.url).toBe(`https://pay.example.com/${sessionOf(order.id)}`);
    expect(service.checkouts).toMatchObject([
      {
        ...{ orderId: order.id, orderNumber: 1001, currency: 'EUR', email: 'store-1@example.com' },
        description: 'Order 1001 at Test Farm',
        lines: [{ name: 'WIG Wicket Green, large frag', quantity: 4, unitAmountMinor: 1800 }],
        successUrl: `http://farm.example.com/shop/orders/${order.id}?payment=returned`,
        expiresAt: order.holdUntil,
      },
    ]);
    expect(paymentNow()).toMatchObject({ state: 'open', amountMinor: 7200 });
    expect(stateNow()).toBe('placed');
  });

  it('when it taps pay again, is led to the same page', async () => {
    const replies = [await pay(), await pay()];

    expect(new Set(replies.map(({ body }) => body.url)).size).toBe(1);
    expect(farm.db.select().from(payments).all()).toHaveLength(1);
  });

  it('when little of the hold is left, makes it last as long as the page must be open', async () => {
    farm.wait(15 * MINUTE);

    await pay().expect(200);

    const until = farm.deps.clock.now() + 31 * MINUTE;
    expect(service.checkouts[0]?.expiresAt).toBe(until);
    expect(farm.db.select().from(orders).get()?.holdUntil).toBe(until);
  });

  it('when the payment service does not answer, says so and leaves the order as it was', async () => {
    service.fail.createCheckout = silent;

    expect((await pay().expect(503)).body.code).toBe('service.unavailable');
    expect(farm.db.select().from(payments).all()).toEqual([]);
  });

  it('when the event of the payment comes, the order is paid, kept, and the store is told', async () => {
    await pay();

    await deliver(farm, 'checkout.session.completed', paidSession(order)).expect(200);

    expect(farm.db.select().from(orders).get()).toMatchObject({
      state: 'paid',
      holdUntil: null,
      paidAt: farm.deps.clock.now(),
    });
    expect(paymentNow()).toMatchObject({ state: 'paid', intentId: 'pi_1001' });
    expect(farm.db.select().from(outboxMails).all().at(-1)).toMatchObject({ template: 'order-paid' });
    expect((await pay().expect(409)).body.detail).toBe('This order is paid already.');
  });

  it('when an event comes twice, or another says the same, nothing happens again', async () => {
    await pay();
    await deliver(farm, 'checkout.session.completed', paidSession(order), { id: 'evt_same' }).expect(200);
    const mails = farm.db.select().from(outboxMails).all().length;

    await deliver(farm, 'checkout.session.completed', paidSession(order), { id: 'evt_same' }).expect(200);
    await deliver(farm, 'checkout.session.completed', paidSession(order)).expect(200);

    expect(farm.db.select().from(outboxMails).all()).toHaveLength(mails);
    expect(farm.db.select().from(refunds).all()).toEqual([]);
    expect(farm.db.select().from(paymentEvents).all()).toHaveLength(2);
  });

  it.each(['wrong', ''])('when an event is signed "%s", refuses it and changes nothing', async (signature) => {
    await pay();

    await deliver(farm, 'checkout.session.completed', paidSession(order), { signature }).expect(400);

    expect(stateNow()).toBe('placed');
    expect(farm.db.select().from(paymentEvents).all()).toEqual([]);
  });

  it('when an event is of an unknown kind or about an order of others, takes it and changes nothing', async () => {
    await deliver(farm, 'customer.created', { id: 'cus_1' }).expect(200);
    await deliver(
      farm,
      'checkout.session.completed',
      paidSession(order, { id: 'cs_x', client_reference_id: 'x' }),
    ).expect(200);

    expect(stateNow()).toBe('placed');
  });

  it.each([
    ['another amount', { amount_total: 7199 }],
    ['another currency', { currency: 'usd' }],
  ])('when %s was paid, the order is not paid and staff can see why', async (_what, fields) => {
    await pay();

    await deliver(farm, 'checkout.session.completed', paidSession(order, fields)).expect(200);

    expect(stateNow()).toBe('placed');
    expect(paymentNow()).toMatchObject({ state: 'failed', refusal: expect.stringContaining('not the amount') });
  });

  it('when a slow way to pay has only been started, waits for the money', async () => {
    await pay();
    await deliver(farm, 'checkout.session.completed', paidSession(order, { payment_status: 'unpaid' })).expect(200);
    expect(stateNow()).toBe('placed');

    await deliver(farm, 'checkout.session.async_payment_succeeded', paidSession(order)).expect(200);

    expect(stateNow()).toBe('paid');
  });

  it('when our answer got lost and the event names a page that we never stored, takes the payment all the same', async () => {
    await deliver(farm, 'checkout.session.completed', paidSession(order)).expect(200);

    expect(stateNow()).toBe('paid');
    expect(paymentNow()).toMatchObject({ state: 'paid', amountMinor: 7200 });
  });

  it('when "expired" comes after "paid", it stays paid', async () => {
    await pay();
    await deliver(farm, 'checkout.session.completed', paidSession(order));

    await deliver(farm, 'checkout.session.expired', paidSession(order)).expect(200);

    expect(stateNow()).toBe('paid');
    expect(paymentNow()?.state).toBe('paid');
  });

  it('when the card was refused, the buyer sees why and can pay on the same page', async () => {
    await pay();

    await deliver(farm, 'payment_intent.payment_failed', {
      id: 'pi_1',
      metadata: { orderId: order.id },
      last_payment_error: { message: 'Your card was declined.' },
    }).expect(200);

    const { body } = await buyer.get(`/api/shop/orders/${order.id}`);
    expect(body).toMatchObject({ state: 'placed', refusal: 'Your card was declined.' });
    await pay().expect(200);
    expect(farm.db.select().from(payments).all()).toHaveLength(1);
  });

  it('when it was not paid in time, the order is cancelled, its page closed and its pieces are free', async () => {
    await pay();
    farm.wait(40 * MINUTE);

    await expireHolds(farm.deps);

    expect(farm.db.select().from(orders).get()).toMatchObject({
      state: 'cancelled',
      cancelReason: 'It was not paid in time.',
    });
    expect(service.expired).toEqual([sessionOf(order.id)]);
    expect(await free()).toBe(10);
    expect((await pay().expect(409)).body.code).toBe('order.wrong_state');
  });

  it('when the hold still runs, nothing is freed', async () => {
    farm.wait(40 * MINUTE - 1);

    await expireHolds(farm.deps);

    expect(stateNow()).toBe('placed');
    expect(await free()).toBe(6);
  });

  it('when it was paid in the last moment, waits for the event instead of cancelling', async () => {
    await pay();
    service.complete.add(sessionOf(order.id));
    farm.wait(41 * MINUTE);
    await expireHolds(farm.deps);
    expect(stateNow()).toBe('placed');

    await deliver(farm, 'checkout.session.completed', paidSession(order));
    await expireHolds(farm.deps);

    expect(stateNow()).toBe('paid');
  });

  it('when the payment service is away at the end of the hold, the order waits for it', async () => {
    await pay();
    service.fail.expireCheckout = silent;
    farm.wait(41 * MINUTE);
    await expireHolds(farm.deps);
    expect(stateNow()).toBe('placed');

    delete service.fail.expireCheckout;
    await expireHolds(farm.deps);

    expect(stateNow()).toBe('cancelled');
  });

  it('when it cancels before it pays, the pieces are free and the page is closed', async () => {
    await pay();

    const { body } = await buyer.post(`/api/shop/orders/${order.id}/cancel`).expect(200);
    await closeCheckouts(farm.deps);

    expect(body.state).toBe('cancelled');
    expect(await free()).toBe(10);
    expect(service.expired).toEqual([sessionOf(order.id)]);
    expect(paymentNow()?.state).toBe('expired');
  });

  it('when the order is cancelled while its page is being made, is led nowhere and the page is closed', async () => {
    farm.deps.payments.createCheckout = async (request) => {
      const made = await service.createCheckout(request);
      await buyer.post(`/api/shop/orders/${order.id}/cancel`).send().expect(200);
      return made;
    };

    expect((await pay().expect(409)).body.code).toBe('order.wrong_state');
    await closeCheckouts(farm.deps);

    expect(service.expired).toEqual([sessionOf(order.id)]);
    expect(paymentNow()?.state).toBe('expired');
  });

  it('when a payment arrives for an order cancelled meanwhile, it goes back by itself', async () => {
    await pay();
    await buyer.post(`/api/shop/orders/${order.id}/cancel`).expect(200);

    await deliver(farm, 'checkout.session.completed', paidSession(order)).expect(200);
    await sendRefunds(farm.deps);

    expect(stateNow()).toBe('cancelled');
    expect(service.refunds).toMatchObject([{ intentId: 'pi_1001', amountMinor: 7200 }]);
    expect(farm.db.select().from(refunds).all()).toMatchObject([{ state: 'pending', amountMinor: 7200 }]);
  });

  it('when it is paid twice on two pages, the second payment goes back', async () => {
    await pay();
    await deliver(farm, 'checkout.session.completed', paidSession(order));

    await deliver(
      farm,
      'checkout.session.completed',
      paidSession(order, { id: 'cs_other', payment_intent: 'pi_other' }),
    ).expect(200);
    await sendRefunds(farm.deps);

    expect(stateNow()).toBe('paid');
    expect(service.refunds).toMatchObject([{ intentId: 'pi_other', amountMinor: 7200 }]);
  });

  it('when it is paid, the buyer can not cancel it', async () => {
    await pay();
    await deliver(farm, 'checkout.session.completed', paidSession(order));

    const { body } = await buyer.post(`/api/shop/orders/${order.id}/cancel`).expect(409);

    expect(body.detail).toBe('This order is paid. Ask us to cancel it.');
  });
});
