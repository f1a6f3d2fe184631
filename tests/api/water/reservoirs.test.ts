import { eq } from 'drizzle-orm';
import { expect, it } from 'vitest';
import { consumptions, lots, reservoirEvents, reservoirs } from '../../../server/db/schema/index.ts';
import { countItem } from '../../../server/services/supply-lots.ts';
import { givenItem, givenLot } from '../../support/given-supplies.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';
import { givenChangeOver, givenLevel, givenRefill, givenReservoir, givenSystem } from '../../support/given-water.ts';

const HOUR = 3_600_000;

/** A farm with lime (95 %), vinegar (5 %) and one empty 60 L reservoir. */
async function limewaterFarm() {
  const farm = await startFarm();
  const lime = givenItem(farm, { name: 'Lime', kind: 'lime', strength: 0.95 });
  const vinegar = givenItem(farm, { name: 'Vinegar', kind: 'vinegar', unit: 'mL', strength: 5 });
  givenLot(farm, lime, { quantity: 1000, costMinor: 800 });
  givenLot(farm, vinegar, { quantity: 5000, costMinor: 500 });
  const systemId = givenSystem(farm, { netVolumeL: 3400 });
  const reservoirId = givenReservoir(farm, systemId);
  return { farm, lime, vinegar, systemId, reservoirId, grower: await farm.as('grower') };
}

function reservoirIn(farm: TestFarm, reservoirId: string) {
  return farm.db.select().from(reservoirs).where(eq(reservoirs.id, reservoirId)).get();
}

it('when limewater is mixed, lime leaves the oldest lot, the strength follows from the mix, and it settles', async () => {
  const { farm, lime, reservoirId, systemId, grower } = await limewaterFarm();

  const reply = await grower
    .post(`/api/reservoirs/${reservoirId}/refills`)
    .send({ waterL: 60, limeG: 60, temperatureC: 25 });

  expect(reply.status).toBe(201);
  // 60 g × 0.95 / 74.092 g/mol × 2 eq in 60 L = 25.64 meq/L, by arithmetic; all of it dissolves at 25 °C.
  expect(reply.body.reservoir).toMatchObject({ state: 'settling', levelL: 60 });
  expect(reply.body.reservoir.alkalinityMeqL).toBeCloseTo(25.643, 2);
  expect(reply.body.event).toMatchObject({ kind: 'refill', levelBeforeL: 0, limePurity: 0.95, undissolvedG: 0 });
  expect(reply.body.shortOf).toBe('lime');
  expect(farm.db.select().from(lots).where(eq(lots.itemId, lime)).get()).toMatchObject({ remaining: 940 });
  expect(farm.db.select().from(consumptions).all()).toMatchObject([
    { itemId: lime, quantity: 60, cause: 'refill', causeId: reply.body.event.id, systemId, costMicro: 480_000 },
  ]);
});

it('when it has settled for two hours, it stands by', async () => {
  const { farm, reservoirId, grower } = await limewaterFarm();
  givenRefill(farm, reservoirId);

  farm.wait(2 * HOUR - 1);
  expect((await grower.get(`/api/reservoirs/${reservoirId}`)).body.state).toBe('settling');
  farm.wait(1);
  expect((await grower.get(`/api/reservoirs/${reservoirId}`)).body.state).toBe('standby');
});

it('when more lime is given than dissolves, the rest is told and the strength stays at what the water holds', async () => {
  const { reservoirId, grower } = await limewaterFarm();

  const { body } = await grower.post(`/api/reservoirs/${reservoirId}/refills`).send({ waterL: 60, limeG: 120 });

  // NBS 1956: 0.0203 mol/L = 40.6 meq/L at 25 °C; our line through PHREEQC runs gives 40.3.
  expect(body.reservoir.alkalinityMeqL).toBeCloseTo(40.3, 1);
  expect(body.event.undissolvedG).toBeCloseTo(120 * 0.95 - 60 * 1.493, 1);
  expect(body).toMatchObject({ shortOf: 'solubility', vinegarHelps: false });
});

it('when vinegar joins less lime than the water dissolves alone, says that it helps nothing; with more it does', async () => {
  const { reservoirId, grower } = await limewaterFarm();
  const mix = { waterL: 20, vinegarMl: 100 };

  const little = await grower.post(`/api/reservoirs/${reservoirId}/refills`).send({ ...mix, limeG: 20 });
  const plenty = await grower.post(`/api/reservoirs/${reservoirId}/refills`).send({ ...mix, limeG: 40 });

  expect([little.body.vinegarHelps, plenty.body.vinegarHelps]).toEqual([false, true]);
});

