import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { holds, invoices, plugs, refunds, stockAccounts, stockMovements } from '../../../server/db/schema/index.ts';
import { sendDueMails } from '../../../server/jobs/send-due-mails.ts';
import { sendRefunds } from '../../../server/jobs/send-refunds.ts';
import {
  deliver,
  fakePayments,
  givenOffer,
  givenPacked,
  givenPaidOrder,
  givenPicked,
  type FakePayments,
  type Offered,
} from '../../support/given-orders.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

describe('packing and shipping an order', () => {
  let farm: TestFarm;
  let service: FakePayments;
  let sales: TestClient;
  let offer: Offered;
  let orderId: string;

  beforeEach(async () => {
    service = fakePayments();
    farm = await startFarm({ payments: service });
    sales = await farm.as('sales');
    offer = givenOffer(farm, { code: 'WIG', tradeName: 'Wicket Green' });
    orderId = (await givenPaidOrder(farm, [{ offer, quantity: 3 }])).id;
  });

  const pack = (body: object) => sales.post(`/api/orders/${orderId}/pack`).send({ boxes: 1, ...body });
  const ship = (id = orderId) =>
    sales.post(`/api/orders/${id}/ship`).send({ carrier: 'Night Post', tracking: 'NP 4711' });
  const order = async () => (await sales.get(`/api/orders/${orderId}`).expect(200)).body;

  it('when all is picked, closes the boxes and ends the promises', async () => {
    givenPicked(farm, orderId, offer.codes.slice(0, 3));

    const { body } = await pack({ boxes: 2 }).expect(200);

    expect(body).toMatchObject({ state: 'packed', boxes: 2, refunds: [] });
    expect(
      farm.db
        .select()
        .from(holds)
        .all()
        .map(({ pieces }) => pieces),
    ).toEqual([0]);
  });

  it('when pieces are missing, asks first and names them', async () => {
    givenPicked(farm, orderId, offer.codes.slice(0, 1));

    const { body } = await pack({}).expect(409);

    expect(body.detail).toBe('Still missing: 2 of WIG. Pick them, or pack without and pay them back.');
    expect((await order()).state).toBe('picking');
  });

  it('when it is packed without them, frees them and pays them back with their tax', async () => {
    const owner = await farm.as('owner');
    await owner.patch('/api/farm').set('If-Match', '"1"').send({ taxPercent: 10 }).expect(200);
    const taxed = await givenPaidOrder(farm, [{ offer, quantity: 3 }]);
    givenPicked(farm, taxed.id, offer.codes.slice(0, 2));

    const { body } = await sales
      .post(`/api/orders/${taxed.id}/pack`)
      .send({ boxes: 1, acceptMissing: true })
      .expect(200);
    await sendRefunds(farm.deps);

    expect(body.lines).toMatchObject([{ quantity: 3, picked: 2, missing: 1, amountMinor: 3600 }]);
    expect(service.refunds).toMatchObject([{ amountMinor: 1980 }]);
    const listing = (await sales.get('/api/listings')).body.items[0];
    // Ten cut, two in this order, three promised to the other.
    expect(listing).toMatchObject({ free: 5, held: 3 });
  });

  it('when nothing is picked, tells to cancel instead', async () => {
    expect((await pack({ acceptMissing: true }).expect(409)).body.code).toBe('order.wrong_state');
  });

  it('when it is not packed, it can not be shipped', async () => {
    expect((await ship().expect(409)).body.detail).toBe('Order 1001 is not packed. Pack it, then ship it.');
    expect(farm.db.select().from(invoices).all()).toEqual([]);
  });

  it('when it is shipped, every plug is sold, the invoice is issued and the store told', async () => {
    givenPicked(farm, orderId, offer.codes.slice(0, 3));
    givenPacked(farm, orderId);

    const { body } = await ship().expect(200);
    await sendDueMails(farm.deps);

    expect(body).toMatchObject({
      state: 'shipped',
      carrier: 'Night Post',
      invoice: { number: 1, issuedOn: '2026-03-02' },
    });
    const sold = farm.db
      .select({ code: plugs.code })
      .from(plugs)
      .innerJoin(stockAccounts, eq(stockAccounts.id, plugs.accountId))
      .where(eq(stockAccounts.kind, 'sold'))
      .all();
    expect(sold.map(({ code }) => code).sort()).toEqual(offer.codes.slice(0, 3).sort());
    expect(farm.db.select().from(stockMovements).where(eq(stockMovements.kind, 'ship')).all()).toHaveLength(3);
    expect(farm.mails.at(-1)).toMatchObject({ to: 'store-1@example.com', subject: 'Order 1001 is on its way' });
    expect(farm.mails.at(-1)?.text).toContain('NP 4711');
    expect((await ship().expect(409)).body.code).toBe('order.wrong_state');
  });

  it('when several are shipped, invoices are numbered without gaps and are never changed', async () => {
    const second = await givenPaidOrder(farm, [{ offer, quantity: 2 }], farm.storeIds[1]);
    givenPicked(farm, second.id, offer.codes.slice(3, 5));
    givenPacked(farm, second.id);
    givenPicked(farm, orderId, offer.codes.slice(0, 3));
    givenPacked(farm, orderId);

    await ship(second.id).expect(200);
    await ship('00000000-0000-4000-8000-00000000dead').expect(404);
    await ship().expect(200);

    expect(
      farm.db
        .select()
        .from(invoices)
        .all()
        .map(({ number }) => number),
    ).toEqual([1, 2]);
    expect(() => farm.db.update(invoices).set({ number: 7 }).run()).toThrow();
  });

  it('when the store moved afterwards, the invoice says what it said', async () => {
    givenPicked(farm, orderId, offer.codes.slice(0, 3));
    givenPacked(farm, orderId);
    await ship().expect(200);

    await sales
      .patch(`/api/stores/${farm.storeIds[0]}`)
      .set('If-Match', '"1"')
      .send({ address: 'Elsewhere 1' })
      .expect(200);

    expect(farm.db.select().from(invoices).get()?.content).toMatchObject({
      ...{ number: 1, orderNumber: 1001, currency: 'EUR', subtotalMinor: 5400, totalMinor: 5400, paidMinor: 5400 },
      store: { name: 'Store 1', address: '' },
      lines: [
        { code: 'WIG', name: 'Wicket Green', grade: 'Large frag', quantity: 3, priceMinor: 1800, amountMinor: 5400 },
      ],
    });
  });

  it('when papers are asked for, gives an invoice after shipping and a packing list before', async () => {
    givenPicked(farm, orderId, offer.codes.slice(0, 3));
    await sales.get(`/api/orders/${orderId}/invoice.pdf`).expect(404);
    const list = await sales.get(`/api/orders/${orderId}/packing-list.pdf`).expect(200);
    givenPacked(farm, orderId);
    await ship().expect(200);

    const buyer = await farm.as('buyer');
    const invoice = await buyer.get(`/api/shop/orders/${orderId}/invoice.pdf`).expect(200);

    for (const file of [list, invoice]) {
      expect(file.headers['content-type']).toBe('application/pdf');
      expect(Buffer.from(file.body).subarray(0, 5).toString()).toBe('%PDF-');
    }
  });

  it('when staff cancel a paid order, its stock is free and its money goes back', async () => {
    const { body } = await sales.post(`/api/orders/${orderId}/cancel`).send({ reason: 'Heater failed' }).expect(200);
    await sendRefunds(farm.deps);

    expect(body).toMatchObject({ state: 'cancelled', cancelReason: 'Heater failed', refundableMinor: 0 });
    expect(service.refunds).toMatchObject([{ amountMinor: 5400 }]);
    expect((await sales.get('/api/listings')).body.items[0].free).toBe(10);
  });

  it('when plugs are picked for it, they go back before it is cancelled', async () => {
    givenPicked(farm, orderId, offer.codes.slice(0, 2));

    const { body } = await sales.post(`/api/orders/${orderId}/cancel`).send({ reason: 'x' }).expect(409);

    expect(body.detail).toBe('2 plugs are picked for this order. Put them back first.');
  });

  describe('refunds', () => {
    const refund = (amountMinor: number, key = `r-${amountMinor}`) =>
      sales
        .post(`/api/orders/${orderId}/refunds`)
        .set('Idempotency-Key', key)
        .send({ amountMinor, reason: 'One was pale' });
    const event = (id: string, status: string) => ({
      ...{ id: `re_${id}`, status, amount: 1000, payment_intent: 'pi_1001', metadata: { refundId: id } },
    });

    it('when a part goes back, it is sent once and settled by its event', async () => {
      const { body } = await refund(1000).expect(201);
      await refund(1000).expect(201);
      await sendRefunds(farm.deps);
      await sendRefunds(farm.deps);
      expect(service.refunds).toHaveLength(1);
      expect((await order()).refunds).toMatchObject([{ state: 'pending', amountMinor: 1000 }]);

      await deliver(farm, 'refund.updated', event(body.id, 'succeeded')).expect(200);
      await sendDueMails(farm.deps);

      expect(await order()).toMatchObject({ refundableMinor: 4400, refunds: [{ state: 'succeeded' }] });
      expect(farm.mails.at(-1)?.subject).toBe('Money back for order 1001');
    });

    it('when the event comes before our answer, and older ones after it, the refund stays settled', async () => {
      const { body } = await refund(1000).expect(201);
      await deliver(farm, 'refund.updated', event(body.id, 'succeeded')).expect(200);
      await deliver(farm, 'refund.created', event(body.id, 'pending')).expect(200);
      await sendRefunds(farm.deps);

      expect(farm.db.select().from(refunds).all()).toMatchObject([{ state: 'succeeded', externalId: `re_${body.id}` }]);
      expect(service.refunds).toEqual([]);
    });

    it('when it fails at the bank, the amount can be given back again', async () => {
      const { body } = await refund(1000).expect(201);
      await sendRefunds(farm.deps);

      await deliver(farm, 'refund.failed', event(body.id, 'failed')).expect(200);

      expect(await order()).toMatchObject({ refundableMinor: 5400, refunds: [{ state: 'failed' }] });
    });

    it('when the whole charge is told to be refunded, waiting refunds of it are settled', async () => {
      await refund(1000).expect(201);
      await sendRefunds(farm.deps);

      await deliver(farm, 'charge.refunded', { payment_intent: 'pi_1001', amount_refunded: 1000 }).expect(200);

      expect((await order()).refunds).toMatchObject([{ state: 'succeeded' }]);
    });

    it('when money went back by hand at the payment service, the books show it', async () => {
      await deliver(farm, 'refund.updated', {
        ...{ id: 're_by_hand', status: 'succeeded', amount: 700, payment_intent: 'pi_1001', metadata: {} },
      }).expect(200);

      expect(await order()).toMatchObject({
        refundableMinor: 4700,
        refunds: [{ amountMinor: 700, state: 'succeeded' }],
      });
    });

    it('when more than was paid is asked for, says how much is left', async () => {
      await refund(5000).expect(201);

      const { body } = await refund(401).expect(409);

      expect(body.fields).toEqual([{ path: 'amountMinor', message: 'At most 4.00\u00a0EUR can be given back.' }]);
    });

    it('when all is asked for of an order that is still to be packed, tells to cancel it', async () => {
      expect((await refund(5400).expect(409)).body.detail).toContain('cancel the order');
    });

    it.each([0, -5, 1.5])('when %s is asked for, refuses it', async (amountMinor) => {
      await refund(amountMinor).expect(400);
    });
  });
});
