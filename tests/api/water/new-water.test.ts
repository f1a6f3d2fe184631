import { expect, it } from 'vitest';
import { consumptions, lots, waterChanges } from '../../../server/db/schema/index.ts';
import { givenItem, givenLot } from '../../support/given-supplies.ts';
import { givenReading, givenSystem } from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const DAY = 86_400_000;

function givenSalt(farm: TestFarm): string {
  const salt = givenItem(farm, { name: 'Salt mix', kind: 'salt', unit: 'g', strength: null });
  givenLot(farm, salt, { quantity: 25_000, costMinor: 5900 });
  return salt;
}

const batch = { litres: 200, saltG: 7600, salinity: 35, alkalinityMeqL: 3, calciumMgL: 430, magnesiumMgL: 1350 };

it('when new water is mixed, it waits out its hours and then is ready, its salt off the shelf', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  givenSalt(farm);

  const mixed = await grower.post('/api/salt-batches').send(batch);
  farm.wait(DAY / 2);
  const { body } = await (await farm.as('grower')).get('/api/salt-batches');

  expect(mixed.body).toMatchObject({ state: 'mixing', remainingL: 200, saltName: 'Salt mix', temperatureC: null });
  expect(body.items).toMatchObject([{ state: 'ready', remainingL: 200 }]);
  expect(farm.db.select().from(lots).all()[0]?.remaining).toBe(17_400);
});

it('when a change takes of it, the chemistry is that of the batch and its part of the salt is the system’s cost', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  givenSalt(farm);
  const systemId = givenSystem(farm);
  const { body: mixed } = await grower.post('/api/salt-batches').send(batch);
  const before = farm.db.select().from(consumptions).all();

  const changed = await grower.post('/api/water-changes').send({ systemId, litres: 50, saltBatchId: mixed.id });
  const left = await grower.get('/api/salt-batches');

  expect(changed.body).toMatchObject({ alkalinityMeqL: 3, calciumMgL: 430, magnesiumMgL: 1350, salinity: 35 });
  expect(left.body.items).toMatchObject([{ remainingL: 150 }]);
  const after = farm.db.select().from(consumptions).all();
  expect(after).toMatchObject([
    { cause: 'salt_batch', systemId: null, quantity: 5700 },
    { cause: 'water_change', systemId, quantity: 1900 },
  ]);
  const cost = (rows: typeof after) => rows.reduce((sum, { costMicro }) => sum + costMicro, 0);
  expect(cost(after)).toBe(cost(before));

  await grower.delete(`/api/water-changes/${changed.body.id}`);
  expect(farm.db.select().from(consumptions).all()).toMatchObject(
    before.map(({ quantity, costMicro }) => ({ quantity, costMicro })),
  );
  expect((await grower.get('/api/salt-batches')).body.items).toMatchObject([{ remainingL: 200 }]);
});

it('when what is typed differs from the batch, what is typed counts', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  givenSalt(farm);
  const { body: mixed } = await grower.post('/api/salt-batches').send(batch);
  const change = { systemId: givenSystem(farm), litres: 50, saltBatchId: mixed.id, alkalinityMeqL: 2.8 };

  const { body } = await grower.post('/api/water-changes').send(change);

  expect(body).toMatchObject({ alkalinityMeqL: 2.8, calciumMgL: 430 });
});

it.each([
  ['more than is left', { litres: 201 }, 'litres'],
  ['salt of its own beside it', { litres: 50, saltG: 100 }, 'saltG'],
  ['a time before it was mixed', { litres: 50, at: Date.parse('2026-02-01T00:00:00Z') }, 'at'],
])('when a change takes %s, the field says why not', async (_name, changes, path) => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  givenSalt(farm);
  const { body: mixed } = await grower.post('/api/salt-batches').send(batch);
  const change = { systemId: givenSystem(farm), saltBatchId: mixed.id, ...changes };

  const { status, body } = await grower.post('/api/water-changes').send(change);

  expect(status).toBe(400);
  expect(body.fields).toMatchObject([{ path }]);
  expect(farm.db.select().from(waterChanges).all()).toEqual([]);
});

it('when the batch was not tested, the change asks for the alkalinity', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const { body: mixed } = await grower.post('/api/salt-batches').send({ litres: 100, saltG: 0 });
  const change = { systemId: givenSystem(farm), litres: 50, saltBatchId: mixed.id };

  const asked = await grower.post('/api/water-changes').send(change);
  const tested = await grower
    .patch(`/api/salt-batches/${mixed.id}`)
    .set('If-Match', '"1"')
    .send({ alkalinityMeqL: 2.9 });
  const { status } = await grower.post('/api/water-changes').send(change);

  expect(asked.body.fields).toMatchObject([{ path: 'alkalinityMeqL' }]);
  expect(tested.body).toMatchObject({ alkalinityMeqL: 2.9, version: 2 });
  expect(status).toBe(201);
});

it('when the rest is poured away, none is left; a batch that was used can not be taken back', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  givenSalt(farm);
  const { body: first } = await grower.post('/api/salt-batches').send(batch);
  const { body: second } = await grower.post('/api/salt-batches').send(batch);
  await grower.post('/api/water-changes').send({ systemId: givenSystem(farm), litres: 50, saltBatchId: first.id });

  const away = await grower.patch(`/api/salt-batches/${first.id}`).set('If-Match', '"1"').send({ discarded: true });
  const used = await grower.delete(`/api/salt-batches/${first.id}`);
  const unused = await grower.delete(`/api/salt-batches/${second.id}`);

  expect(away.body).toMatchObject({ state: 'discarded', remainingL: 0 });
  expect([used.status, unused.status]).toEqual([409, 200]);
  expect(farm.db.select().from(lots).all()[0]?.remaining).toBe(17_400);
});

it('when a habit is set, the next changes are told with the water and the salt that they want', async () => {
  const farm = await startFarm({ now: '2026-03-02T09:00:00Z' });
  const grower = await farm.as('grower');
  givenSalt(farm);
  const systemId = givenSystem(farm, { netVolumeL: 1000 });
  givenReading(farm, systemId, 12, { parameter: 'nitrate', unit: 'mg/L' });
  const change = { systemId, litres: 60, alkalinityMeqL: 3, at: Date.parse('2026-02-10T09:00:00Z') };
  await grower.post('/api/water-changes').send(change);
  await grower.post('/api/salt-batches').send({ litres: 100, saltG: 3800 });

  const set = await grower
    .put(`/api/systems/${systemId}/water-change-plan`)
    .send({ everyDays: 14, fraction: 0.06, startOn: '2026-02-01' });
  const { body } = await grower.get('/api/water-change-plans');

  expect(set.body).toMatchObject({ nextOn: '2026-02-24', daysLate: 6, plan: { litres: 60 }, levels: { nitrate: 12 } });
  expect(body).toMatchObject({ readyL: 100, saltOnHandG: 21_200, horizonDays: 28 });
  expect(body.coming).toMatchObject([
    { on: '2026-03-02', litres: 60, leftL: 40, saltG: 0 },
    // 40 L of it stand ready, so 20 L are to be mixed at 38 g a litre.
    { on: '2026-03-16', litres: 60, leftL: 0, saltG: 760, saltLeftG: 20_440 },
    { on: '2026-03-30', litres: 60, leftL: 0, saltG: 2280 },
  ]);

  expect((await grower.delete(`/api/systems/${systemId}/water-change-plan`)).status).toBe(200);
  expect((await grower.delete(`/api/systems/${systemId}/water-change-plan`)).status).toBe(404);
  expect((await grower.get('/api/water-change-plans')).body.coming).toEqual([]);
});
