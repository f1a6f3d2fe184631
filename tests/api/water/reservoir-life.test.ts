import { expect, it } from 'vitest';
import { farms, reservoirEvents } from '../../../server/db/schema/index.ts';
import { systemUse } from '../../../server/queries/reservoir-use.ts';
import { aReservoir, reservoirIn } from '../../support/a-reservoir.ts';
import { givenChangeOver, givenLevel, givenRefill, givenReservoir } from '../../support/given-water.ts';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;

it('when only what stands above the intake may be drawn, it runs dry earlier', async () => {
  const { farm, reservoirId } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 60 });
  givenChangeOver(farm, reservoirId);
  farm.wait(2 * DAY);
  givenLevel(farm, reservoirId, 40);
  const grower = await farm.as('grower');

  const { body } = await grower.get(`/api/reservoirs/${reservoirId}`);

  // 10 L a day; 6 of the 40 L lie below the intake.
  expect(body).toMatchObject({ belowIntakeL: 6, usableL: 34 });
  expect(body.emptyAt).toBe(farm.deps.clock.now() + 3.4 * DAY);
});

it('when plain water is added, the strength thins by the litres and the state stays', async () => {
  const { farm, reservoirId, act } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 40, limeG: 40 });
  givenChangeOver(farm, reservoirId);
  farm.wait(DAY);

  const reply = await act('top-ups', { levelBeforeL: 30, waterL: 20 });

  expect(reply.status).toBe(201);
  expect(reply.body.reservoir).toMatchObject({ state: 'online', levelL: 50 });
  // 40 g × 0.95 / 74.092 × 2 eq in 40 L = 25.643 meq/L; 30 of 50 L of it.
  expect(reply.body.reservoir.alkalinityMeqL).toBeCloseTo((25.643 * 30) / 50, 2);
});

it('when a check finds less than was mixed, that stands in it from now on and low strength is told', async () => {
  const { farm, reservoirId, act } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 40, limeG: 80 });

  const reply = await act('strength-checks', { conductivityMsCm: 5.4, freshMsCm: 10 });

  expect(reply.status).toBe(201);
  // Half of 40.3 meq/L: half strength reads 54 % of full (PHREEQC with phreeqc.dat).
  expect(reply.body.reservoir.alkalinityMeqL).toBeCloseTo(20.15, 0);
  expect(reply.body.reservoir.strengthLow).toBe(true);
  expect(reply.body.event.strengthLeft).toBeCloseTo(0.5, 2);
  expect(farm.db.select().from(farms).get()?.settings).toMatchObject({ freshLimewaterMsCm: 10 });
});

it('when no fresh reading was ever taken, a check asks for it; afterwards it is remembered', async () => {
  const { farm, reservoirId, act } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 40, limeG: 80 });

  const first = await act('strength-checks', { conductivityMsCm: 9 });
  await act('strength-checks', { conductivityMsCm: 9.8, freshMsCm: 10 });
  const third = await act('strength-checks', { conductivityMsCm: 9.9 });

  expect(first.status).toBe(400);
  expect(first.body.fields[0].path).toBe('freshMsCm');
  expect(third.body.event).toMatchObject({ freshMsCm: 10 });
});

it('when vinegar is in the mix, a check is kept but the strength stays', async () => {
  const { farm, reservoirId, act } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 40, limeG: 80, vinegarMl: 200 });
  const before = reservoirIn(farm, reservoirId)?.alkalinityMeqL;

  const { body } = await act('strength-checks', { conductivityMsCm: 7, freshMsCm: 10 });

  expect(body.reservoir).toMatchObject({ alkalinityMeqL: before, strengthLow: false, lastCheck: null });
  expect(body.event.strengthLeft).toBeNull();
});

it('when sludge is taken out, nobody got it and the next removal is due in six weeks', async () => {
  const { farm, systemId, reservoirId, act } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 60 });
  givenChangeOver(farm, reservoirId);
  farm.wait(DAY);

  const reply = await act('sludge-removals', { levelBeforeL: 50, levelL: 42 });

  expect(reply.body.reservoir).toMatchObject({ state: 'online', levelL: 42 });
  expect(reply.body.reservoir.sludgeDueAt).toBe(farm.deps.clock.now() + 42 * DAY);
  const used = systemUse(farm.db, systemId, farm.deps.clock.now(), 7).flatMap(({ intervals }) => intervals);
  expect(used.map(({ litres }) => litres)).toEqual([10]);
});

