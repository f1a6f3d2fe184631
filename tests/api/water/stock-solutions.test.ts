import { expect, it } from 'vitest';
import { consumptions, lots } from '../../../server/db/schema/index.ts';
import { givenPowder, givenSolution } from '../../support/given-dosing.ts';
import { givenItem, givenLot } from '../../support/given-supplies.ts';
import { givenSystem } from '../../support/given-water.ts';
import { startFarm } from '../../support/start-farm.ts';

const recipe = (itemId: string, changes: object = {}) => ({
  ...{ code: 'ALK-1', name: 'Alkalinity part', litres: 2 },
  parts: [{ itemId, powder: 'sodium_carbonate', purity: 1, grams: 211.976 }],
  ...changes,
});

it('when a recipe is written down, it is a supplement as strong as its chemistry says', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const powderId = givenPowder(farm);

  const { status, body } = await grower.post('/api/stock-solutions').send(recipe(powderId));

  expect(status).toBe(201);
  // 211.976 g of Na2CO3 are 2 mol, 4 eq, in 2 L.
  expect(body.alkalinityMeq).toBeCloseTo(2, 4);
  expect(body).toMatchObject({ calciumMg: 0, magnesiumMg: 0, onHandMl: 0, batches: [] });
  const items = await grower.get('/api/water-items');
  expect(items.body.items.find(({ code }: { code: string }) => code === 'ALK-1')).toMatchObject({
    ...{ kind: 'supplement', unit: 'mL' },
  });
});

it('when a batch is made, powder becomes solution at what the powder cost, and a dose of it costs its part', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const solution = givenSolution(farm, givenPowder(farm));
  const systemId = givenSystem(farm);

  const made = await grower.post(`/api/stock-solutions/${solution.id}/batches`).send({ litres: 10 });
  const dosed = await grower.post('/api/doses').send({ systemId, itemId: solution.itemId, amount: 100 });

  expect(made.body).toMatchObject({ onHandMl: 10_000, batches: [{ litres: 10, remainingMl: 10_000 }] });
  expect(dosed.body.alkalinityMeqL).toBeCloseTo(0.2, 4);
  const [powder, dose] = farm.db.select().from(consumptions).all();
  expect(powder).toMatchObject({ cause: 'solution', systemId: null });
  expect(powder?.quantity).toBeCloseTo(1059.88, 6);
  // 1,059.88 g of 5,000 g that cost 10.00.
  expect(powder?.costMicro).toBe(2_119_760);
  expect(dose).toMatchObject({ cause: 'dose', systemId, quantity: 100, costMicro: 21_198 });
});

it('when the powder does not suffice, nothing is made of it', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const solution = givenSolution(farm, givenPowder(farm, 100));

  const { status, body } = await grower.post(`/api/stock-solutions/${solution.id}/batches`).send({ litres: 1 });

  expect([status, body.code]).toEqual([409, 'supply.not_enough']);
  expect(farm.db.select().from(consumptions).all()).toEqual([]);
  expect(farm.db.select().from(lots).all()).toHaveLength(1);
});

it('when a batch is taken back, its powder is in store again; one that was used stays', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const powderId = givenPowder(farm);
  const solution = givenSolution(farm, powderId);
  const make = () => grower.post(`/api/stock-solutions/${solution.id}/batches`).send({ litres: 1 });
  const first = await make();

  const undone = await grower.delete(`/api/solution-batches/${first.body.batches[0].id}`);
  expect(undone.status).toBe(200);
  expect(farm.db.select().from(lots).all()).toMatchObject([{ itemId: powderId, remaining: 5000 }]);

  const second = await make();
  await grower.post('/api/doses').send({ systemId: givenSystem(farm), itemId: solution.itemId, amount: 1 });
  const refused = await grower.delete(`/api/solution-batches/${second.body.batches[0].id}`);
  expect([refused.status, refused.body.code]).toEqual([409, 'record.in_use']);
});

it.each([
  ['alkalinity beside calcium', 'calcium_chloride_dihydrate', 'parts.1.powder', 'chalk'],
  ['an unknown powder', 'table_salt', 'parts.1.powder', 'Choose'],
])('when a recipe has %s, the field says why not', async (_name, powder, path, words) => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const [first, second] = [givenPowder(farm), givenPowder(farm)];
  const parts = [
    { itemId: first, powder: 'sodium_carbonate', purity: 1, grams: 100 },
    { itemId: second, powder, purity: 1, grams: 100 },
  ];

  const { status, body } = await grower.post('/api/stock-solutions').send(recipe(first, { parts }));

  expect(status).toBe(400);
  expect(body.fields).toEqual([{ path, message: expect.stringContaining(words) }]);
});

it('when its supply is not kept in grams, the field says so', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const bottled = givenItem(farm, { kind: 'supplement', unit: 'mL', strength: 2 });
  givenLot(farm, bottled);

  const { status, body } = await grower.post('/api/stock-solutions').send(recipe(bottled));

  expect(status).toBe(400);
  expect(body.fields).toMatchObject([{ path: 'parts.0.itemId' }]);
});

it('when the strength of what a recipe makes is edited in the supplies, it is refused', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const { itemId } = givenSolution(farm, givenPowder(farm));

  const { status, body } = await grower
    .patch(`/api/supplies/items/${itemId}`)
    .set('If-Match', '"1"')
    .send({ strength: 9 });

  expect([status, body.code]).toEqual([409, 'record.in_use']);
});
