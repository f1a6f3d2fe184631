import { describe, expect, it } from 'vitest';
import { overfills, reservoirEvents, tasks } from '../../../server/db/schema/index.ts';
import { MS_PER_HOUR } from '../../../shared/domain/days.ts';
import { givenDosedSystem, givenMeans, planOf } from '../../support/given-plans.ts';
import { givenLevel, givenSystem } from '../../support/given-water.ts';
import { startFarm } from '../../support/start-farm.ts';

/** 20 L stand online at about 20 meq/L, of a system of 1,000 L. */
async function aFarm() {
  const farm = await startFarm();
  const { limeId } = givenMeans(farm);
  const system = givenDosedSystem(farm, { limeItemId: limeId, perDayDkh: 0 });
  return { farm, ...system, grower: await farm.as('grower') };
}

describe('what happens if a top-off control sticks', () => {
  it('when limewater is online, tells the water before, at once and in balance, by its tests', async () => {
    const { systemId, onlineId, grower } = await aFarm();

    const { body } = await grower.get(`/api/systems/${systemId}/overfill`);

    expect(body.reservoir).toMatchObject({ id: onlineId, isOnline: true, levelL: 20, usableL: 20 });
    expect(body.litres).toBe(20);
    expect(body.effect.before.phNbs).toBeCloseTo(8.2, 6);
    expect(body.effect.atOnce.phNbs).toBeGreaterThan(8.4);
    // Salt of 1,000 L spreads over 1,020 L.
    expect(body.effect.atOnce.salinity).toBeCloseTo(35 / 1.02, 1);
    expect(body.effect.equilibrated.phNbs).toBeLessThan(body.effect.atOnce.phNbs);
    expect(body.broken).toContain('ph');
    expect(body.largest.litres).toBeLessThan(20);
    const salinity = body.water.find(({ parameter }: { parameter: string }) => parameter === 'salinity');
    expect(salinity).toEqual({ parameter: 'salinity', value: 35, takenAt: null });
  });

  it('when a pump and its hours are told, is what it moves', async () => {
    const { systemId, grower } = await aFarm();
    const { body } = await grower.get(`/api/systems/${systemId}/overfill?litresPerHour=0.5&hours=8`);
    expect(body.litres).toBe(4);
  });

  it('when another reservoir is asked for, is told of that; one of another system is not known here', async () => {
    const { farm, systemId, standbyId, grower } = await aFarm();
    const own = await grower.get(`/api/systems/${systemId}/overfill?reservoirId=${standbyId}`);
    expect(own.body).toMatchObject({ reservoir: { id: standbyId }, litres: 0, broken: [] });
    const other = await grower.get(`/api/systems/${givenSystem(farm)}/overfill?reservoirId=${standbyId}`);
    expect(other.status).toBe(404);
  });

  it('when the system has no limewater, has nothing to tell', async () => {
    const { farm, grower } = await aFarm();
    const { body } = await grower.get(`/api/systems/${givenSystem(farm)}/overfill`);
    expect(body).toMatchObject({ reservoir: null, effect: null, largest: null, litres: 0 });
  });
});

describe('logging an overfill', () => {
  it('when it is logged, the reservoir falls at once and tests are due after 1, 4 and 24 hours', async () => {
    const { farm, systemId, onlineId, grower } = await aFarm();
    farm.wait(2 * MS_PER_HOUR);

    const reply = await grower.post(`/api/systems/${systemId}/overfills`).send({ litres: 12, note: 'Float stuck' });

    expect(reply.status).toBe(201);
    expect(reply.body).toMatchObject({ litres: 12, reservoirId: onlineId, by: 'Test grower', note: 'Float stuck' });
    const [before, after] = farm.db.select().from(reservoirEvents).all().slice(-2);
    // 5 L a day: two hours took 0.42 L.
    expect(before).toMatchObject({ kind: 'level', levelL: expect.closeTo(20 - 5 / 12, 2) });
    expect(after).toMatchObject({ kind: 'level', levelL: expect.closeTo(8 - 5 / 12, 2) });
    expect((after?.at ?? 0) - (before?.at ?? 0)).toBe(1000);
    const due = farm.db.select().from(tasks).all();
    expect(due.map(({ title }) => title)).toEqual([1, 4, 24].map((hours) => `Test after the overfill, ${hours} h`));
    expect((await grower.get(`/api/systems/${systemId}/overfill`)).body.recent).toHaveLength(1);
  });

  it('when it ran in, counts as given at once but not as evaporation', async () => {
    const { farm, systemId, grower } = await aFarm();
    const before = await planOf(grower, systemId);
    farm.wait(2 * MS_PER_HOUR);
    await grower.post(`/api/systems/${systemId}/overfills`).send({ litres: 12 });

    const { facts } = await planOf(grower, systemId);

    expect(facts.evaporationLPerDay).toBeCloseTo(before.facts.evaporationLPerDay ?? NaN, 1);
    expect(facts.level?.meqL).toBeGreaterThan((before.facts.level?.meqL ?? 0) + 0.1);
  });

  it('when no litres are told, all above the intake ran in', async () => {
    const { systemId, grower } = await aFarm();
    const { body } = await grower.post(`/api/systems/${systemId}/overfills`).send({});
    expect(body.litres).toBeCloseTo(20, 6);
  });

  it('when more is told than stood in it, or nothing is there, is refused at the field', async () => {
    const { farm, systemId, onlineId, grower } = await aFarm();
    const more = await grower.post(`/api/systems/${systemId}/overfills`).send({ litres: 40 });
    expect(more.status).toBe(400);
    expect(more.body.fields[0].path).toBe('litres');
    givenLevel(farm, onlineId, 0);
    expect((await grower.post(`/api/systems/${systemId}/overfills`).send({})).status).toBe(400);
    expect(farm.db.select().from(overfills).all()).toEqual([]);
  });

  it('when it is taken back, the level stands as before and the tests are off', async () => {
    const { farm, systemId, grower } = await aFarm();
    const { body } = await grower.post(`/api/systems/${systemId}/overfills`).send({ litres: 12 });

    const reply = await grower.delete(`/api/overfills/${body.id}`);

    expect(reply.status).toBe(200);
    expect((await grower.get(`/api/systems/${systemId}/overfill`)).body).toMatchObject({ litres: 20, recent: [] });
    expect(
      farm.db
        .select()
        .from(tasks)
        .all()
        .every(({ endedAt }) => endedAt !== null),
    ).toBe(true);
    expect((await grower.delete(`/api/overfills/${body.id}`)).status).toBe(404);
  });

  it('when something was logged for the reservoir since, is not taken back', async () => {
    const { farm, systemId, onlineId, grower } = await aFarm();
    const { body } = await grower.post(`/api/systems/${systemId}/overfills`).send({ litres: 12 });
    farm.wait(MS_PER_HOUR);
    givenLevel(farm, onlineId, 7.5);
    expect((await grower.delete(`/api/overfills/${body.id}`)).status).toBe(409);
  });
});