it('when a mix joins a rest, the strengths blend by litres', async () => {
  const { farm, reservoirId, grower } = await limewaterFarm();
  givenRefill(farm, reservoirId, { waterL: 30, limeG: 30 });

  const { body } = await grower.post(`/api/reservoirs/${reservoirId}/refills`).send({
    levelBeforeL: 10,
    waterL: 40,
    limeG: 0,
  });

  expect(body.reservoir.levelL).toBe(50);
  expect(body.reservoir.alkalinityMeqL).toBeCloseTo((10 * 25.643) / 50, 2);
});

it.each([
  ['more water than it holds', { waterL: 61, limeG: 10 }, 'waterL', 400],
  ['no water', { waterL: 0, limeG: 10 }, 'waterL', 400],
  ['negative lime', { waterL: 20, limeG: -1 }, 'limeG', 400],
  ['hot water', { waterL: 20, limeG: 10, temperatureC: 60 }, 'temperatureC', 400],
])('when a mix has %s, refuses at the field and takes nothing', async (_, mix, path, status) => {
  const { farm, reservoirId, grower } = await limewaterFarm();

  const reply = await grower.post(`/api/reservoirs/${reservoirId}/refills`).send(mix);

  expect(reply.status).toBe(status);
  expect(reply.body.fields[0].path).toBe(path);
  expect(farm.db.select().from(consumptions).all()).toEqual([]);
  expect(farm.db.select().from(reservoirEvents).all()).toEqual([]);
});

it('when the lime does not suffice, or vinegar would use it all up, nothing is written', async () => {
  const { farm, reservoirId, grower } = await limewaterFarm();

  const short = await grower.post(`/api/reservoirs/${reservoirId}/refills`).send({ waterL: 60, limeG: 1001 });
  const sour = await grower
    .post(`/api/reservoirs/${reservoirId}/refills`)
    .send({ waterL: 60, limeG: 5, vinegarMl: 500 });

  expect([short.body.code, sour.body.code]).toEqual(['supply.not_enough', 'domain.out_of_range']);
  expect(farm.db.select().from(reservoirEvents).all()).toEqual([]);
  expect(farm.db.select().from(consumptions).all()).toEqual([]);
  expect(reservoirIn(farm, reservoirId)).toMatchObject({ state: 'standby', levelL: 0 });
});

it('when the farm has no lime among its supplies, a mix says what to do', async () => {
  const farm = await startFarm();
  const reservoirId = givenReservoir(farm, givenSystem(farm));
  const grower = await farm.as('grower');

  const reply = await grower.post(`/api/reservoirs/${reservoirId}/refills`).send({ waterL: 20, limeG: 20 });

  expect(reply.status).toBe(400);
  expect(reply.body.fields[0]).toMatchObject({ path: 'limeItemId', message: expect.stringMatching(/Add the item/) });
});

it('when the same mix is sent twice with one key, lime is taken once', async () => {
  const { farm, reservoirId, grower } = await limewaterFarm();
  const send = () =>
    grower
      .post(`/api/reservoirs/${reservoirId}/refills`)
      .set('Idempotency-Key', 'one-mix-only')
      .send({ waterL: 20, limeG: 20 });

  const [first, second] = [await send(), await send()];

  expect(second.body).toEqual(first.body);
  expect(farm.db.select().from(consumptions).all()).toHaveLength(1);
  expect(reservoirIn(farm, reservoirId)?.levelL).toBe(20);
});

it('when another reservoir goes online, the former comes off with its last level; one is online at a time', async () => {
  const { farm, systemId, reservoirId } = await limewaterFarm();
  const other = givenReservoir(farm, systemId);
  givenRefill(farm, reservoirId);
  givenRefill(farm, other);
  givenChangeOver(farm, reservoirId);
  farm.wait(24 * HOUR);
  const grower = await farm.as('grower');

  const reply = await grower.post(`/api/reservoirs/${other}/changeovers`).send({ formerLevelL: 4 });

  expect(reply.body).toMatchObject({
    reservoir: { id: other, state: 'online' },
    event: { reservoirId: other, kind: 'online' },
  });
  expect(reservoirIn(farm, reservoirId)).toMatchObject({ state: 'spent', levelL: 4 });
  const online = farm.db.select().from(reservoirs).where(eq(reservoirs.state, 'online')).all();
  expect(online.map(({ id }) => id)).toEqual([other]);
});

