import { beforeEach, describe, expect, it } from 'vitest';
import { auditLog, holds, orders, outboxMails, stores } from '../../../server/db/schema/index.ts';
import { givenLaterBatch, givenOffer, givenOrder, type Offered } from '../../support/given-orders.ts';
import { givenLoss, givenWithheld, postOnce } from '../../support/given-stock.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

describe('a store orders', () => {
  let farm: TestFarm;
  let buyer: TestClient;
  let offer: Offered;

  beforeEach(async () => {
    farm = await startFarm();
    buyer = await farm.as('buyer');
    offer = givenOffer(farm, { code: 'WIG', tradeName: 'Wicket Green', pieces: 10, priceMinor: 1800 });
  });

  const body = (quantity: number, fields: object = {}) => ({
    lines: [{ listingId: offer.listingId, quantity, priceMinor: 1800 }],
    ...fields,
  });
  const held = () => farm.db.select().from(holds).all();

  it('when it asks what there is, sees offers with free counts and nothing of the inside of the farm', async () => {
    const { body: answer } = await buyer.get('/api/shop/availability').expect(200);

    expect(answer.offers).toEqual([
      {
        ...{ listingId: offer.listingId, lineCode: 'WIG', tradeName: 'Wicket Green', taxon: 'Seriatopora hystrix' },
        ...{ grade: 'large', priceMinor: 1800, free: 10 },
        sizeMm: { min: expect.closeTo(55.6, 6), max: expect.closeTo(55.6, 6) },
      },
    ]);
    expect(answer).toMatchObject({ currency: 'EUR', holdMinutes: 40, closed: false });
  });

  it('when all is there, holds the pieces for 40 minutes, counts them out, and tells the store by mail', async () => {
    const { body: order } = await postOnce(buyer, '/api/shop/orders', body(4, { note: 'Small boxes' })).expect(201);

    expect(order).toMatchObject({
      ...{ number: 1001, state: 'placed', totalMinor: 7200, taxMinor: 0, note: 'Small boxes', placedBy: 'Buyer 1' },
      holdUntil: farm.deps.clock.now() + 40 * 60_000,
    });
    expect(held()).toMatchObject([{ batchId: offer.batchId, pieces: 4 }]);
    const { body: after } = await buyer.get('/api/shop/availability');
    expect(after.offers[0].free).toBe(6);
    expect(farm.db.select().from(outboxMails).all()).toMatchObject([
      { template: 'order-placed', toAddress: 'store-1@example.com', data: { orderId: order.id } },
    ]);
    expect(farm.db.select().from(auditLog).all().at(-1)).toMatchObject({
      action: 'order.placed',
      actorName: 'Buyer 1',
    });
  });

  it('when the farm charges tax, adds it to the sum at the rate of the day', async () => {
    const owner = await farm.as('owner');
    await owner.patch('/api/farm').set('If-Match', '"1"').send({ taxPercent: 22.5 }).expect(200);

    const { body: order } = await postOnce(buyer, '/api/shop/orders', body(1)).expect(201);

    expect(order).toMatchObject({ subtotalMinor: 1800, taxPercent: 22.5, taxMinor: 405, totalMinor: 2205 });
  });

  it('when one batch is not enough, takes the oldest first and the rest from the next', async () => {
    const later = givenLaterBatch(farm, offer, { pieces: 10 });

    await postOnce(buyer, '/api/shop/orders', body(13)).expect(201);

    expect(held().map(({ batchId, pieces }) => [batchId, pieces])).toEqual([
      [offer.batchId, 10],
      [later.batchId, 3],
    ]);
  });

  it('when fewer are left than wanted, says how many at the line and writes nothing', async () => {
    givenOrder(farm, [{ offer, quantity: 8 }], farm.storeIds[1]);
    const second = givenOffer(farm);

    const { body: problem } = await postOnce(buyer, '/api/shop/orders', {
      lines: [
        { listingId: second.listingId, quantity: 1, priceMinor: 1800 },
        { listingId: offer.listingId, quantity: 3, priceMinor: 1800 },
      ],
    }).expect(409);

    expect(problem).toMatchObject({
      code: 'order.not_available',
      fields: [{ path: 'lines.1.quantity', message: '2 are left.' }],
      details: { available: { [offer.listingId]: 2 } },
    });
    expect(farm.db.select().from(orders).all()).toHaveLength(1);
    expect(held()).toHaveLength(1);
  });

  it('when two stores race for the last ones, one gets them and the other is told that none are left', async () => {
    const other = await farm.as('buyer', farm.storeIds[1]);

    const replies = await Promise.all([
      postOnce(buyer, '/api/shop/orders', body(10)),
      postOnce(other, '/api/shop/orders', body(10)),
    ]);

    expect(replies.map(({ status }) => status).sort()).toEqual([201, 409]);
    expect(replies.find(({ status }) => status === 409)?.body.fields[0].message).toBe('None are left.');
    expect(held().reduce((sum, { pieces }) => sum + pieces, 0)).toBe(10);
  });

  it('when pieces are withheld or lost, they can not be ordered', async () => {
    givenWithheld(farm, { plugCode: offer.codes[0] ?? '' });
    givenLoss(farm, offer.codes.slice(1, 4));

    const { body: problem } = await postOnce(buyer, '/api/shop/orders', body(7)).expect(409);

    expect(problem.fields[0].message).toBe('6 are left.');
  });

  it('when the same request comes twice, places one order and gives the same answer', async () => {
    const first = await postOnce(buyer, '/api/shop/orders', body(2), 'one-key').expect(201);
    const again = await postOnce(buyer, '/api/shop/orders', body(2), 'one-key').expect(201);

    expect(again.body).toEqual(first.body);
    expect(farm.db.select().from(orders).all()).toHaveLength(1);
  });

  it('when the price changed since the buyer saw it, does not charge the new one unseen', async () => {
    const owner = await farm.as('owner');
    await owner.patch(`/api/listings/${offer.listingId}`).set('If-Match', '"1"').send({ priceMinor: 1950 }).expect(200);

    const { body: problem } = await postOnce(buyer, '/api/shop/orders', body(1)).expect(409);

    expect(problem.fields).toEqual([
      { path: 'lines.0.priceMinor', message: expect.stringContaining('The price is now 19.50\u00a0EUR.') },
    ]);
    expect(farm.db.select().from(orders).all()).toEqual([]);
  });

  it('when an offer was switched off, none of it are left', async () => {
    const owner = await farm.as('owner');
    await owner.patch(`/api/listings/${offer.listingId}`).set('If-Match', '"1"').send({ active: false }).expect(200);

    await postOnce(buyer, '/api/shop/orders', body(1)).expect(409);
    expect((await buyer.get('/api/shop/availability')).body.offers).toEqual([]);
  });

  it('when its store is retired, it can look but not order', async () => {
    farm.db.update(stores).set({ retiredAt: 1 }).run();

    const { body: problem } = await postOnce(buyer, '/api/shop/orders', body(1)).expect(409);

    expect(problem.code).toBe('rule.refused');
    expect((await buyer.get('/api/shop/availability')).body.closed).toBe(true);
  });

  it.each([
    ['no lines', { lines: [] }, 'lines'],
    ['a part of a piece', { lines: [{ listingId: 'x', quantity: 1.5, priceMinor: 1 }] }, 'lines.0.quantity'],
    ['minus one piece', { lines: [{ listingId: 'x', quantity: -1, priceMinor: 1 }] }, 'lines.0.quantity'],
    ['a store of its choice', { lines: [], storeId: 'x' }, 'storeId'],
    ['a day gone by', { shipOn: '2026-03-01' }, 'shipOn'],
    ['a day that is none', { shipOn: '2026-02-30' }, 'shipOn'],
    ['a note without end', { note: 'x'.repeat(2001) }, 'note'],
  ])('when it sends %s, refuses at the field', async (_what, fields, path) => {
    const { body: problem } = await postOnce(buyer, '/api/shop/orders', body(1, fields)).expect(400);

    expect(problem.fields.map((field: { path: string }) => field.path)).toContain(path);
  });

  it('when it names the same offer twice, refuses', async () => {
    const line = { listingId: offer.listingId, quantity: 6, priceMinor: 1800 };

    await postOnce(buyer, '/api/shop/orders', { lines: [line, line] }).expect(400);
  });

  it('when an order is too small for a payment, says from how much on it can be placed', async () => {
    const cheap = givenOffer(farm, { priceMinor: 20 });

    const { body: problem } = await postOnce(buyer, '/api/shop/orders', {
      lines: [{ listingId: cheap.listingId, quantity: 2, priceMinor: 20 }],
    }).expect(409);

    expect(problem.detail).toBe('Order for 0.50\u00a0EUR or more.');
  });
});
