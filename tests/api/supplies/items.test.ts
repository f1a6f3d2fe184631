import { eq } from 'drizzle-orm';
import { expect, it } from 'vitest';
import { auditLog, items } from '../../../server/db/schema/index.ts';
import { givenItem, givenLot } from '../../support/given-supplies.ts';
import { startFarm } from '../../support/start-farm.ts';

const LIME = {
  code: 'lime-20',
  name: 'Lime, 20 kg sack',
  kind: 'lime',
  unit: 'g',
  packSize: 20_000,
  leadTimeDays: 5,
  safetyDays: 7,
  strength: 0.96,
};

it('when a grower adds a supply, it is stored, audited and answered with nothing on hand', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');

  const reply = await grower.post('/api/supplies/items').send(LIME);

  expect(reply.status).toBe(201);
  expect(reply.body).toMatchObject({ code: 'LIME-20', onHand: 0, state: 'out', version: 1, retired: false });
  expect(reply.body.use).toMatchObject({ perDay: null, basis: 'none' });
  expect(farm.db.select().from(items).all()).toMatchObject([{ code: 'LIME-20', strength: 0.96, supplierId: null }]);
  expect(farm.db.select().from(auditLog).where(eq(auditLog.entity, 'item')).all()).toMatchObject([
    { action: 'item.created', actorName: 'Test grower', entityId: reply.body.id },
  ]);
});

it('when the same submit comes twice, one supply is made and both get the same answer', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');

  const first = await grower.post('/api/supplies/items').set('Idempotency-Key', 'a-key-of-one-submit').send(LIME);
  const second = await grower.post('/api/supplies/items').set('Idempotency-Key', 'a-key-of-one-submit').send(LIME);

  expect(second.status).toBe(201);
  expect(second.body).toEqual(first.body);
  expect(farm.db.select().from(items).all()).toHaveLength(1);
});

it.each([
  ['a code with a space', { code: 'a b' }, 'code'],
  ['an empty name', { name: '   ' }, 'name'],
  ['a name of 121 letters', { name: 'x'.repeat(121) }, 'name'],
  ['a kind that does not exist', { kind: 'gold' }, 'kind'],
  ['lime kept in millilitres', { unit: 'mL' }, 'unit'],
  ['lime without a strength', { strength: null }, 'strength'],
  ['lime of more than pure strength', { strength: 1.01 }, 'strength'],
  ['glue with a strength', { kind: 'glue' }, 'strength'],
  ['a pack of nothing', { packSize: 0 }, 'packSize'],
  ['a pack size as text', { packSize: '20 kg' }, 'packSize'],
  ['a negative lead time', { leadTimeDays: -1 }, 'leadTimeDays'],
  ['half a safety day', { safetyDays: 0.5 }, 'safetyDays'],
  ['a supplier that does not exist', { supplierId: '00000000-0000-4000-8000-00000000dead' }, 'supplierId'],
  ['a field that is not known', { colour: 'white' }, 'colour'],
])('when %s is sent, the message stands at the field and nothing is stored', async (_, change, path) => {
  const farm = await startFarm();
  const grower = await farm.as('grower');

  const reply = await grower.post('/api/supplies/items').send({ ...LIME, ...change });

  expect(reply.status).toBe(400);
  expect(reply.body.fields.map((field: { path: string }) => field.path)).toContain(path);
  expect(farm.db.select().from(items).all()).toEqual([]);
});

it('when a code is taken, the message stands at the code', async () => {
  const farm = await startFarm();
  givenItem(farm, { code: 'LIME-20' });
  const grower = await farm.as('grower');

  const reply = await grower.post('/api/supplies/items').send(LIME);

  expect(reply.status).toBe(409);
  expect(reply.body.fields).toEqual([{ path: 'code', message: 'This is taken already.' }]);
});

