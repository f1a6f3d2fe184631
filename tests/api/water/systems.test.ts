import { eq } from 'drizzle-orm';
import { expect, it } from 'vitest';
import { auditLog, systems, targetBands } from '../../../server/db/schema/index.ts';
import { givenSystem } from '../../support/given-water.ts';
import { startFarm } from '../../support/start-farm.ts';

const SYSTEM_B = {
  code: 'b',
  name: 'System B',
  kind: 'growout',
  netVolumeL: 3400,
  bands: [{ parameter: 'alkalinity', low: 2.8, high: 3.1 }],
};

it('when a system is added, it is stored with its bands, its code in capitals, and audited', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');

  const reply = await grower.post('/api/systems').send(SYSTEM_B);

  expect(reply.status).toBe(201);
  expect(reply.body).toMatchObject({ code: 'B', netVolumeL: 3400, bands: SYSTEM_B.bands, tanks: [], version: 1 });
  expect(farm.db.select().from(targetBands).all()).toMatchObject([{ parameter: 'alkalinity', low: 2.8, high: 3.1 }]);
  expect(farm.db.select().from(auditLog).where(eq(auditLog.entity, 'system')).all()).toMatchObject([
    { action: 'system.created', actorName: 'Test grower' },
  ]);
});

it('when a code is taken, says so at the field and adds nothing', async () => {
  const farm = await startFarm();
  givenSystem(farm, { code: 'B' });
  const grower = await farm.as('grower');

  const reply = await grower.post('/api/systems').send(SYSTEM_B);

  expect(reply.status).toBe(409);
  expect(reply.body.fields[0].path).toBe('code');
  expect(farm.db.select().from(systems).all()).toHaveLength(1);
  expect(farm.db.select().from(targetBands).all()).toEqual([]);
});

it.each([
  ['no volume', { netVolumeL: 0 }, 'netVolumeL'],
  ['an endless volume', { netVolumeL: 1e12 }, 'netVolumeL'],
  ['an unknown kind', { kind: 'pond' }, 'kind'],
  ['an odd code', { code: '<b>' }, 'code'],
  ['a huge name', { name: 'x'.repeat(5000) }, 'name'],
  ['a band upside down', { bands: [{ parameter: 'alkalinity', low: 3.1, high: 2.8 }] }, 'bands.0.high'],
  [
    'two bands of one parameter',
    { bands: [1, 2].map(() => ({ parameter: 'ph', low: 8, high: 8.4 })) },
    'bands.1.parameter',
  ],
  ['a band in the wrong unit', { bands: [{ parameter: 'alkalinity', low: 8, high: 140 }] }, 'bands.0.high'],
])('when a system has %s, refuses at the field', async (_, fields, path) => {
  const farm = await startFarm();
  const grower = await farm.as('grower');

  const reply = await grower.post('/api/systems').send({ ...SYSTEM_B, ...fields });

  expect(reply.status).toBe(400);
  expect(reply.body.fields.map((field: { path: string }) => field.path)).toContain(path);
  expect(farm.db.select().from(systems).all()).toEqual([]);
});

it('when two people edit a system, the second gets both versions and changes nothing', async () => {
  const farm = await startFarm();
  const systemId = givenSystem(farm, { name: 'Before' });
  const grower = await farm.as('grower');

  const first = await grower.patch(`/api/systems/${systemId}`).set('If-Match', '"1"').send({ name: 'First' });
  const second = await grower.patch(`/api/systems/${systemId}`).set('If-Match', '"1"').send({ name: 'Second' });

  expect(first.body).toMatchObject({ name: 'First', version: 2 });
  expect(second.status).toBe(412);
  expect(second.body.details.current).toMatchObject({ name: 'First', version: 2 });
  expect(farm.db.select().from(systems).get()?.name).toBe('First');
});

it('when a tank is added, the system shows it; a system that is not there takes none', async () => {
  const farm = await startFarm();
  const systemId = givenSystem(farm);
  const grower = await farm.as('grower');

  const added = await grower.post('/api/tanks').send({ systemId, code: 'b1', name: 'Raceway 1' });
  const lost = await grower.post('/api/tanks').send({
    systemId: '00000000-0000-4000-8000-0000000fffff',
    code: 'b2',
    name: 'Raceway 2',
  });

  expect(added.status).toBe(201);
  expect(lost.status).toBe(404);
  const shown = await grower.get(`/api/systems/${systemId}`);
  expect(shown.body.tanks).toMatchObject([{ code: 'B1', name: 'Raceway 1' }]);
});