it('when it is marked spent, its system stands without; when cleaned, it is empty and stands by', async () => {
  const { farm, reservoirId, act } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 60 });
  givenChangeOver(farm, reservoirId);

  const busy = await act('cleanings', {});
  const spent = await act('spent', { levelL: 20 });
  const again = await act('spent', {});
  const cleaned = await act('cleanings', {});

  expect([busy.status, spent.status, again.status, cleaned.status]).toEqual([409, 201, 409, 201]);
  expect(spent.body.reservoir).toMatchObject({ state: 'spent', levelL: 20, onlineSince: null });
  expect(cleaned.body.reservoir).toMatchObject({ state: 'standby', levelL: 0, alkalinityMeqL: 0 });
  expect(cleaned.body.event).toMatchObject({ levelBeforeL: 20, levelL: 0 });
});

it.each([
  ['top-ups', { waterL: 50 }, 'waterL'],
  ['top-ups', { waterL: -1 }, 'waterL'],
  ['sludge-removals', { levelBeforeL: 20, levelL: 30 }, 'levelL'],
  ['sludge-removals', { levelBeforeL: 70, levelL: 30 }, 'levelBeforeL'],
  ['strength-checks', { conductivityMsCm: 0, freshMsCm: 10 }, 'conductivityMsCm'],
  ['strength-checks', { conductivityMsCm: 90, freshMsCm: 10 }, 'conductivityMsCm'],
  ['strength-checks', { conductivityMsCm: 15, freshMsCm: 10 }, 'conductivityMsCm'],
  ['spent', { levelL: 70 }, 'levelL'],
  ['cleanings', { levelBeforeL: 61 }, 'levelBeforeL'],
])('when %s get %o, it is refused at %s and nothing is written', async (path, body, field) => {
  const { farm, reservoirId, act } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 30 });

  const reply = await act(path, body);

  expect(reply.status).toBe(400);
  expect(reply.body.fields[0].path).toBe(field);
  expect(farm.db.select().from(reservoirEvents).all()).toHaveLength(1);
});

it('when a changeover says how it is set up, that is what holds; nothing above the intake goes online', async () => {
  const { farm, reservoirId, act } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 12 });

  const refused = await act('changeovers', { intakeMm: 90 });
  const reply = await act('changeovers', { intakeMm: 30, covered: false });

  expect(refused.status).toBe(409);
  expect(refused.body.fields[0].path).toBe('intakeMm');
  expect(reply.body.reservoir).toMatchObject({ intakeMm: 30, covered: false, belowIntakeL: 4.5, usableL: 7.5 });
  expect(reply.body.event).toMatchObject({ intakeMm: 30, covered: false });
});

it.each([
  ['top-ups', { waterL: 10 }],
  ['strength-checks', { conductivityMsCm: 6, freshMsCm: 10 }],
  ['sludge-removals', { levelL: 30 }],
  ['spent', { levelL: 35 }],
  ['levels', { levelL: 33 }],
])('when %s are taken back, it is as it was before', async (path, body) => {
  const { farm, reservoirId, act } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 50, limeG: 50 });
  givenChangeOver(farm, reservoirId);
  const before = reservoirIn(farm, reservoirId);
  farm.wait(HOUR);
  const { body: done } = await act(path, body);

  const reply = await act('undo', { eventId: (done.event ?? done).id });

  expect(reply.status).toBe(200);
  expect(reservoirIn(farm, reservoirId)).toEqual({ ...before, version: (before?.version ?? 0) + 2 });
});

it('when another went online since, a stop can not be taken back', async () => {
  const { farm, systemId, reservoirId, act } = await aReservoir();
  givenRefill(farm, reservoirId, { waterL: 50 });
  givenChangeOver(farm, reservoirId);
  const { body: spent } = await act('spent', {});
  const other = givenReservoir(farm, systemId);
  givenRefill(farm, other);
  givenChangeOver(farm, other);

  const reply = await act('undo', { eventId: spent.event.id });

  expect(reply.status).toBe(409);
  expect(reservoirIn(farm, reservoirId)?.state).toBe('spent');
});
