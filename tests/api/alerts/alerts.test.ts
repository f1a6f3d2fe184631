import { describe, expect, it } from 'vitest';
import { auditLog } from '../../../server/db/schema/index.ts';
import { raiseAlerts } from '../../../server/jobs/raise-alerts.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import { givenTask } from '../../support/given-tasks.ts';
import {
  givenChangeOver,
  givenLevel,
  givenReading,
  givenRefill,
  givenReservoir,
  givenSystem,
} from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
/** 7.5 to 9 dKH. */
const BAND = [{ parameter: 'alkalinity' as const, low: 7.5 * MEQ_PER_DKH, high: 9 * MEQ_PER_DKH }];

async function alertsOf(farm: TestFarm, state: 'open' | 'closed' = 'open') {
  await raiseAlerts(farm.deps);
  return (await (await farm.as('grower')).get(`/api/alerts?state=${state}`)).body.items;
}

async function lowSystem(dkh = 7) {
  const farm = await startFarm();
  const systemId = givenSystem(farm, { code: 'D', bands: BAND });
  givenReading(farm, systemId, dkh);
  const [alert] = await alertsOf(farm);
  return { farm, systemId, alert };
}

describe('alerts', () => {
  it('when a reading is out of its band, one opens, and the same again opens no second', async () => {
    const { farm, systemId, alert } = await lowSystem();
    farm.wait(HOUR);
    givenReading(farm, systemId, 6.95);

    const open = await alertsOf(farm);

    expect(open).toHaveLength(1);
    expect(open[0]).toMatchObject({ id: alert.id, kind: 'out_of_band', systemCode: 'D', urgency: 'now' });
    expect(
      farm.db
        .select()
        .from(auditLog)
        .all()
        .filter(({ action }) => action === 'alert.opened'),
    ).toHaveLength(1);
  });

  it('when a reading ends it, it closes and says which', async () => {
    const { farm, systemId } = await lowSystem();
    farm.wait(HOUR);
    givenReading(farm, systemId, 8.2);

    expect(await alertsOf(farm)).toEqual([]);
    const [closed] = await alertsOf(farm, 'closed');
    expect(closed.closedAt).toBe(farm.deps.clock.now());
    expect(closed.ending[0]).toBe('Alkalinity was tested at ');
    expect(closed.ending[1].value).toBeCloseTo(8.2 * MEQ_PER_DKH, 9);
  });

  it('when a reading is back inside by a hair, it stays open, so that it does not flicker', async () => {
    const { farm, systemId, alert } = await lowSystem(7.4);
    farm.wait(HOUR);
    givenReading(farm, systemId, 7.55);
    const atTheEdge = await alertsOf(farm);
    farm.wait(HOUR);
    givenReading(farm, systemId, 7.7);

    expect(atTheEdge).toMatchObject([{ id: alert.id, urgency: 'today' }]);
    expect(await alertsOf(farm)).toEqual([]);
  });

  it('when someone knows, it is quiet on Today until it is worse by a step', async () => {
    const { farm, systemId, alert } = await lowSystem();
    const grower = await farm.as('grower');
    const onToday = async () => {
      await raiseAlerts(farm.deps);
      return (await grower.get('/api/today')).body;
    };

    const acknowledged = await grower.post(`/api/alerts/${alert.id}/acknowledgement`);
    const quiet = await onToday();
    farm.wait(HOUR);
    givenReading(farm, systemId, 6.9);
    const littleWorse = await onToday();
    farm.wait(HOUR);
    givenReading(farm, systemId, 6.5);
    const worse = await onToday();

    expect(acknowledged.body).toMatchObject({ acknowledgedBy: 'Test grower' });
    expect(acknowledged.body.quietUntil[0]).toBe('Quiet until it is ');
    expect(quiet).toMatchObject({ entries: [], quietAlerts: 1 });
    expect(littleWorse).toMatchObject({ entries: [], quietAlerts: 1 });
    expect(worse).toMatchObject({ entries: [{ id: `alkalinity-${systemId}`, alertId: alert.id }], quietAlerts: 0 });
  });

  it('when that was a slip, it is loud again at once', async () => {
    const { farm, alert } = await lowSystem();
    const grower = await farm.as('grower');
    await grower.post(`/api/alerts/${alert.id}/acknowledgement`);

    const reply = await grower.delete(`/api/alerts/${alert.id}/acknowledgement`);

    expect(reply.body).toMatchObject({ acknowledgedAt: null, quietUntil: [] });
    expect((await grower.get('/api/today')).body.entries).toHaveLength(1);
  });

  it('when a drift that someone knows of leaves the band, it is told of again', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm, { bands: BAND });
    const now = farm.deps.clock.now();
    givenReading(farm, systemId, 8.4, { takenAt: now - 3 * DAY });
    givenReading(farm, systemId, 7.8, { takenAt: now - HOUR });
    const [drift] = await alertsOf(farm);
    await (await farm.as('grower')).post(`/api/alerts/${drift.id}/acknowledgement`);
    farm.wait(HOUR);
    givenReading(farm, systemId, 7.45);

    expect(drift).toMatchObject({ kind: 'drifting', urgency: 'today' });
    expect(await alertsOf(farm)).toMatchObject([{ id: drift.id, kind: 'out_of_band', acknowledgedAt: null }]);
  });

  it('when readings wander within what tests may be off, no drift is told of', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm, { bands: BAND });
    const now = farm.deps.clock.now();
    [7.85, 7.65, 7.8, 7.6].forEach((value, index) => {
      givenReading(farm, systemId, value, { takenAt: now - (4 - index) * DAY + HOUR });
    });

    expect(await alertsOf(farm)).toEqual([]);
  });

  it('when a task asks for tests more seldom, the test counts as late from its day', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm, { bands: BAND });
    givenReading(farm, systemId, 8.2);
    const weekly = { every: 'weeks' as const, interval: 1, weekdays: [1] };
    givenTask(farm, { kind: 'test', systemId, parameter: 'alkalinity', repeat: weekly, startsOn: '2026-03-03' });
    farm.wait(5 * DAY);
    const before = await alertsOf(farm);
    farm.wait(3 * DAY);

    expect(before).toEqual([]);
    expect(await alertsOf(farm)).toMatchObject([{ kind: 'test_overdue' }]);
  });

  it('when a reservoir runs empty, it is told of at two days, a day and six hours, and ends with the changeover', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    const [online, standby] = [givenReservoir(farm, systemId), givenReservoir(farm, systemId)];
    givenRefill(farm, online);
    farm.wait(3 * HOUR);
    givenChangeOver(farm, online);
    farm.wait(DAY);
    givenLevel(farm, online, 30); // 20 L a day, so empty in 36 hours
    const [soon] = await alertsOf(farm);
    givenRefill(farm, standby);
    farm.wait(14 * HOUR);
    const [today] = await alertsOf(farm);
    farm.wait(17 * HOUR);
    const [now] = await alertsOf(farm);
    givenChangeOver(farm, standby);

    expect([soon, today, now].map(({ urgency }) => urgency)).toEqual(['soon', 'today', 'now']);
    expect(new Set([soon.id, today.id, now.id]).size).toBe(1);
    expect(await alertsOf(farm)).toEqual([]);
    expect((await alertsOf(farm, 'closed'))[0].kind).toBe('reservoir_empty');
  });

  it('when another stands ready, a reservoir that lasts more than a day is no news', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    const [online, standby] = [givenReservoir(farm, systemId), givenReservoir(farm, systemId)];
    for (const id of [online, standby]) givenRefill(farm, id);
    farm.wait(3 * HOUR);
    givenChangeOver(farm, online);
    farm.wait(DAY);
    givenLevel(farm, online, 30);

    expect(await alertsOf(farm)).toEqual([]);
  });

  it('when it has ended, nobody can say that they know of it; a viewer reads and changes nothing', async () => {
    const { farm, systemId, alert } = await lowSystem();
    const viewer = await farm.as('viewer');
    const read = await viewer.get('/api/alerts');
    const refused = await viewer.post(`/api/alerts/${alert.id}/acknowledgement`);
    farm.wait(HOUR);
    givenReading(farm, systemId, 8.2);
    await raiseAlerts(farm.deps);

    const late = await (await farm.as('owner')).post(`/api/alerts/${alert.id}/acknowledgement`);

    expect([read.status, refused.status, late.status]).toEqual([200, 403, 409]);
  });

  it('when history is long, it is read a page at a time, the newest first', async () => {
    const { farm, systemId } = await lowSystem();
    for (const dkh of [8.2, 7, 8.2, 7, 8.2]) {
      farm.wait(HOUR);
      givenReading(farm, systemId, dkh);
      await raiseAlerts(farm.deps);
    }
    const grower = await farm.as('grower');

    const first = (await grower.get('/api/alerts?state=closed&limit=2')).body;
    const second = (await grower.get(`/api/alerts?state=closed&limit=2&cursor=${first.nextCursor}`)).body;

    const closedAt = [...first.items, ...second.items].map((each) => each.closedAt);
    expect(first.total).toBe(3);
    expect(closedAt).toEqual([...closedAt].sort((a, b) => b - a));
    expect(closedAt).toHaveLength(3);
  });
});