it('when a reservoir is empty or online already, a changeover to it is refused', async () => {
  const { farm, reservoirId, grower } = await limewaterFarm();

  const empty = await grower.post(`/api/reservoirs/${reservoirId}/changeovers`).send({});
  givenRefill(farm, reservoirId);
  givenChangeOver(farm, reservoirId);
  const again = await grower.post(`/api/reservoirs/${reservoirId}/changeovers`).send({});

  expect([empty.status, again.status]).toEqual([409, 409]);
  expect(farm.db.select().from(reservoirEvents).all()).toHaveLength(2);
});

it('when levels are logged, use and the day it runs empty follow from them', async () => {
  const { farm, reservoirId } = await limewaterFarm();
  givenRefill(farm, reservoirId, { waterL: 60 });
  givenChangeOver(farm, reservoirId);
  farm.wait(48 * HOUR);
  const grower = await farm.as('grower');

  const logged = await grower.post(`/api/reservoirs/${reservoirId}/levels`).send({ levelL: 40 });

  expect(logged.status).toBe(201);
  const { body } = await grower.get(`/api/reservoirs/${reservoirId}`);
  expect(body.litresPerDay).toBeCloseTo(10, 9);
  expect(body.emptyAt).toBe(farm.deps.clock.now() + 96 * HOUR);
});

it('when a level is higher than the reservoir, or earlier than what is logged, it is refused', async () => {
  const { farm, reservoirId, grower } = await limewaterFarm();
  givenRefill(farm, reservoirId);
  const send = (body: object) => grower.post(`/api/reservoirs/${reservoirId}/levels`).send(body);

  const high = await send({ levelL: 61 });
  const early = await send({ levelL: 30, at: farm.deps.clock.now() - HOUR });

  expect([high.status, early.status]).toEqual([400, 409]);
  expect([high.body.fields[0].path, early.body.fields[0].path]).toEqual(['levelL', 'at']);
  expect(farm.db.select().from(reservoirEvents).all()).toHaveLength(1);
});

it('when a mix is taken back, its lime is in its lot again to the last micro-unit and the reservoir as before', async () => {
  const { farm, reservoirId, grower } = await limewaterFarm();
  const before = farm.db.select().from(lots).all();
  const { event } = givenRefill(farm, reservoirId, { limeG: 33.3, vinegarMl: 12.5, waterL: 20 });

  const reply = await grower.post(`/api/reservoirs/${reservoirId}/undo`).send({ eventId: event.id });

  expect(reply.status).toBe(200);
  expect(farm.db.select().from(lots).all()).toEqual(before);
  expect(farm.db.select().from(consumptions).all()).toEqual([]);
  expect(reservoirIn(farm, reservoirId)).toMatchObject({
    state: 'standby',
    levelL: 0,
    alkalinityMeqL: 0,
    readyAt: null,
  });
});

it('when the lime was counted since, a mix is not taken back and a level reading is offered instead', async () => {
  const { farm, lime, reservoirId, grower } = await limewaterFarm();
  const { event } = givenRefill(farm, reservoirId, { limeG: 50, waterL: 20 });
  farm.wait(HOUR);
  farm.write((write) => countItem(write, { itemId: lime, counted: 900, reason: 'weighed' }));

  const reply = await grower.post(`/api/reservoirs/${reservoirId}/undo`).send({ eventId: event.id });

  expect(reply.status).toBe(409);
  expect(reply.body.detail).toMatch(/Log the level/);
  expect(reservoirIn(farm, reservoirId)?.levelL).toBe(20);
});

it('when a changeover is taken back, the former reservoir is online again', async () => {
  const { farm, systemId, reservoirId, grower } = await limewaterFarm();
  const other = givenReservoir(farm, systemId);
  givenRefill(farm, reservoirId);
  givenRefill(farm, other);
  givenChangeOver(farm, reservoirId);
  farm.wait(HOUR);
  givenChangeOver(farm, other, undefined, 3);
  const { body } = await grower.get(`/api/reservoirs/${other}/events`);

  const reply = await grower.post(`/api/reservoirs/${other}/undo`).send({ eventId: body.items[0].id });

  expect(reply.status).toBe(200);
  expect(reservoirIn(farm, reservoirId)).toMatchObject({ state: 'online', levelL: 50 });
  expect(reservoirIn(farm, other)?.state).toBe('settling');
});

it('when something was logged after an event, the event can not be taken back', async () => {
  const { farm, reservoirId, grower } = await limewaterFarm();
  const { event } = givenRefill(farm, reservoirId);
  givenLevel(farm, reservoirId, 45);

  const reply = await grower.post(`/api/reservoirs/${reservoirId}/undo`).send({ eventId: event.id });

  expect(reply.status).toBe(409);
  expect(farm.db.select().from(reservoirEvents).all()).toHaveLength(2);
});
