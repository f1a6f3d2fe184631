import { readFileSync } from 'node:fs';
import { expect, it } from 'vitest';
import { consumptions, lots, supplyCounts } from '../../../server/db/schema/index.ts';
import { givenGlue, givenItem, givenLot, givenUse } from '../../support/given-supplies.ts';
import { startFarm } from '../../support/start-farm.ts';

const NOBODY = '00000000-0000-4000-8000-00000000dead';

it('when a delivery comes, it becomes a lot with all of its cost still in it', async () => {
  const farm = await startFarm({ now: '2026-03-02T09:00:00Z' });
  const itemId = givenItem(farm);
  const grower = await farm.as('grower');

  const reply = await grower
    .post('/api/supplies/receipts')
    .send({ itemId, code: 'B-77', quantity: 20_000, costMinor: 3_150, expiresOn: '2028-01-31' });

  expect(reply.status).toBe(201);
  expect(reply.body).toMatchObject({ code: 'B-77', receivedOn: '2026-03-02', remaining: 20_000 });
  expect(farm.db.select().from(lots).all()).toMatchObject([
    { itemId, quantity: 20_000, remaining: 20_000, costMinor: 3_150, remainingMicro: 31_500_000 },
  ]);
});

it('when the same delivery is sent twice with one key, one lot is made', async () => {
  const farm = await startFarm();
  const itemId = givenItem(farm);
  const grower = await farm.as('grower');
  const send = () =>
    grower
      .post('/api/supplies/receipts')
      .set('Idempotency-Key', 'one-delivery-one-key')
      .send({ itemId, code: 'B-77', quantity: 5, costMinor: 1 });

  const replies = [await send(), await send()];

  expect(replies.map(({ body }) => body.id)).toEqual([replies[0]?.body.id, replies[0]?.body.id]);
  expect(farm.db.select().from(lots).all()).toHaveLength(1);
});

it.each([
  ['no amount', { quantity: 0 }, 400],
  ['a negative amount', { quantity: -5 }, 400],
  ['an amount beyond all sense', { quantity: 1e12 }, 400],
  ['a negative cost', { costMinor: -1 }, 400],
  ['a cost in fractions of a minor unit', { costMinor: 10.5 }, 400],
  ['an empty lot code', { code: ' ' }, 400],
  ['a day that is none', { receivedOn: '2026-02-30' }, 400],
  ['a day still to come', { receivedOn: '2026-03-03' }, 400],
  ['an expiry before the day it came', { receivedOn: '2026-03-01', expiresOn: '2026-02-28' }, 400],
  ['an unknown item', { itemId: NOBODY }, 404],
])('when a delivery has %s, it is refused and no lot is made', async (_, change, status) => {
  const farm = await startFarm({ now: '2026-03-02T09:00:00Z' });
  const itemId = givenItem(farm);
  const grower = await farm.as('grower');

  const reply = await grower
    .post('/api/supplies/receipts')
    .send({ itemId, code: 'B-77', quantity: 5, costMinor: 100, ...change });

  expect(reply.status).toBe(status);
  expect(farm.db.select().from(lots).all()).toEqual([]);
});

it('when nothing of a receipt was used, it can be taken back; after a use it can not', async () => {
  const farm = await startFarm();
  const itemId = givenItem(farm);
  const used = givenLot(farm, itemId, { code: 'USED', receivedOn: '2026-02-01' });
  const untouched = givenLot(farm, itemId, { code: 'NEW' });
  givenUse(farm, itemId, 1);
  const grower = await farm.as('grower');

  const refused = await grower.delete(`/api/supplies/receipts/${used}`);
  const undone = await grower.delete(`/api/supplies/receipts/${untouched}`);

  expect(refused.status).toBe(409);
  expect(undone.status).toBe(200);
  expect(farm.db.select().from(lots).all()).toMatchObject([{ code: 'USED', remaining: 999 }]);
});

it('when less is counted than the books say, the oldest lot loses it at its cost', async () => {
  const farm = await startFarm();
  const itemId = givenItem(farm);
  givenLot(farm, itemId, { code: 'OLD', receivedOn: '2026-01-05', quantity: 100, costMinor: 300 });
  givenLot(farm, itemId, { code: 'NEW', receivedOn: '2026-02-05', quantity: 100, costMinor: 500 });
  const grower = await farm.as('grower');

  const reply = await grower.post('/api/supplies/counts').send({ itemId, counted: 80, reason: 'A tub spilled' });

  expect(reply.status).toBe(201);
  expect(reply.body).toMatchObject({ counted: 80, expected: 200, reason: 'A tub spilled', by: 'Test grower' });
  expect(
    farm.db
      .select()
      .from(consumptions)
      .all()
      .map(({ quantity, costMicro, cause, causeId }) => ({ quantity, costMicro, cause, causeId })),
  ).toEqual([
    { quantity: 100, costMicro: 3_000_000, cause: 'count', causeId: reply.body.id },
    { quantity: 20, costMicro: 1_000_000, cause: 'count', causeId: reply.body.id },
  ]);
});

it('when more is counted than the books say, the surplus becomes a lot that cost nothing', async () => {
  const farm = await startFarm();
  const itemId = givenItem(farm);
  givenLot(farm, itemId, { quantity: 100, costMinor: 300 });
  const grower = await farm.as('grower');

  await grower.post('/api/supplies/counts').send({ itemId, counted: 130.5, reason: 'Found behind the pumps' });
  const item = await grower.get(`/api/supplies/items/${itemId}`);

  expect(item.body).toMatchObject({ onHand: 130.5, onHandMicro: 3_000_000 });
  expect(farm.db.select().from(lots).all()).toContainEqual(
    expect.objectContaining({ code: 'count', quantity: 30.5, costMinor: 0, remainingMicro: 0 }),
  );
});

