import { eq } from 'drizzle-orm';
import { expect, it } from 'vitest';
import { auditLog, consumptions } from '../../../server/db/schema/index.ts';
import { aReservoir, reservoirIn } from '../../support/a-reservoir.ts';
import {
  givenChangeOver,
  givenLevel,
  givenReading,
  givenRefill,
  givenReservoir,
  givenSystem,
} from '../../support/given-water.ts';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;

it('when a reservoir is put away, lists leave it out and nothing is logged for it until it is back', async () => {
  const { farm, systemId, reservoirId, grower, act } = await aReservoir();
  const edit = async (retired: boolean) => {
    const version = reservoirIn(farm, reservoirId)?.version ?? 0;
    return grower.patch(`/api/reservoirs/${reservoirId}`).set('If-Match', `"${version}"`).send({ retired });
  };
  const listed = async (retired: string) => {
    const { body } = await grower.get(`/api/reservoirs?systemId=${systemId}&retired=${retired}`);
    return body.items.length;
  };

  expect((await edit(true)).status).toBe(200);
  expect([await listed('no'), await listed('only')]).toEqual([0, 1]);
  expect((await act('refills', { waterL: 20, limeG: 0 })).status).toBe(409);

  await edit(false);
  expect([await listed('no'), await listed('only')]).toEqual([1, 0]);
  expect((await act('refills', { waterL: 20, limeG: 0 })).status).toBe(201);
});

it('when it is online, it can not be put away', async () => {
  const { farm, reservoirId, grower } = await aReservoir();
  givenRefill(farm, reservoirId);
  givenChangeOver(farm, reservoirId);
  const version = reservoirIn(farm, reservoirId)?.version ?? 0;

  const reply = await grower
    .patch(`/api/reservoirs/${reservoirId}`)
    .set('If-Match', `"${version}"`)
    .send({ retired: true });

  expect(reply.status).toBe(409);
});

it('when the habit is to replace it after six days, it is due six days after it went online', async () => {
  const { farm, systemId, grower } = await aReservoir();
  const id = givenReservoir(farm, systemId, { replaceDays: 6 });
  givenRefill(farm, id);
  farm.wait(3 * HOUR);
  givenChangeOver(farm, id);

  const { body } = await grower.get(`/api/reservoirs/${id}`);

  expect(body).toMatchObject({ onlineSince: farm.deps.clock.now(), dueAt: farm.deps.clock.now() + 6 * DAY });
});

it('when levels and salinity are logged, evaporation is told by both and checked against the surface', async () => {
  const { farm } = await aReservoir();
  const systemId = givenSystem(farm, { netVolumeL: 2000, surfaceM2: 4 });
  const id = givenReservoir(farm, systemId);
  givenRefill(farm, id, { waterL: 50 });
  givenChangeOver(farm, id);
  givenReading(farm, systemId, 35, { parameter: 'salinity', unit: 'ppt' });
  for (const level of [44, 24, 8]) {
    farm.wait(2 * DAY);
    givenLevel(farm, id, level);
  }
  givenReading(farm, systemId, 35, { parameter: 'salinity', unit: 'ppt' });

  const grower = await farm.as('grower');
  const { body } = await grower.get(`/api/systems/${systemId}/evaporation`);

  // From 50 to 8 L in six days: 7 L a day, 1.75 L from each square metre.
  expect(body.byUse.litresPerDay).toBeCloseTo(7, 9);
  expect(body.byUse).toMatchObject({ days: 6, stretches: 3 });
  expect(body.bySalinity.litresPerDay).toBeCloseTo(7, 9);
  expect(body.bySurface.perM2).toBeCloseTo(1.75, 9);
});

it('when nothing is logged, evaporation is not known', async () => {
  const { systemId, grower } = await aReservoir();

  expect((await grower.get(`/api/systems/${systemId}/evaporation`)).body).toEqual({
    ...{ systemId, byUse: null, bySalinity: null, surfaceM2: null, bySurface: null },
  });
});

it('when the farm weighs its spoon, it is kept, and told in the audit log', async () => {
  const { farm, grower } = await aReservoir();

  const reply = await grower.patch('/api/limewater-habits').send({ spoonG: 2.6 });

  expect(reply.body).toEqual({ spoonG: 2.6, freshMsCm: null });
  expect((await grower.get('/api/limewater-habits')).body).toEqual(reply.body);
  expect(farm.db.select().from(auditLog).all().at(-1)?.action).toBe('farm.limewater_habits_changed');
});

it('when the mixing card is printed, it is one page of PDF; amounts that make no mix are refused', async () => {
  const { reservoirId, grower } = await aReservoir();
  const card = (query: string) => grower.get(`/api/reservoirs/${reservoirId}/mixing-card.pdf?${query}`);

  const reply = await card('waterL=50&limeG=80&vinegarMl=200');
  const text = Buffer.from(reply.body).toString('latin1');

  expect(reply.headers['content-type']).toBe('application/pdf');
  expect(text.match(/\/Type \/Page\b(?!s)/g)).toHaveLength(1);
  expect((await card('waterL=50&limeG=1&vinegarMl=5000')).status).toBe(422);
  expect((await card('waterL=0&limeG=1')).status).toBe(400);
});

it('when a mix of a shared reservoir takes lime, each system carries its share of it, to the last part', async () => {
  const { farm, lime, systemId, reservoirId, grower, act } = await aReservoir();
  const others = [givenSystem(farm), givenSystem(farm)];
  const feeds = [systemId, ...others].map((id) => ({ systemId: id, share: 0.333 }));
  const version = reservoirIn(farm, reservoirId)?.version ?? 0;
  const shared = await grower
    .put(`/api/reservoirs/${reservoirId}/feeds`)
    .set('If-Match', `"${version}"`)
    .send({ feeds });
  expect(shared.status).toBe(200);

  const { body } = await act('refills', { waterL: 50, limeG: 50 });

  const booked = farm.db.select().from(consumptions).where(eq(consumptions.itemId, lime)).all();
  expect(new Set(booked.map((row) => row.systemId))).toEqual(new Set([systemId, ...others]));
  expect(booked.reduce((sum, { quantity }) => sum + quantity, 0)).toBeCloseTo(50, 9);
  // 50 g of 1,000 g for 8.00: 0.40, whole to the micro-unit.
  expect(booked.reduce((sum, { costMicro }) => sum + costMicro, 0)).toBe(400_000);
  const undone = await act('undo', { eventId: body.event.id });
  expect(undone.status).toBe(200);
  expect(farm.db.select().from(consumptions).all()).toEqual([]);
});
