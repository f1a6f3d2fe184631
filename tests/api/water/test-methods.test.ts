import { expect, it } from 'vitest';
import { auditLog, readings } from '../../../server/db/schema/index.ts';
import { readingsWithError } from '../../../server/queries/reading-errors.ts';
import type { TestMethod } from '../../../shared/contracts/test-methods.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import { givenSystem } from '../../support/given-water.ts';
import { startFarm, type TestClient } from '../../support/start-farm.ts';

const NOON = Date.parse('2026-03-01T12:00:00Z');
const HOUR = 3_600_000;

async function methodFarm() {
  const farm = await startFarm();
  const systemId = givenSystem(farm);
  const grower = await farm.as('grower');
  const { body } = await grower.post('/api/test-methods/usual').send({});
  const methods = body.items as TestMethod[];
  const photometer = methods.find(({ parameter, name }) => parameter === 'alkalinity' && name === 'Photometer');
  if (!photometer) throw new Error('The usual methods have no photometer.');
  return { farm, systemId, grower, methods, photometer };
}

async function logged(grower: TestClient, systemId: string, value: number, fields: object, takenAt = NOON) {
  const values = [{ parameter: 'alkalinity', value, unit: 'dKH', ...fields }];
  const reply = await grower.post('/api/readings').send({ systemId, takenAt, values });
  expect(reply.status, reply.text).toBe(201);
  return reply.body.items[0];
}

/** A check of the photometer against 8 dKH, exactly known. */
function check(grower: TestClient, methodId: string, found: number[], at: number, kitLotId: string | null = null) {
  const body = { unit: 'dKH', referenceValue: 8, referenceError: 0, found, at, kitLotId, solution: 'Standard, 8 dKH' };
  return grower.post(`/api/test-methods/${methodId}/calibrations`).send(body);
}

it('when the usual methods are added twice, each is there once, with a photometer of ± 0.3 dKH', async () => {
  const { grower, methods, photometer } = await methodFarm();

  const again = await grower.post('/api/test-methods/usual').send({});

  expect(again.body.items).toHaveLength(methods.length);
  expect(photometer.error).toBeCloseTo(0.3, 9);
  expect(photometer.source).toMatch(/no source/);
});

it('when a reading names a method and repeats, its mean stands with the error of the mean', async () => {
  const { farm, systemId, grower, photometer } = await methodFarm();

  const reading = await logged(grower, systemId, 8.2, { repeats: [8.4, 8.3], methodId: photometer.id });

  expect(reading).toMatchObject({ method: 'Photometer', methodId: photometer.id, unit: 'dKH', correction: null });
  expect(reading.value / MEQ_PER_DKH).toBeCloseTo(8.3, 9);
  expect(reading.repeats).toHaveLength(3);
  // Ten tests of 0.3 / 1.96 dKH pooled with the scatter of these three, for a mean of three; by hand.
  const variance = (10 * (0.3 / 1.96) ** 2 + 0.02) / 12 / 3;
  expect(reading.sd / MEQ_PER_DKH).toBeCloseTo(Math.sqrt(variance), 9);
  const [known] = readingsWithError(farm.db, systemId, 'alkalinity', NOON, NOON);
  expect(known?.sd).toBeCloseTo(reading.sd, 12);
});

it('when a kit is checked, its bias comes off later readings until the next check, and goes back on with undo', async () => {
  const { farm, systemId, grower, photometer } = await methodFarm();
  const kit = { methodId: photometer.id };
  const dkh = async () => {
    const { body } = await grower.get('/api/readings?parameter=alkalinity');
    return (body.items as { value: number }[]).map(({ value }) => Number((value / MEQ_PER_DKH).toFixed(6))).reverse();
  };
  await logged(grower, systemId, 8.5, kit, NOON - 2 * HOUR);
  await logged(grower, systemId, 8.5, kit, NOON + HOUR);

  const first = await check(grower, photometer.id, [8.4, 8.5, 8.3], NOON);
  expect(first.status, first.text).toBe(201);
  expect(first.body).toMatchObject({ isDistinct: true, corrects: 1 });
  expect(first.body.bias / MEQ_PER_DKH).toBeCloseTo(0.4, 9);
  await logged(grower, systemId, 8.4, kit, NOON + 2 * HOUR);
  expect(await dkh()).toEqual([8.5, 8.1, 8]);

  const second = await check(grower, photometer.id, [8, 8, 8], NOON + 90 * 60_000);
  expect(second.body).toMatchObject({ isDistinct: false, corrects: 1 });
  expect(await dkh()).toEqual([8.5, 8.1, 8.4]);

  await grower.delete(`/api/calibrations/${second.body.id}`);
  expect(await dkh()).toEqual([8.5, 8.1, 8]);
  const removed = await grower.delete(`/api/calibrations/${first.body.id}`);
  expect(removed.status).toBe(200);
  expect(await dkh()).toEqual([8.5, 8.5, 8.4]);
  const actions = farm.db
    .select()
    .from(auditLog)
    .all()
    .map(({ action }) => action);
  expect(actions).toEqual(expect.arrayContaining(['calibration.made', 'calibration.removed', 'test_method.created']));
});