it('when a count agrees, it is kept as a record and no stock moves', async () => {
  const farm = await startFarm();
  const itemId = givenItem(farm);
  givenLot(farm, itemId, { quantity: 0.3 });
  givenUse(farm, itemId, 0.1);
  const grower = await farm.as('grower');

  const reply = await grower.post('/api/supplies/counts').send({ itemId, counted: 0.2, reason: 'Month end' });

  expect(reply.status).toBe(201);
  expect(farm.db.select().from(supplyCounts).all()).toHaveLength(1);
  expect(farm.db.select().from(consumptions).all()).toHaveLength(1);
  expect(farm.db.select().from(lots).all()).toHaveLength(1);
});

it.each([
  ['without a reason', { reason: '' }],
  ['below zero', { counted: -1 }],
  ['that is not a number', { counted: 'many' }],
])('when a count comes %s, it is refused and kept nowhere', async (_, change) => {
  const farm = await startFarm();
  const itemId = givenItem(farm);
  const grower = await farm.as('grower');

  const reply = await grower.post('/api/supplies/counts').send({ itemId, counted: 5, reason: 'Month end', ...change });

  expect(reply.status).toBe(400);
  expect(farm.db.select().from(supplyCounts).all()).toEqual([]);
});

it('when lists are longer than a page, the cursor leads through all rows once, newest first', async () => {
  const farm = await startFarm();
  const itemId = givenItem(farm);
  for (let day = 1; day <= 5; day += 1) givenLot(farm, itemId, { code: `L${day}`, receivedOn: `2026-02-0${day}` });
  for (let take = 0; take < 5; take += 1) {
    farm.wait(1000);
    givenUse(farm, itemId, take + 1);
  }
  const viewer = await farm.as('viewer');

  const lotCodes = await walk('/api/supplies/lots', (lot) => lot.code);
  const amounts = await walk('/api/supplies/uses', (use) => use.quantity);

  expect(lotCodes).toEqual(['L5', 'L4', 'L3', 'L2', 'L1']);
  expect(amounts).toEqual([5, 4, 3, 2, 1]);

  async function walk(path: string, pick: (row: Record<string, unknown>) => unknown): Promise<unknown[]> {
    const seen: unknown[] = [];
    for (let cursor: string | null | undefined = undefined; cursor !== null;) {
      const { body } = await viewer.get(path).query({ limit: 2, itemId, ...(cursor ? { cursor } : {}) });
      expect(body.total).toBe(5);
      seen.push(...body.items.map(pick));
      cursor = body.nextCursor;
    }
    return seen;
  }
});

it('when a cursor is made up, the list says so instead of failing', async () => {
  const farm = await startFarm();
  const viewer = await farm.as('viewer');

  const reply = await viewer.get('/api/supplies/uses').query({ cursor: 'bm9uc2Vuc2U' });

  expect(reply.status).toBe(400);
});

it('when a name would run as a formula in a spreadsheet, the export defuses it', async () => {
  const farm = await startFarm();
  const itemId = givenGlue(farm, { name: '=HYPERLINK("x")' });
  givenLot(farm, itemId, { code: '+1', costMinor: 1234 });
  givenUse(farm, itemId, 250);
  const viewer = await farm.as('viewer');

  const [items, lotRows, uses] = await Promise.all(
    ['items', 'lots', 'uses'].map((table) => viewer.get(`/api/supplies/export?table=${table}`)),
  );

  expect(items?.headers['content-type']).toContain('text/csv');
  expect(items?.text).toContain(`"'=HYPERLINK(""x"")"`);
  expect(lotRows?.text).toContain('cost_EUR');
  expect(lotRows?.text).toContain("'+1");
  expect(lotRows?.text).toContain('12.34');
  expect(uses?.text).toContain(',250,3.085,dose,');
});

/** Perpetual FIFO, see `source` in the file: received and used through the farm's own services. */
const reference = JSON.parse(readFileSync(new URL('../../reference/fifo.json', import.meta.url), 'utf8')) as {
  cases: {
    id: string;
    moves: { kind: 'in' | 'out'; quantity: number; unitCost?: number }[];
    outs: { quantity: number; cost: number }[];
    endingQuantity: number;
    endingValue: number;
  }[];
};

it.each(reference.cases)('FIFO through receipts and uses gives the worked costs of $id', async (worked) => {
  const farm = await startFarm();
  const itemId = givenGlue(farm);
  const costs: number[] = [];

  for (const move of worked.moves) {
    farm.wait(1000);
    if (move.kind === 'out') costs.push(givenUse(farm, itemId, move.quantity));
    else
      givenLot(farm, itemId, {
        quantity: move.quantity,
        costMinor: Math.round(move.quantity * (move.unitCost ?? 0) * 100),
      });
  }
  const viewer = await farm.as('viewer');
  const item = await viewer.get(`/api/supplies/items/${itemId}`);

  expect(costs).toEqual(worked.outs.map(({ cost }) => Math.round(cost * 1_000_000)));
  expect(item.body).toMatchObject({
    onHand: worked.endingQuantity,
    onHandMicro: Math.round(worked.endingValue * 1_000_000),
  });
});
