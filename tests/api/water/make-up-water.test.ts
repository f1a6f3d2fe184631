import { expect, it } from 'vitest';
import { cartridges, lots } from '../../../server/db/schema/index.ts';
import { givenItem, givenLot } from '../../support/given-supplies.ts';
import { startFarm } from '../../support/start-farm.ts';

const DAY = 86_400_000;
const BASE = '/api/make-up-water';

it('when TDS is logged, the rejection is told, and litres count on the cartridges from their first day', async () => {
  const farm = await startFarm({ now: '2026-03-02T09:00:00Z' });
  const grower = await farm.as('grower');
  const carbon = { stage: 'carbon', name: 'Carbon block', installedOn: '2026-03-01', lifeL: 1000, lifeDays: 180 };
  await grower.post(`${BASE}/cartridges`).send(carbon);

  for (const litresMade of [300, 400, 250]) {
    farm.wait(DAY);
    await (
      await farm.as('grower')
    )
      .post(`${BASE}/readings`)
      .send({ tdsIn: 300, tdsMembrane: 6, tdsOut: 0, litresMade });
  }
  const { body } = await (await farm.as('grower')).get(BASE);

  expect(body.readings[0]).toMatchObject({ tdsIn: 300, tdsOut: 0, rejection: 98, litresMade: 250 });
  expect(body.cartridges).toMatchObject([
    { stage: 'carbon', litresUsed: 950, daysUsed: 4, state: 'soon', dueBy: 'litres' },
  ]);
  // What the first look found was made before it: 650 L in two days.
  expect(body.litresPerDay).toBeCloseTo(325, 9);
});

it('when TDS leaves the resin, it is due; a new one takes its place and a piece off the shelf', async () => {
  const farm = await startFarm({ now: '2026-03-02T09:00:00Z' });
  const grower = await farm.as('grower');
  const itemId = givenItem(farm, { name: 'Resin', kind: 'other', unit: 'piece', strength: null });
  givenLot(farm, itemId, { quantity: 3 });
  const resin = { stage: 'resin', name: 'Mixed bed', installedOn: '2026-01-10', limit: 1 };
  const { body: old } = await grower.post(`${BASE}/cartridges`).send(resin);
  await grower.post(`${BASE}/readings`).send({ tdsOut: 3 });

  const due = await grower.get(BASE);
  const fresh = await grower
    .post(`${BASE}/cartridges`)
    .send({ stage: 'resin', name: 'Mixed bed', limit: 1, replacesId: old.id, itemId });
  const after = await grower.get(BASE);

  expect(due.body.cartridges).toMatchObject([{ state: 'due', dueBy: 'limit' }]);
  expect(after.body.cartridges).toMatchObject([{ id: fresh.body.id, daysUsed: 0, state: 'ok' }]);
  expect(after.body.replaced).toMatchObject([{ id: old.id, removedOn: '2026-03-02', daysUsed: 51 }]);
  expect(farm.db.select().from(lots).all()[0]?.remaining).toBe(2);

  const refused = await grower.delete(`${BASE}/cartridges/${old.id}`);
  const undone = await grower.delete(`${BASE}/cartridges/${fresh.body.id}`);
  expect([refused.status, undone.status]).toEqual([409, 200]);
  expect(farm.db.select().from(cartridges).all()).toMatchObject([{ id: old.id, removedOn: null }]);
  expect(farm.db.select().from(lots).all()[0]?.remaining).toBe(3);
});

it.each([
  ['nothing at all', {}, 'tdsOut'],
  ['more after the membrane than before', { tdsIn: 10, tdsMembrane: 300 }, 'tdsMembrane'],
  ['less than nothing', { tdsOut: -1 }, 'tdsOut'],
])('when %s was read, the field asks again', async (_name, reading, path) => {
  const farm = await startFarm();
  const grower = await farm.as('grower');

  const { status, body } = await grower.post(`${BASE}/readings`).send(reading);

  expect(status).toBe(400);
  expect(body.fields).toMatchObject([{ path }]);
});

it.each([
  ['a day to come', { installedOn: '2026-04-01' }, 'installedOn'],
  ['a place that another stage has', { stage: 'carbon' }, 'replacesId'],
  ['a day before the old one came', { installedOn: '2026-02-01' }, 'installedOn'],
])('when a cartridge is put in at %s, the field says why not', async (_name, changes, path) => {
  const farm = await startFarm({ now: '2026-03-02T09:00:00Z' });
  const grower = await farm.as('grower');
  const sediment = { stage: 'sediment', name: 'Sediment', installedOn: '2026-02-20' };
  const { body: old } = await grower.post(`${BASE}/cartridges`).send(sediment);

  const next = { stage: 'sediment', name: 'Sediment', replacesId: old.id, ...changes };
  const { status, body } = await grower.post(`${BASE}/cartridges`).send(next);

  expect(status).toBe(400);
  expect(body.fields).toMatchObject([{ path }]);
});

it('when a reading is taken back, it counts no more', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const { body: reading } = await grower.post(`${BASE}/readings`).send({ tdsOut: 3 });

  const undone = await grower.delete(`${BASE}/readings/${reading.id}`);

  expect(undone.status).toBe(200);
  expect((await grower.get(BASE)).body.readings).toEqual([]);
});
