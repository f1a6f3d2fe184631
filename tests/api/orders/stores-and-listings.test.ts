import { beforeEach, describe, expect, it } from 'vitest';
import { listings, stores } from '../../../server/db/schema/index.ts';
import { givenOffer, givenOrder } from '../../support/given-orders.ts';
import { givenLine, postOnce } from '../../support/given-stock.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

let farm: TestFarm;
let owner: TestClient;
let sales: TestClient;

beforeEach(async () => {
  farm = await startFarm();
  owner = await farm.as('owner');
  sales = await farm.as('sales');
});

describe('stores', () => {
  const reef = { code: 'reef-1', name: 'Reef Corner', email: 'Orders@Example.org' };

  it('when a store is added, keeps its code in capitals and its e-mail in small letters', async () => {
    const { body } = await postOnce(sales, '/api/stores', reef).expect(201);

    expect(body).toMatchObject({ code: 'REEF-1', email: 'orders@example.org', phone: '', retiredAt: null, version: 1 });
  });

  it('when the code is taken, says so at the field', async () => {
    const { body } = await postOnce(sales, '/api/stores', { ...reef, code: 'S1' }).expect(409);

    expect(body).toMatchObject({ code: 'record.duplicate', fields: [{ path: 'code' }] });
  });

  it('when someone else saved first, refuses the edit with the record as it is', async () => {
    const path = `/api/stores/${farm.storeIds[0]}`;
    await sales.patch(path).set('If-Match', '"1"').send({ name: 'First' }).expect(200);

    const { body } = await sales.patch(path).set('If-Match', '"1"').send({ name: 'Second' }).expect(412);

    expect(body).toMatchObject({ code: 'edit.stale', details: { current: { name: 'First', version: 2 } } });
    expect(
      farm.db
        .select()
        .from(stores)
        .all()
        .map(({ name }) => name),
    ).toContain('First');
    await sales.patch(path).send({ name: 'Third' }).expect(428);
  });

  it('when a store is retired and opened again, both are kept in its record', async () => {
    const path = `/api/stores/${farm.storeIds[0]}`;
    const { body: retired } = await sales.patch(path).set('If-Match', '"1"').send({ retired: true }).expect(200);
    const { body: open } = await sales.patch(path).set('If-Match', '"2"').send({ retired: false }).expect(200);

    expect([retired.retiredAt, open.retiredAt]).toEqual([farm.deps.clock.now(), null]);
  });

  it('when stores are listed, pages through all by name with their orders', async () => {
    givenOrder(farm, [{ offer: givenOffer(farm), quantity: 1 }]);
    await postOnce(sales, '/api/stores', reef).expect(201);

    const { body: first } = await sales.get('/api/stores?limit=2').expect(200);
    const { body: rest } = await sales.get(`/api/stores?limit=2&cursor=${first.nextCursor}`).expect(200);

    expect([...first.items, ...rest.items]).toMatchObject([
      { name: 'Reef Corner', orders: 0 },
      { name: 'Store 1', orders: 1, openOrders: 1 },
      { name: 'Store 2', orders: 0 },
    ]);
    expect(rest.nextCursor).toBeNull();
    expect((await sales.get('/api/stores?search=100%25').expect(200)).body.total).toBe(0);
  });

  it('when a store is opened, shows its buyers', async () => {
    const { body } = await sales.get(`/api/stores/${farm.storeIds[0]}`).expect(200);

    expect(body.buyers).toMatchObject([{ name: 'Buyer 1', email: 'buyer-0@example.com', disabled: false }]);
  });
});

describe('offers', () => {
  it('when the owner offers a line, stores can see it with what is free', async () => {
    const { lineId } = givenOffer(farm);

    const { body } = await postOnce(owner, '/api/listings', { lineId, grade: 'frag', priceMinor: 1200 }).expect(201);

    expect(body).toMatchObject({ grade: 'frag', priceMinor: 1200, active: true, free: 0 });
    const { body: list } = await sales.get('/api/listings').expect(200);
    expect(list.items.map(({ grade, free }: { grade: string; free: number }) => [grade, free]).sort()).toEqual([
      ['frag', 0],
      ['large', 10],
    ]);
  });

  it.each([
    ['a nub', { grade: 'nub' }, 'grade'],
    ['no price', { priceMinor: 0 }, 'priceMinor'],
    ['a price with a fraction', { priceMinor: 12.5 }, 'priceMinor'],
    ['a line that is not known', { lineId: '00000000-0000-4000-8000-00000000dead' }, 'lineId'],
  ])('when the owner offers %s, refuses at the field', async (_what, fields, path) => {
    const lineId = givenLine(farm);

    const { body } = await postOnce(owner, '/api/listings', {
      lineId,
      grade: 'frag',
      priceMinor: 1200,
      ...fields,
    }).expect(400);

    expect(body.fields).toMatchObject([{ path }]);
  });

  it('when the line is offered in the grade already, says to change that offer', async () => {
    const { lineId } = givenOffer(farm, { code: 'WIG' });

    const { body } = await postOnce(owner, '/api/listings', { lineId, grade: 'large', priceMinor: 1 }).expect(409);

    expect(body.fields).toEqual([
      { path: 'grade', message: 'WIG is offered in this grade already. Change that offer.' },
    ]);
    expect(farm.db.select().from(listings).all()).toHaveLength(1);
  });

  it('when the price changes, orders keep the price of their day', async () => {
    const offer = givenOffer(farm);
    const order = givenOrder(farm, [{ offer, quantity: 2 }]);
    await owner.patch(`/api/listings/${offer.listingId}`).set('If-Match', '"1"').send({ priceMinor: 9900 }).expect(200);

    const { body } = await sales.get(`/api/orders/${order.id}`).expect(200);

    expect(body).toMatchObject({ totalMinor: 3600, lines: [{ priceMinor: 1800 }] });
  });

  it('when sales try to set a price, it is not theirs to set', async () => {
    const offer = givenOffer(farm);

    await sales.patch(`/api/listings/${offer.listingId}`).set('If-Match', '"1"').send({ priceMinor: 1 }).expect(403);
  });
});

describe('the list of orders', () => {
  it('when many orders are listed, pages, filters by state and store, and finds numbers and names', async () => {
    const offer = givenOffer(farm, { pieces: 20 });
    const made = Array.from({ length: 5 }, (_, index) =>
      givenOrder(farm, [{ offer, quantity: 1 }], farm.storeIds[index === 0 ? 1 : 0]),
    );
    await sales.post(`/api/orders/${made[4]?.id}/cancel`).send({ reason: 'Twice' }).expect(200);
    const numbers = async (query: string) =>
      (await sales.get(`/api/orders?${query}`).expect(200)).body.items.map(({ number }: { number: number }) => number);

    const { body: first } = await sales.get('/api/orders?limit=3').expect(200);
    const rest = await numbers(`limit=3&cursor=${first.nextCursor}`);

    expect([...first.items.map(({ number }: { number: number }) => number), ...rest]).toEqual([
      1005, 1004, 1003, 1002, 1001,
    ]);
    expect(first).toMatchObject({ total: 5, states: { placed: 4, cancelled: 1 } });
    expect(await numbers('state=cancelled')).toEqual([1005]);
    expect(await numbers(`storeId=${farm.storeIds[1]}`)).toEqual([1001]);
    expect(await numbers('search=1003')).toEqual([1003]);
    expect(await numbers('search=store%202')).toEqual([1001]);
    await sales.get('/api/orders?state=lost').expect(400);
    await sales.get('/api/orders?cursor=made-up').expect(400);
  });
});
