import { eq } from 'drizzle-orm';
import { expect, it } from 'vitest';
import { consumptions, dosingBookings, lots, systems } from '../../../server/db/schema/index.ts';
import { supplementSupply } from '../../../server/queries/supplement-supply.ts';
import { givenBooked, givenCalibration, givenDosing, givenPump, givenSupplement } from '../../support/given-dosing.ts';
import { givenItem, givenLot } from '../../support/given-supplies.ts';
import { givenSystem } from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const DAY = 86_400_000;

function supplied(farm: TestFarm, systemId: string, from: number, solute: 'alkalinity' | 'calcium' = 'alkalinity') {
  const system = farm.db.select().from(systems).where(eq(systems.id, systemId)).get();
  if (!system) throw new Error('The system is gone.');
  const supply = supplementSupply(farm.db, system, from, farm.deps.clock.now(), solute);
  return supply.reduce((sum, { meqL }) => sum + meqL, 0);
}

it('when a dose runs, it supplies the system and leaves the lots day by day, however often it is booked', async () => {
  const farm = await startFarm({ now: '2026-02-02T00:00:00Z' });
  const systemId = givenSystem(farm);
  const itemId = givenSupplement(farm);
  const start = farm.deps.clock.now();
  givenDosing(farm, systemId, itemId);
  farm.wait(3.5 * DAY);

  givenBooked(farm);
  givenBooked(farm);

  expect(farm.db.select().from(dosingBookings).all()).toHaveLength(3);
  expect(farm.db.select().from(lots).all()[0]?.remaining).toBeCloseTo(1000 - 3 * 24, 6);
  expect(farm.db.select().from(consumptions).all()).toMatchObject([
    ...[1, 2, 3].map(() => ({ cause: 'dosing', systemId, quantity: 24 })),
  ]);
  // 3.5 days of 24 mL of 2 meq/mL in 1,000 L.
  expect(supplied(farm, systemId, start)).toBeCloseTo(0.168, 9);
});

it('when the pump gives less than it was asked for, so do the supply and the bookings', async () => {
  const farm = await startFarm({ now: '2026-02-02T00:00:00Z' });
  const systemId = givenSystem(farm);
  const pumpId = givenPump(farm);
  const start = farm.deps.clock.now();
  givenCalibration(farm, pumpId, [9, 9], { adjusted: false });
  const rateId = givenDosing(farm, systemId, givenSupplement(farm), { pumpId });
  farm.wait(2 * DAY);
  givenBooked(farm);
  const viewer = await farm.as('viewer');

  const { body } = await viewer.get(`/api/systems/${systemId}/dosing-rates`);

  expect(supplied(farm, systemId, start)).toBeCloseTo(0.9 * 0.096, 9);
  expect(farm.db.select().from(dosingBookings).all()[0]?.booked).toBeCloseTo(21.6, 9);
  expect(body.items).toMatchObject([{ id: rateId, amountPerDay: 24, unbooked: 0 }]);
  expect(body.items[0].givenPerDay).toBeCloseTo(21.6, 9);
  expect(body.items[0].brings.alkalinityMeqL).toBeCloseTo(0.0432, 9);
});

it('when the amount is changed, one dose ends as the next begins, and taking it back lets the first run on', async () => {
  const farm = await startFarm({ now: '2026-02-02T00:00:00Z' });
  const systemId = givenSystem(farm);
  const start = farm.deps.clock.now();
  const rateId = givenDosing(farm, systemId, givenSupplement(farm));
  farm.wait(1.5 * DAY);
  const grower = await farm.as('grower');

  const changed = await grower.post(`/api/dosing-rates/${rateId}/changes`).send({ amountPerDay: 48 });
  farm.wait(0.5 * DAY);
  givenBooked(farm);

  expect(changed.body).toMatchObject({ amountPerDay: 48, toAt: null });
  expect(supplied(farm, systemId, start)).toBeCloseTo((24 * 1.5 + 48 * 0.5) * 0.002, 9);
  expect(farm.db.select().from(lots).all()[0]?.remaining).toBeCloseTo(1000 - 60, 6);

  const later = await farm.as('grower');
  await later.delete(`/api/dosing-rates/${changed.body.id}`);
  givenBooked(farm);
  const { body } = await later.get(`/api/systems/${systemId}/dosing-rates`);
  expect(body.items).toMatchObject([{ id: rateId, toAt: null }]);
  expect(farm.db.select().from(lots).all()[0]?.remaining).toBeCloseTo(1000 - 48, 6);
});

it('when someone writes down two days late that it was stopped, those days come back to the lots', async () => {
  const farm = await startFarm({ now: '2026-02-02T00:00:00Z' });
  const rateId = givenDosing(farm, givenSystem(farm), givenSupplement(farm));
  farm.wait(4 * DAY);
  const grower = await farm.as('grower');
  givenBooked(farm);

  const at = farm.deps.clock.now() - 2.5 * DAY;
  const { status } = await grower.post(`/api/dosing-rates/${rateId}/stop`).send({ at });
  givenBooked(farm);

  expect(status).toBe(201);
  expect(farm.db.select().from(lots).all()[0]?.remaining).toBeCloseTo(1000 - 36, 6);
  const resumed = await grower.post(`/api/dosing-rates/${rateId}/resume`).send({});
  givenBooked(farm);
  expect(resumed.body.toAt).toBeNull();
  expect(farm.db.select().from(lots).all()[0]?.remaining).toBeCloseTo(1000 - 96, 6);
});

