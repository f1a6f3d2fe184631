import { expect, it } from 'vitest';
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

interface Page {
  items: { id: string; at: number; subject: string; title: unknown[] }[];
  nextBefore: number | null;
}

/** Ten days: a test of two parameters and a look at the level on each. */
function givenBusySystem(farm: TestFarm): string {
  const systemId = givenSystem(farm);
  const reservoirId = givenReservoir(farm, systemId, { code: 'LW-X' });
  const start = farm.deps.clock.now();
  givenRefill(farm, reservoirId, { at: start });
  givenChangeOver(farm, reservoirId, start + 1);
  for (let day = 1; day <= 10; day += 1) {
    farm.wait(DAY);
    givenReading(farm, systemId, 8, { takenAt: start + day * DAY });
    givenReading(farm, systemId, 430, { parameter: 'calcium', unit: 'mg/L', takenAt: start + day * DAY });
    givenLevel(farm, reservoirId, 50 - day, start + day * DAY);
  }
  return systemId;
}

it('when a system is looked back on, tests and limewater stand in one order of time, tests of one time together', async () => {
  const farm = await startFarm();
  const systemId = givenBusySystem(farm);
  const viewer = await farm.as('viewer');

  const page: Page = (await viewer.get(`/api/systems/${systemId}/log?limit=100`)).body;

  expect(page.items.map(({ at }) => at)).toEqual(page.items.map(({ at }) => at).sort((a, b) => b - a));
  expect(page.items).toHaveLength(22);
  expect(page.nextBefore).toBeNull();
  const test = page.items.find(({ subject }) => subject === 'readings');
  expect(test?.title).toEqual([
    'Alkalinity ',
    { quantity: 'alkalinity', value: expect.closeTo(2.853, 3) },
    ', calcium ',
    { quantity: 'calcium', value: 430 },
  ]);
  expect(page.items.at(-1)?.title[0]).toBe('LW-X');
});

it('when it is read page by page, every entry comes exactly once', async () => {
  const farm = await startFarm();
  const systemId = givenBusySystem(farm);
  const viewer = await farm.as('viewer');
  const whole: Page = (await viewer.get(`/api/systems/${systemId}/log?limit=100`)).body;

  const read: string[] = [];
  for (let before: number | null = Number.MAX_SAFE_INTEGER; before !== null;) {
    const { body }: { body: Page } = await viewer.get(
      `/api/systems/${systemId}/log?limit=3${before === Number.MAX_SAFE_INTEGER ? '' : `&before=${before}`}`,
    );
    read.push(...body.items.map(({ id }) => id));
    before = body.nextBefore;
  }

  expect(read).toEqual(whole.items.map(({ id }) => id));
});

it('when it is narrowed to one subject, nothing else comes', async () => {
  const farm = await startFarm();
  const systemId = givenBusySystem(farm);
  const viewer = await farm.as('viewer');

  const { body }: { body: Page } = await viewer.get(`/api/systems/${systemId}/log?subject=limewater&limit=100`);

  expect(new Set(body.items.map(({ subject }) => subject))).toEqual(new Set(['limewater']));
  expect(body.items).toHaveLength(12);
});