it('when an edit saw an older version, it is refused with the record as it is now', async () => {
  const farm = await startFarm();
  const itemId = givenItem(farm, { name: 'Lime' });
  const grower = await farm.as('grower');
  const edit = (name: string) => grower.patch(`/api/supplies/items/${itemId}`).set('If-Match', '"1"').send({ name });

  const first = await edit('Fine lime');
  const second = await edit('Coarse lime');

  expect(first.body).toMatchObject({ name: 'Fine lime', version: 2 });
  expect(second.status).toBe(412);
  expect(second.body.details.current).toMatchObject({ name: 'Fine lime', version: 2 });
  expect(farm.db.select().from(items).get()).toMatchObject({ name: 'Fine lime', version: 2 });
});

it('when an edit would leave lime without a strength, it is refused at the field', async () => {
  const farm = await startFarm();
  const itemId = givenItem(farm);
  const grower = await farm.as('grower');

  const reply = await grower.patch(`/api/supplies/items/${itemId}`).set('If-Match', '"1"').send({ strength: null });

  expect(reply.status).toBe(400);
  expect(reply.body.fields[0].path).toBe('strength');
});

it('when lots were received, the kind stays as it is', async () => {
  const farm = await startFarm();
  const itemId = givenItem(farm);
  givenLot(farm, itemId);
  const grower = await farm.as('grower');

  const reply = await grower
    .patch(`/api/supplies/items/${itemId}`)
    .set('If-Match', '"1"')
    .send({ kind: 'other', strength: null });

  expect(reply.status).toBe(409);
  expect(reply.body).toMatchObject({ code: 'record.in_use', fields: [{ path: 'kind' }] });
});

it('when a supply is retired, it leaves the list and takes no more deliveries', async () => {
  const farm = await startFarm();
  const itemId = givenItem(farm);
  const grower = await farm.as('grower');

  await grower.patch(`/api/supplies/items/${itemId}`).set('If-Match', '"1"').send({ retired: true });
  const list = await grower.get('/api/supplies/items');
  const retired = await grower.get('/api/supplies/items?retired=yes');
  const receipt = await grower
    .post('/api/supplies/receipts')
    .send({ itemId, code: 'L1', quantity: 10, costMinor: 100 });

  expect(list.body.items).toEqual([]);
  expect(retired.body.items).toHaveLength(1);
  expect(receipt.status).toBe(409);
});

it('when a search holds the signs of a pattern, they are read as letters', async () => {
  const farm = await startFarm();
  givenItem(farm, { name: '100% vinegar_strength' });
  givenItem(farm, { name: 'Lime' });
  const grower = await farm.as('grower');

  const percent = await grower.get('/api/supplies/items').query({ search: '100%' });
  const underscore = await grower.get('/api/supplies/items').query({ search: 'r_s' });
  const any = await grower.get('/api/supplies/items').query({ search: '%' });

  expect([percent, underscore, any].map((reply) => reply.body.items.length)).toEqual([1, 1, 1]);
});

it('when a supplier is added, changed and named again, its version counts and its name stays single', async () => {
  const farm = await startFarm();
  const owner = await farm.as('owner');

  const made = await owner
    .post('/api/supplies/suppliers')
    .send({ name: 'Dry goods, north quay', email: 'A@example.com' });
  const changed = await owner
    .patch(`/api/supplies/suppliers/${made.body.id}`)
    .set('If-Match', '"1"')
    .send({ email: '' });
  const stale = await owner
    .patch(`/api/supplies/suppliers/${made.body.id}`)
    .set('If-Match', '"1"')
    .send({ name: 'Other' });
  const twin = await owner.post('/api/supplies/suppliers').send({ name: 'Dry goods, north quay' });
  givenItem(farm, { supplierId: made.body.id });
  const list = await owner.get('/api/supplies/suppliers');

  expect(made.body).toMatchObject({ email: 'a@example.com', version: 1, items: 0 });
  expect(changed.body).toMatchObject({ email: '', version: 2 });
  expect([stale.status, twin.status]).toEqual([412, 409]);
  expect(list.body.items).toMatchObject([{ name: 'Dry goods, north quay', items: 1 }]);
});
