import { describe, expect, it } from 'vitest';
import { raiseAlerts } from '../../../server/jobs/raise-alerts.ts';
import type { TodayEntry } from '../../../shared/contracts/today.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import type { Role } from '../../../shared/permissions.ts';
import {
  fakePayments,
  givenOffer,
  givenOrder,
  givenPacked,
  givenPaidOrder,
  givenPicked,
} from '../../support/given-orders.ts';
import { givenCut, givenWithheld } from '../../support/given-stock.ts';
import { givenItem, givenLot, givenUse } from '../../support/given-supplies.ts';
import { givenReading, givenSystem } from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
/** 7.5 to 9 dKH. */
const BAND = [{ parameter: 'alkalinity' as const, low: 7.5 * MEQ_PER_DKH, high: 9 * MEQ_PER_DKH }];

async function todayFor(farm: TestFarm, role: Role = 'owner') {
  await raiseAlerts(farm.deps);
  const reply = await (await farm.as(role)).get('/api/today');
  expect(reply.status).toBe(200);
  return reply.body;
}

/** The words of an entry, with values and times left as they are stored. */
function words(parts: TodayEntry['title'] = []): string {
  return parts.map((part) => (typeof part === 'string' ? part : JSON.stringify(part))).join('');
}

function find(today: { entries: TodayEntry[] }, start: string): TodayEntry | undefined {
  return today.entries.find(({ id }) => id.startsWith(start));
}

