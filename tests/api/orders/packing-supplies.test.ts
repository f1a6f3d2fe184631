import { beforeEach, describe, expect, it } from 'vitest';
import { consumptions } from '../../../server/db/schema/index.ts';
import { fakePayments, givenOffer, givenPaidOrder, givenPicked } from '../../support/given-orders.ts';
import { givenGlue, givenItem, givenLot } from '../../support/given-supplies.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

describe('supplies that an order takes at packing', () => {
  let farm: TestFarm;
  let sales: TestClient;
  let boxes: string;

  beforeEach(async () => {
    farm = await startFarm({ payments: fakePayments() });
    sales = await farm.as('sales');
    boxes = givenItem(farm, { code: 'BOX', name: 'Boxes', kind: 'packing', unit: 'piece', strength: null });
    givenLot(farm, boxes, { quantity: 10, costMinor: 2000 });
  });

  async function givenPickedOrder(): Promise<string> {
    const offer = givenOffer(farm, { code: 'WIG', tradeName: 'Wicket Green' });
    const { id } = await givenPaidOrder(farm, [{ offer, quantity: 2 }]);
    givenPicked(farm, id, offer.codes.slice(0, 2));
    return id;
  }

  const pack = (id: string, supplies: object[]) => sales.post(`/api/orders/${id}/pack`).send({ boxes: 2, supplies });
  const taken = () =>
    farm.db
      .select()
      .from(consumptions)
      .all()
      .filter(({ cause }) => cause === 'packing');

  it('when given, leave the shelf with their cost, and are offered for each box of the next order', async () => {
    const id = await givenPickedOrder();

    await pack(id, [{ itemId: boxes, quantity: 4 }]).expect(200);

    expect(taken()).toMatchObject([{ itemId: boxes, quantity: 4, costMicro: 8_000_000, causeId: id }]);
    const offered = await sales.get('/api/packing-supplies').expect(200);
    expect(offered.body.items).toEqual([{ itemId: boxes, name: 'Boxes', unit: 'piece', onHand: 6, lastPerBox: 2 }]);
  });

  it('when none is given, nothing is taken and nothing is offered', async () => {
    await sales
      .post(`/api/orders/${await givenPickedOrder()}/pack`)
      .send({ boxes: 1 })
      .expect(200);

    expect(taken()).toEqual([]);
    expect((await sales.get('/api/packing-supplies')).body.items).toMatchObject([{ onHand: 10, lastPerBox: null }]);
  });

  it('when more is given than is on hand, says so and the order is not packed', async () => {
    const id = await givenPickedOrder();

    const { body } = await pack(id, [{ itemId: boxes, quantity: 11 }]).expect(409);

    expect(body.code).toBe('supply.not_enough');
    expect(taken()).toEqual([]);
    expect((await sales.get(`/api/orders/${id}`)).body.state).toBe('picking');
  });

  it('when it is no packing supply, refuses at the field', async () => {
    const glue = givenGlue(farm);

    const { body } = await pack(await givenPickedOrder(), [{ itemId: glue, quantity: 1 }]).expect(400);

    expect(body.fields).toMatchObject([{ path: 'supplies.0.itemId' }]);
  });
});
