import { expect, it } from 'vitest';
import type { Item } from '../../../shared/contracts/supplies.ts';
import { givenGlue, givenItem, givenLot, givenUse } from '../../support/given-supplies.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';
import {
  givenChangeOver,
  givenLevel,
  givenReading,
  givenRefill,
  givenReservoir,
  givenSystem,
} from '../../support/given-water.ts';

const DAY = 86_400_000;

async function look(farm: TestFarm, itemId: string): Promise<Item> {
  const viewer = await farm.as('viewer');
  return (await viewer.get(`/api/supplies/items/${itemId}`)).body as Item;
}

it('when less than a week is known, there is no rate and no advice to order', async () => {
  const farm = await startFarm();
  const itemId = givenGlue(farm);
  givenLot(farm, itemId);
  farm.wait(6 * DAY);
  givenUse(farm, itemId, 100);

  const item = await look(farm, itemId);

  expect(item).toMatchObject({ state: 'ok', use: { perDay: null, basis: 'none', taken: 100, takes: 1 } });
  expect(item.advice).toMatchObject({ daysLeft: null, orderByDay: null, orderPacks: 0 });
});

it('when something is taken often, its rate is the mean of four weeks', async () => {
  const farm = await startFarm({ now: '2026-01-01T09:00:00Z' });
  const itemId = givenGlue(farm, { leadTimeDays: 5, safetyDays: 5 });
  givenLot(farm, itemId, { quantity: 1000 });
  givenUse(farm, itemId, 500);
  farm.wait(40 * DAY);
  for (let day = 0; day < 28; day += 1) {
    givenUse(farm, itemId, 2, { at: farm.deps.clock.now() - day * DAY });
  }

  const item = await look(farm, itemId);

  expect(item.use).toMatchObject({
    basis: 'consumption',
    windowDays: 28,
    taken: 56,
    takes: 28,
    perDay: 2,
    sdPerDay: 0,
  });
  expect(item.onHand).toBe(444);
  // 222 days are left on 10 February; 10 of them are lead time and safety.
  expect(item.advice).toMatchObject({ daysLeft: 222, outDay: '2026-09-20', orderByDay: '2026-09-10' });
});

it('when something is taken seldom, its rate is the mean of eight weeks and its spread makes the buffer', async () => {
  const farm = await startFarm({ now: '2026-01-01T09:00:00Z' });
  const itemId = givenGlue(farm, { leadTimeDays: 9, safetyDays: 0 });
  givenLot(farm, itemId, { quantity: 500 });
  farm.wait(100 * DAY);
  for (const daysAgo of [10, 40]) givenUse(farm, itemId, 56, { at: farm.deps.clock.now() - daysAgo * DAY });

  const item = await look(farm, itemId);

  expect(item.use).toMatchObject({ windowDays: 56, taken: 112, takes: 2, perDay: 2 });
  // Two days of 56 and 54 of nothing: variance (2·54² + 54·2²) / 55.
  expect(item.use.sdPerDay).toBeCloseTo(Math.sqrt((2 * 54 ** 2 + 54 * 2 ** 2) / 55), 10);
  expect(item.advice.reorderPoint).toBeCloseTo(18 + 1.6448536269514722 * 3 * item.use.sdPerDay, 6);
});

it('when one take empties a lot and goes on in the next, it counts as one take', async () => {
  const farm = await startFarm({ now: '2026-01-01T09:00:00Z' });
  const itemId = givenGlue(farm);
  givenLot(farm, itemId, { quantity: 10 });
  givenLot(farm, itemId, { quantity: 10 });
  farm.wait(10 * DAY);
  givenUse(farm, itemId, 15);

  expect((await look(farm, itemId)).use).toMatchObject({ takes: 1, taken: 15, perDay: 15 / 11, windowDays: 11 });
});