describe('what needs doing today', () => {
  it('when the farm is new, nothing does', async () => {
    const farm = await startFarm();

    expect(await todayFor(farm)).toEqual({
      day: '2026-03-02',
      entries: [],
      frags: { saleable: 0, held: 0 },
      boxesToShip: 0,
      quietAlerts: 0,
    });
  });

  it('when alkalinity is below its band, it can not wait, and the viewer is shown it without being asked', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm, { code: 'D', name: 'Saltings', bands: BAND });
    const now = farm.deps.clock.now();
    givenReading(farm, systemId, 8, { takenAt: now - 2 * DAY });
    givenReading(farm, systemId, 6, { takenAt: now - HOUR });

    const entry = find(await todayFor(farm, 'grower'), 'alkalinity');

    expect(entry).toMatchObject({
      ...{ tone: 'brick', group: 'now' },
      act: { label: 'Test', to: `/water/log?system=${systemId}` },
    });
    expect(words(entry?.title)).toMatch(/^D Saltings: alkalinity /);
    expect(words(entry?.detail)).toMatch(/^Below its band.*; it fell by .* in 2 days\. Test again, then correct\.$/);
    expect(find(await todayFor(farm, 'viewer'), 'alkalinity')?.act).toEqual({
      label: 'See',
      to: `/water/systems/${systemId}`,
    });
  });

  it('when alkalinity is in its band but falls towards the end of it, a warning comes days before', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm, { bands: BAND });
    const now = farm.deps.clock.now();
    givenReading(farm, systemId, 8.4, { takenAt: now - 3 * DAY });
    givenReading(farm, systemId, 7.8, { takenAt: now - HOUR });

    const entry = find(await todayFor(farm), 'alkalinity');

    expect(entry).toMatchObject({ tone: 'ochre', group: 'today', act: { label: 'See' } });
    // 0.6 dKH in three days, and 0.3 above the low end at 7.5.
    expect(words(entry?.detail)).toMatch(/^It leaves its band in about a day; it fell by /);
  });

  it('when alkalinity is steady in its band, nothing is said', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm, { bands: BAND });
    const now = farm.deps.clock.now();
    for (const daysAgo of [3, 2, 1]) givenReading(farm, systemId, 8.2, { takenAt: now - daysAgo * DAY });

    expect((await todayFor(farm)).entries).toEqual([]);
  });

  it('when the last test is four days old, a test is due', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm, { bands: BAND });
    givenReading(farm, systemId, 8, { takenAt: farm.deps.clock.now() - 4 * DAY });

    const entry = find(await todayFor(farm), 'test');

    expect(entry).toMatchObject({ tone: 'ochre', group: 'today' });
    expect(words(entry?.detail)).toBe('The last test was 4 days ago.');
  });

  it('when a batch is withheld or promised beyond what is fit for sale, both are named', async () => {
    const farm = await startFarm();
    const offer = givenOffer(farm, { pieces: 10 });
    givenOrder(farm, [{ offer, quantity: 4 }]);
    givenWithheld(farm, { batchId: offer.batchId });

    const today = await todayFor(farm, 'sales');

    expect(find(today, 'short')).toMatchObject({ tone: 'brick', group: 'now' });
    expect(words(find(today, 'short')?.title)).toBe(`Batch ${offer.batchCode}: 4 promised, 0 fit for sale`);
    expect(find(today, 'withheld')?.act.to).toBe(`/stock/batches/${offer.batchId}`);
    expect(find(await todayFor(farm, 'grower'), 'short')).toBeUndefined();
  });

  it('when an order is paid, it is to pick; when packed, to ship', async () => {
    const farm = await startFarm({ payments: fakePayments() });
    const offer = givenOffer(farm, { pieces: 10 });
    const order = await givenPaidOrder(farm, [{ offer, quantity: 2 }]);
    const toPick = await todayFor(farm, 'sales');
    givenPicked(farm, order.id, offer.codes.slice(0, 2));
    givenPacked(farm, order.id);

    const toShip = await todayFor(farm, 'sales');

    expect(find(toPick, 'pick')).toMatchObject({
      group: 'today',
      act: { label: 'Pick', to: `/orders/${order.id}/pick` },
    });
    expect(toPick.frags).toEqual({ saleable: 10, held: 2 });
    expect(find(toShip, 'pick')).toBeUndefined();
    expect(find(toShip, 'ship')).toMatchObject({ act: { label: 'Ship' } });
    expect(toShip.boxesToShip).toBe(1);
    expect(await todayFor(farm, 'grower')).toMatchObject({ boxesToShip: null, entries: [] });
  });

  it('when cut pieces stand on no rack, they are to place', async () => {
    const farm = await startFarm();
    const cut = givenCut(farm, { pieces: 6, target: { kind: 'bench' } });

    const entry = find(await todayFor(farm, 'grower'), 'bench');

    expect(words(entry?.title)).toBe(`Place 6 of batch ${cut.batchCode}`);
  });

  it('when a supply is used up, it can not wait', async () => {
    const farm = await startFarm();
    const itemId = givenItem(farm);
    givenLot(farm, itemId, { quantity: 100, receivedOn: '2026-01-02' });
    givenUse(farm, itemId, 100, { at: farm.deps.clock.now() - DAY });

    const entry = find(await todayFor(farm, 'grower'), 'supply');

    expect(entry).toMatchObject({ tone: 'brick', group: 'now', act: { label: 'Order', to: `/supplies/${itemId}` } });
    expect(find(await todayFor(farm, 'sales'), 'supply')).toBeUndefined();
  });

  it('when a supply is short, its use is told in honest figures', async () => {
    const farm = await startFarm();
    const itemId = givenItem(farm, {
      kind: 'other',
      name: 'Heat packs',
      unit: 'piece',
      strength: null,
      leadTimeDays: 5,
    });
    const now = farm.deps.clock.now();
    givenLot(farm, itemId, { quantity: 22, receivedOn: '2026-01-02' });
    for (const daysAgo of [27, 20, 13, 6, 1]) givenUse(farm, itemId, 4, { at: now - daysAgo * DAY });

    const entry = find(await todayFor(farm, 'grower'), 'supply');

    // 20 in 28 days.
    expect(words(entry?.detail)).toBe('2 days left at 0.7 pieces a day, lead time 5 days.');
  });

  it('when much is to do, the most urgent comes first', async () => {
    const farm = await startFarm();
    givenSystem(farm, { bands: BAND });
    givenCut(farm, { pieces: 6, target: { kind: 'bench' } });
    const itemId = givenItem(farm);
    givenLot(farm, itemId, { quantity: 100, receivedOn: '2026-01-02' });
    givenUse(farm, itemId, 100, { at: farm.deps.clock.now() - DAY });

    const { entries } = await todayFor(farm);

    const order = ['now', 'today', 'soon'];
    const places = entries.map(({ group }: TodayEntry) => order.indexOf(group));
    expect(places).toEqual([...places].sort());
    expect(places.length).toBeGreaterThan(2);
    expect(entries[0].tone).toBe('brick');
  });

  it('when nobody is signed in or a store asks, it is not shown', async () => {
    const farm = await startFarm();

    expect((await farm.anyone().get('/api/today')).status).toBe(401);
    expect((await (await farm.as('buyer')).get('/api/today')).status).toBe(403);
  });
});
