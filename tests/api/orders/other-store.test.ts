import { beforeAll, describe, expect, it } from 'vitest';
import { createApp } from '../../../server/app.ts';
import { orders } from '../../../server/db/schema/index.ts';
import { type Endpoint, pathOf } from '../../../shared/contracts/endpoint.ts';
import { fakePayments, givenOffer, givenPacked, givenPaidOrder, givenPicked } from '../../support/given-orders.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

const nowhere = '00000000-0000-4000-8000-00000000dead';

describe('a buyer and the orders of another store', () => {
  let farm: TestFarm;
  let stranger: TestClient;
  let orderId: string;
  let endpoints: Endpoint[];

  beforeAll(async () => {
    farm = await startFarm({ payments: fakePayments() });
    endpoints = createApp(farm.deps, 'a secret only for listing the endpoints').api.endpoints;
    const offer = givenOffer(farm);
    orderId = (await givenPaidOrder(farm, [{ offer, quantity: 2 }], farm.storeIds[1])).id;
    givenPicked(farm, orderId, offer.codes.slice(0, 2));
    givenPacked(farm, orderId);
    const sales = await farm.as('sales');
    await sales.post(`/api/orders/${orderId}/ship`).send({ carrier: 'Night Post' }).expect(200);
    stranger = await farm.as('buyer', farm.storeIds[0]);
  });

  const ofOrders = () => endpoints.filter(({ path }) => /^\/api\/(shop\/)?orders\/:id/.test(path));

  it('every route with an order answers as if the order did not exist, or is not open to buyers at all', async () => {
    const answers: Record<string, number> = {};
    for (const endpoint of ofOrders()) {
      const path = pathOf(endpoint, { id: orderId, pickId: nowhere });
      const { status } = await stranger[endpoint.method](path).send();
      answers[`${endpoint.method} ${endpoint.path}`] = status;
    }

    expect(Object.keys(answers).length).toBeGreaterThanOrEqual(12);
    for (const [route, status] of Object.entries(answers)) {
      expect([route, status]).toEqual([route, route.includes('/api/shop/') ? 404 : 403]);
    }
  });

  it('the answer is the same as for an order that nobody has', async () => {
    const [other, none] = await Promise.all([
      stranger.get(`/api/shop/orders/${orderId}`),
      stranger.get(`/api/shop/orders/${nowhere}`),
    ]);

    expect({ ...other.body, requestId: '' }).toEqual({ ...none.body, requestId: '' });
  });

  it('lists hold its own orders only, whatever store is asked for', async () => {
    const { body } = await stranger.get('/api/shop/orders').expect(200);

    expect(body).toMatchObject({ items: [], total: 0 });
    await stranger.get(`/api/shop/orders?storeId=${farm.storeIds[1]}`).expect(400);
  });

  it('its own store sees the order, without racks, batches or holds', async () => {
    const owner = await farm.as('buyer', farm.storeIds[1]);

    const { body, text } = await owner.get(`/api/shop/orders/${orderId}`).expect(200);

    expect(body).toMatchObject({ number: 1001, state: 'shipped', plugs: [{}, {}] });
    expect(text).not.toMatch(/\brack|batch|hold(?!Until)|intent|session/i);
    expect(farm.db.select().from(orders).all()).toHaveLength(1);
  });
});