it('when limewater is mixed, lime and vinegar are foretold by what the systems take, not by when they were mixed', async () => {
  const farm = await startFarm({ now: '2026-03-01T09:00:00Z' });
  const limeId = givenItem(farm, { leadTimeDays: 10, safetyDays: 4 });
  const vinegarId = givenItem(farm, { name: 'Vinegar', kind: 'vinegar', unit: 'mL', strength: 6 });
  givenLot(farm, limeId, { quantity: 1000 });
  givenLot(farm, vinegarId, { quantity: 5000 });
  const reservoirId = givenReservoir(farm, givenSystem(farm, { code: 'B' }));
  givenRefill(farm, reservoirId, { waterL: 50, limeG: 75, vinegarMl: 100 });
  farm.wait(DAY);
  givenChangeOver(farm, reservoirId);
  farm.wait(4 * DAY);
  givenLevel(farm, reservoirId, 30);
  farm.wait(4 * DAY);
  givenLevel(farm, reservoirId, 10);

  const [lime, vinegar] = [await look(farm, limeId), await look(farm, vinegarId)];

  // 40 L in 8 days at 1.5 g and 2 mL a litre.
  expect(lime.use).toMatchObject({
    basis: 'limewater',
    perDay: 7.5,
    systems: [{ systemCode: 'B', litresPerDay: 5, perLitre: 1.5, perDay: 7.5 }],
    taken: 75,
    demandPerDay: null,
  });
  expect(vinegar.use).toMatchObject({ basis: 'limewater', perDay: 10 });
  expect(lime.advice.daysLeft).toBeCloseTo(925 / 7.5, 9);
});

it('when two reservoirs of a system take turns, their use follows on and is not added up', async () => {
  const farm = await startFarm({ now: '2026-03-01T09:00:00Z' });
  const limeId = givenItem(farm);
  givenLot(farm, limeId, { quantity: 1000 });
  const systemId = givenSystem(farm);
  const [first, second] = [givenReservoir(farm, systemId), givenReservoir(farm, systemId)];
  for (const id of [first, second]) givenRefill(farm, id, { waterL: 50, limeG: 50 });
  farm.wait(DAY);
  givenChangeOver(farm, first);
  farm.wait(4 * DAY);
  givenChangeOver(farm, second, undefined, 10);
  farm.wait(4 * DAY);
  givenLevel(farm, second, 10);

  const { use } = await look(farm, limeId);

  // 80 L in 8 days: 10 L a day, at 1 g a litre.
  expect(use).toMatchObject({ perDay: 10, systems: [{ litresPerDay: 10, perLitre: 1 }] });
});

it('when the demand of a system is known, the powder that would bring all of it stands beside the rate', async () => {
  const farm = await startFarm({ now: '2026-03-01T09:00:00Z' });
  const limeId = givenItem(farm, { strength: 0.95 });
  const systemId = givenSystem(farm, { netVolumeL: 2000 });
  for (let day = 0; day < 6; day += 1) {
    givenReading(farm, systemId, 4 - 0.25 * day, { unit: 'meq/L' });
    farm.wait(DAY);
  }

  const { use } = await look(farm, limeId);

  // 0.25 meq/L a day in 2,000 L are 500 meq: 0.25 mol of hydroxide of 74.093 g, in powder of 95 %.
  expect(use.demandPerDay).toBeCloseTo((0.25 * 74.093) / 0.95, 1);
});

it('when supplies run down, each gets its word and the most urgent comes first', async () => {
  const farm = await startFarm({ now: '2026-01-01T09:00:00Z' });
  const stock = { enough: 1000, soon: 26, now: 15, gone: 10, unused: 5 };
  const ids = Object.entries(stock).map(([name, quantity]) => {
    const itemId = givenGlue(farm, { name, leadTimeDays: 7, safetyDays: 5, packSize: 10 });
    givenLot(farm, itemId, { quantity: quantity + (name === 'gone' ? 46 : 56) });
    return { name, itemId };
  });
  farm.wait(28 * DAY);
  for (const { name, itemId } of ids) {
    if (name === 'unused') continue;
    for (let day = 0; day < 28; day += 1) givenUse(farm, itemId, 2, { at: farm.deps.clock.now() - day * DAY });
  }
  const viewer = await farm.as('viewer');

  const { body } = await viewer.get('/api/supplies/items');
  const items = body.items as Item[];

  expect(items.map(({ name, state }) => [name, state])).toEqual([
    ['gone', 'out'],
    ['now', 'order_now'],
    ['soon', 'order_soon'],
    ['enough', 'ok'],
    ['unused', 'ok'],
  ]);
});