it('when the lots hold less than ran, what they hold is booked and the rest is told', async () => {
  const farm = await startFarm({ now: '2026-02-02T00:00:00Z' });
  const systemId = givenSystem(farm);
  givenDosing(farm, systemId, givenSupplement(farm, 30));
  farm.wait(2 * DAY);
  givenBooked(farm);
  const viewer = await farm.as('viewer');

  const { body } = await viewer.get('/api/dosing-rates');

  expect(farm.db.select().from(lots).all()[0]?.remaining).toBe(0);
  expect(body.items[0].unbooked).toBeCloseTo(18, 6);
});

it('when a supplement brings calcium, doses and steady dosing supply it too', async () => {
  const farm = await startFarm({ now: '2026-02-02T00:00:00Z' });
  const systemId = givenSystem(farm);
  const itemId = givenItem(farm, { kind: 'supplement', unit: 'mL', strength: 0, calciumMg: 37 });
  givenLot(farm, itemId);
  const start = farm.deps.clock.now();
  givenDosing(farm, systemId, itemId);
  farm.wait(DAY);
  const grower = await farm.as('grower');
  const dosed = await grower.post('/api/doses').send({ systemId, itemId, amount: 100 });

  expect(dosed.body).toMatchObject({ alkalinityMeqL: 0, calciumMgL: 3.7 });
  expect(supplied(farm, systemId, start, 'calcium')).toBeCloseTo(3.7 + 0.024 * 37, 9);
  expect(supplied(farm, systemId, start)).toBe(0);
});

it('when it runs into the system already, a second one is refused at the field', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const [systemId, itemId] = [givenSystem(farm), givenSupplement(farm)];
  givenDosing(farm, systemId, itemId);

  const { status, body } = await grower.post('/api/dosing-rates').send({ systemId, itemId, amountPerDay: 5 });

  expect([status, body.code, body.fields[0].path]).toEqual([409, 'record.duplicate', 'itemId']);
});

it('when an act does not fit how a dose stands, it is refused', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const rateId = givenDosing(farm, givenSystem(farm), givenSupplement(farm));
  const post = async (act: string, body: object = {}) => {
    const reply = await grower.post(`/api/dosing-rates/${rateId}/${act}`).send(body);
    return [act, reply.status];
  };

  expect(await post('resume')).toEqual(['resume', 409]);
  expect(await post('stop', { at: farm.deps.clock.now() - DAY })).toEqual(['stop', 400]);
  expect(await post('stop')).toEqual(['stop', 201]);
  expect(await post('stop')).toEqual(['stop', 409]);
  expect(await post('changes', { amountPerDay: 5 })).toEqual(['changes', 409]);
});

it('when a pump drifted by more than a tenth, it wants cleaning until the next check', async () => {
  const farm = await startFarm();
  const pumpId = givenPump(farm);
  givenCalibration(farm, pumpId, [10, 10], { adjusted: true });
  farm.wait(30 * DAY);

  const drifted = givenCalibration(farm, pumpId, [8.8, 8.9, 8.7], { adjusted: true });
  expect(drifted).toMatchObject({ clean: true, factor: 1 });
  expect(drifted.calibrations[0]?.drift).toBeCloseTo(-0.12, 9);
  farm.wait(DAY);
  expect(givenCalibration(farm, pumpId, [10])).toMatchObject({ clean: false });
});

it('when what came can not belong to what was asked, the field says so; a mistake can be taken back', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const pumpId = givenPump(farm);
  const path = `/api/dosing-pumps/${pumpId}/calibrations`;

  const wrong = await grower.post(path).send({ askedMl: 10, measuredMl: [1000] });
  const right = await grower.post(path).send({ askedMl: 10, measuredMl: [9.5] });
  const undone = await grower.delete(`/api/pump-calibrations/${right.body.calibrations[0].id}`);
  const { body } = await grower.get('/api/dosing-pumps');

  expect([wrong.status, wrong.body.fields[0].path]).toEqual([400, 'measuredMl.0']);
  expect(right.body.factor).toBeCloseTo(0.95, 9);
  expect(undone.status).toBe(200);
  expect(body.items).toMatchObject([{ id: pumpId, factor: 1, calibrations: [] }]);
});

it('when a pump doses, it can not be retired; a stale edit is told', async () => {
  const farm = await startFarm();
  const grower = await farm.as('grower');
  const pumpId = givenPump(farm);
  givenDosing(farm, givenSystem(farm), givenSupplement(farm), { pumpId });
  const edit = (version: string, body: object) =>
    grower.patch(`/api/dosing-pumps/${pumpId}`).set('If-Match', `"${version}"`).send(body);

  expect((await edit('1', { retired: true })).body.code).toBe('record.in_use');
  expect((await edit('1', { name: 'Left head' })).body).toMatchObject({ name: 'Left head', version: 2 });
  expect((await edit('1', { name: 'Right head' })).status).toBe(412);
});