it('when a lot is checked, readings of another lot stay as they are; a lot of another method is refused', async () => {
  const { systemId, grower, methods, photometer } = await methodFarm();
  const lot = async (code: string) => {
    const reply = await grower.post(`/api/test-methods/${photometer.id}/kit-lots`).send({ code });
    return reply.body.id as string;
  };
  const [one, two] = [await lot('24-117'), await lot('24-201')];
  await check(grower, photometer.id, [8.4], NOON - HOUR, one);

  const ofOne = await logged(grower, systemId, 8.4, { methodId: photometer.id, kitLotId: one });
  const ofTwo = await logged(grower, systemId, 8.4, { methodId: photometer.id, kitLotId: two }, NOON + 1);
  const other = methods.find(({ name }) => name === 'Drop count');
  const values = [{ parameter: 'alkalinity', value: 8, unit: 'dKH', methodId: other?.id, kitLotId: one }];
  const refused = await grower.post('/api/readings').send({ systemId, values });
  const twice = await grower.post(`/api/test-methods/${photometer.id}/kit-lots`).send({ code: '24-117' });

  expect(ofOne).toMatchObject({ kitLotCode: '24-117' });
  expect(ofOne.value / MEQ_PER_DKH).toBeCloseTo(8, 9);
  expect(ofOne.measured / MEQ_PER_DKH).toBeCloseTo(8.4, 9);
  expect(ofTwo.value / MEQ_PER_DKH).toBeCloseTo(8.4, 9);
  expect(refused.body.fields).toEqual([{ path: 'values.0.kitLotId', message: expect.any(String) }]);
  expect(twice.status).toBe(409);
});

it('when the error of a method is changed, its readings have the new one; a stale change is refused', async () => {
  const { farm, systemId, grower, photometer } = await methodFarm();
  await logged(grower, systemId, 8.4, { methodId: photometer.id });
  const change = () => grower.patch(`/api/test-methods/${photometer.id}`).set('If-Match', '"1"').send({ error: 0.6 });

  const changed = await change();
  const stale = await change();

  expect(changed.body).toMatchObject({ version: 2, readings: 1 });
  expect(changed.body.error).toBeCloseTo(0.6, 9);
  expect(stale.status).toBe(412);
  expect((farm.db.select().from(readings).all()[0]?.sd ?? 0) / MEQ_PER_DKH).toBeCloseTo(0.6 / 1.96, 9);
});

it.each([
  ['an unknown unit', { unit: 'furlong' }, 'unit'],
  ['no error', { error: 0 }, 'error'],
  ['no name', { name: ' ' }, 'name'],
  ['a name that is there', { name: 'Photometer' }, 'name'],
])('when a method comes with %s, refuses at the field', async (_, fields, path) => {
  const { grower } = await methodFarm();

  const reply = await grower
    .post('/api/test-methods')
    .send({ parameter: 'alkalinity', name: 'Strips', unit: 'dKH', error: 1, step: 1, ...fields });

  expect(reply.status).toBeGreaterThanOrEqual(400);
  expect(reply.status).toBeLessThan(500);
  expect(reply.body.fields[0].path).toBe(path);
});

it('when a method is read in °F, its error is kept as a difference of temperature', async () => {
  const { grower } = await methodFarm();

  const reply = await grower
    .post('/api/test-methods')
    .send({ parameter: 'temperature', name: 'Old dial', unit: 'F', error: 1.8, step: 0.9 });

  expect(reply.body.repeatabilitySd).toBeCloseTo(1 / 1.96, 9);
  expect(reply.body.error).toBeCloseTo(1.8, 9);
});

it('when a viewer looks, methods can be read and not changed', async () => {
  const { farm, photometer } = await methodFarm();
  const viewer = await farm.as('viewer');

  expect((await viewer.get('/api/test-methods')).status).toBe(200);
  expect((await check(viewer, photometer.id, [8], NOON)).status).toBe(403);
  expect((await viewer.post('/api/test-methods/usual').send({})).status).toBe(403);
});
