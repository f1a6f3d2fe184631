import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { holds, orders, picks, plugs, stockAccounts, sizeReadings } from '../../../server/db/schema/index.ts';
import { formatPlugCode } from '../../../shared/domain/plug-code.ts';
import {
  fakePayments,
  givenLaterBatch,
  givenOffer,
  givenOrder,
  givenPaidOrder,
  givenPicked,
  type Offered,
} from '../../support/given-orders.ts';
import { givenCut, givenLoss, givenPlaced, givenRackIn, givenWithheld, postOnce } from '../../support/given-stock.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

describe('picking an order by scanning plugs', () => {
  let farm: TestFarm;
  let sales: TestClient;
  let offer: Offered;
  let orderId: string;

  beforeEach(async () => {
    farm = await startFarm({ payments: fakePayments() });
    sales = await farm.as('sales');
    offer = givenOffer(farm, { code: 'WIG', tradeName: 'Wicket Green' });
    orderId = (await givenPaidOrder(farm, [{ offer, quantity: 3 }])).id;
  });

  const code = (index: number, from: Offered = offer) => from.codes[index] ?? '';
  const pick = (text: string, id = orderId) => postOnce(sales, `/api/orders/${id}/picks`, { code: text });
  const reason = async (text: string, id = orderId) => {
    const { body } = await pick(text, id).expect(409);
    expect(body.code).toBe('pick.wrong_plug');
    return String(body.detail);
  };
  const held = (batchId = offer.batchId) =>
    farm.db
      .select()
      .from(holds)
      .where(eq(holds.batchId, batchId))
      .all()
      .map(({ pieces }) => pieces);
  const kindOf = (plug: string) =>
    farm.db
      .select({ kind: stockAccounts.kind })
      .from(plugs)
      .innerJoin(stockAccounts, eq(stockAccounts.id, plugs.accountId))
      .where(eq(plugs.code, plug))
      .get()?.kind;

  it('when it is to be picked, names racks in walking order with pieces and positions', async () => {
    const { body: plan } = await sales.get(`/api/orders/${orderId}/picking`).expect(200);

    expect(plan).toMatchObject({ number: 1001, storeName: 'Store 1', wanted: 3, picked: 0, picks: [] });
    expect(plan.stops).toHaveLength(1);
    expect(plan.stops[0].items).toEqual([
      {
        ...{ lineCode: 'WIG', tradeName: 'Wicket Green', grade: 'large', batchCode: offer.batchCode, pieces: 3 },
        positions: ['A-1', 'A-2', 'A-3'],
      },
    ]);
  });

  it('when a right plug is scanned, takes it off its rack, counts it and starts picking', async () => {
    const { body: done } = await pick(`http://farm.example.com/P/${code(0)}`).expect(201);

    expect(done).toMatchObject({
      picked: 1,
      wanted: 3,
      pick: { code: code(0), by: 'Test sales' },
      line: { picked: 1 },
    });
    expect(kindOf(code(0))).toBe('order');
    expect(held()).toEqual([2]);
    expect(farm.db.select().from(orders).get()?.state).toBe('picking');
  });

  it('when the same scan is sent twice, picks once', async () => {
    const body = { code: code(0) };
    await postOnce(sales, `/api/orders/${orderId}/picks`, body, 'scan-1').expect(201);
    await postOnce(sales, `/api/orders/${orderId}/picks`, body, 'scan-1').expect(201);

    expect(farm.db.select().from(picks).all()).toHaveLength(1);
    expect(held()).toEqual([2]);
  });

  it('when it is a plug of another line, says which it is and which is wanted', async () => {
    const ember = givenOffer(farm, { code: 'EMB', tradeName: 'Ember Plate' });

    expect(await reason(code(0, ember))).toBe('This is EMB Ember Plate; the order wants WIG.');
    expect(farm.db.select().from(picks).all()).toEqual([]);
  });

  it('when it is of another grade, says which grade it is', async () => {
    const young = givenCut(farm, { colonyId: offer.colonyId, cutOn: '2026-02-10' });

    expect(await reason(young.plugs[0]?.code ?? '')).toBe('This is a frag; the order wants large frag.');
  });

  it('when it has not healed, says so', async () => {
    const fresh = givenCut(farm, { colonyId: offer.colonyId, cutOn: '2026-02-27' });

    expect(await reason(fresh.plugs[0]?.code ?? '')).toContain('not healed yet');
  });

  it('when the promised batch has grown into the next grade since, it still fits', async () => {
    farm.db
      .insert(sizeReadings)
      .values({ id: farm.deps.newId(), batchId: offer.batchId, sizeMm: 80, at: farm.deps.clock.now(), by: 'x' })
      .run();

    await pick(code(0)).expect(201);
  });

  it('when it is withheld, says why', async () => {
    givenWithheld(farm, { plugCode: code(0) });

    expect(await reason(code(0))).toBe(
      `${formatPlugCode(code(0))} is withheld: Flatworm seen. Put it back and take another.`,
    );
  });

  it('when it stands in quarantine, refuses it', async () => {
    givenPlaced(farm, [code(0)], givenRackIn(farm, 'quarantine'));

    expect(await reason(code(0))).toContain('stands in quarantine');
  });

  it('when it is picked already, says for which order', async () => {
    const other = await givenPaidOrder(farm, [{ offer, quantity: 2 }], farm.storeIds[1]);
    await pick(code(0)).expect(201);

    expect(await reason(code(0))).toBe(`${formatPlugCode(code(0))} is in this order already.`);
    expect(await reason(code(0), other.id)).toBe(`${formatPlugCode(code(0))} is picked for order 1001.`);
  });

  it('when it is lost or on the bench, says that it is not on a rack', async () => {
    givenLoss(farm, [code(0)]);
    const bench = givenCut(farm, {
      colonyId: offer.colonyId,
      cutOn: '2025-11-05',
      restOverride: 'x',
      target: { kind: 'bench' },
    });

    expect(await reason(code(0))).toContain('has left the stock (lost)');
    expect(await reason(bench.plugs[0]?.code ?? '')).toContain('is not on a rack');
  });

  it('when the line is complete, says so', async () => {
    givenPicked(farm, orderId, offer.codes.slice(0, 3));

    expect(await reason(code(3))).toBe('All 3 of WIG are picked. Put this one back.');
  });

  it('when all other pieces of its batch are held for others, says where to take one instead', async () => {
    const later = givenLaterBatch(farm, offer, { pieces: 4 });
    // The first batch gives 7, the second its last 4.
    await givenPaidOrder(farm, [{ offer, quantity: 11 }], farm.storeIds[1]);

    expect(await reason(later.plugs[0]?.code ?? '')).toBe(
      `All pieces of ${later.batchCode} are held for other orders. Take one of ${offer.batchCode}.`,
    );
  });

  it('when it comes from another batch with a free piece, the promise moves along', async () => {
    const later = givenLaterBatch(farm, offer);

    await pick(later.plugs[0]?.code ?? '').expect(201);

    expect(held()).toEqual([2]);
    expect(held(later.batchId)).toEqual([]);
  });

  it.each([
    ['7Q2-KX9', 'is not a plug code'],
    ['', 'Some of what was entered'],
  ])('when "%s" is typed, says that it is no plug', async (text, words) => {
    const { body, status } = await pick(text);

    expect([400, 404]).toContain(status);
    expect(body.detail).toContain(words);
  });

  it('when a pick is undone, the plug stands where it stood and is promised again', async () => {
    const { body: done } = await pick(code(4)).expect(201);

    const { body: plan } = await sales.post(`/api/orders/${orderId}/picks/${done.pick.id}/undo`).expect(200);

    expect(plan).toMatchObject({ picked: 0, picks: [] });
    expect(
      farm.db
        .select()
        .from(plugs)
        .where(eq(plugs.code, code(4)))
        .get()?.position,
    ).toBe('A-5');
    expect(held()).toEqual([3]);
    const { body: again } = await sales.post(`/api/orders/${orderId}/picks/${done.pick.id}/undo`).expect(409);
    expect(again.code).toBe('stock.already_reversed');
  });

  it('when a pick is undone after losses left less than is promised, the plug goes back all the same', async () => {
    const { body: done } = await pick(code(0)).expect(201);
    givenOrder(farm, [{ offer, quantity: 7 }], farm.storeIds[1]);
    givenLoss(farm, offer.codes.slice(5, 8));

    await sales.post(`/api/orders/${orderId}/picks/${done.pick.id}/undo`).expect(200);

    expect(kindOf(code(0))).toBe('rack');
  });

  it('when an order is not paid, nothing is picked for it', async () => {
    const unpaid = givenOrder(farm, [{ offer, quantity: 1 }]);

    const { body } = await pick(code(0), unpaid.id).expect(409);

    expect(body).toMatchObject({ code: 'order.wrong_state', detail: 'Order 1002 is not paid yet.' });
  });

  it('when plugs are picked, stock can not undo that behind the back of the order', async () => {
    await pick(code(0)).expect(201);
    const grower = await farm.as('grower');

    const { status } = await postOnce(grower, '/api/stock/losses', { codes: [code(0)], seen: 'stn' });

    expect(status).toBe(409);
    expect(kindOf(code(0))).toBe('order');
  });
});
