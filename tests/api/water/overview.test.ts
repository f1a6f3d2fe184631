import { expect, it } from 'vitest';
import { startFarm } from '../../support/start-farm.ts';
import { givenReading, givenSystem } from '../../support/given-water.ts';

const DAY = 86_400_000;
const BAND = { parameter: 'alkalinity', low: 2.7, high: 3.2 } as const;

it('when systems are looked at, the one that is out of its band comes first, an untested one last', async () => {
  const farm = await startFarm();
  const [untested, good, low] = ['A', 'B', 'C'].map((code) => givenSystem(farm, { code, bands: [BAND] }));
  givenReading(farm, good ?? '', 2.9, { unit: 'meq/L' });
  givenReading(farm, low ?? '', 2.5, { unit: 'meq/L' });
  const viewer = await farm.as('viewer');

  const { body } = await viewer.get('/api/water');

  expect(body.items.map(({ system }: { system: { id: string } }) => system.id)).toEqual([low, good, untested]);
});

it('when a system was tested for months, its small picture tells of the last thirty days alone', async () => {
  const farm = await startFarm();
  const systemId = givenSystem(farm);
  const start = farm.deps.clock.now();
  farm.wait(60 * DAY);
  for (let day = 0; day <= 60; day += 10) givenReading(farm, systemId, 8 + day / 100, { takenAt: start + day * DAY });
  const viewer = await farm.as('viewer');

  const { body } = await viewer.get('/api/water');

  expect(body.items[0].recent.map(({ at }: { at: number }) => (at - start) / DAY)).toEqual([30, 40, 50, 60]);
  expect(body.to - body.from).toBe(30 * DAY);
});
