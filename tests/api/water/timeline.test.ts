import { expect, it } from 'vitest';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import { startFarm } from '../../support/start-farm.ts';
import {
  givenChangeOver,
  givenLevel,
  givenReading,
  givenRefill,
  givenReservoir,
  givenSystem,
} from '../../support/given-water.ts';

const DAY = 86_400_000;

it('when a system was tested and fed, its timeline holds readings with errors, limewater and changeovers', async () => {
  const farm = await startFarm();
  const systemId = givenSystem(farm, { bands: [{ parameter: 'alkalinity', low: 2.7, high: 3.2 }] });
  const reservoirId = givenReservoir(farm, systemId);
  const start = farm.deps.clock.now();
  givenRefill(farm, reservoirId, { at: start });
  givenChangeOver(farm, reservoirId, start + 1000);
  farm.wait(2 * DAY);
  givenReading(farm, systemId, 8.2, { takenAt: start + DAY });
  givenReading(farm, systemId, 430, { parameter: 'calcium', unit: 'mg/L', takenAt: start + DAY });
  givenLevel(farm, reservoirId, 40, start + DAY);
  const viewer = await farm.as('viewer');

  const { body } = await viewer.get(`/api/systems/${systemId}/timeline?parameters=alkalinity`);

  expect(body.series).toHaveLength(1);
  expect(body.series[0]).toMatchObject({ parameter: 'alkalinity', total: 1, band: { low: 2.7, high: 3.2 } });
  expect(body.series[0].points[0].value).toBeCloseTo(8.2 * MEQ_PER_DKH, 9);
  expect(body.series[0].points[0].error).toBeGreaterThan(0);
  expect(body.limewater).toMatchObject([{ to: start + DAY, litres: 10 }]);
  expect(body.changeOvers).toMatchObject([{ at: start + 1000 }]);
});

it('when a stretch of time is asked for, only what lies in it comes', async () => {
  const farm = await startFarm();
  const systemId = givenSystem(farm);
  const start = farm.deps.clock.now();
  farm.wait(10 * DAY);
  for (let day = 0; day < 10; day += 1) givenReading(farm, systemId, 8, { takenAt: start + day * DAY });
  const viewer = await farm.as('viewer');

  const { body } = await viewer.get(`/api/systems/${systemId}/timeline?from=${start + DAY}&to=${start + 3 * DAY}`);

  expect(body.series[0].points.map(({ at }: { at: number }) => (at - start) / DAY)).toEqual([1, 2, 3]);
  expect(body).toMatchObject({ from: start + DAY, to: start + 3 * DAY });
});

it.each([
  ['parameters=wishes', 'parameters'],
  ['from=200&to=100', 'to'],
  ['from=0&to=900000000000', 'from'],
])('when a timeline is asked for with %s, the message stands at %s', async (query, path) => {
  const farm = await startFarm();
  const systemId = givenSystem(farm);
  const viewer = await farm.as('viewer');

  const { status, body } = await viewer.get(`/api/systems/${systemId}/timeline?${query}`);

  expect(status).toBe(400);
  expect(body.fields).toMatchObject([{ path }]);
});

it('when a timeline is saved as a file, every reading and act is a line in the order of time', async () => {
  const farm = await startFarm();
  const systemId = givenSystem(farm);
  const reservoirId = givenReservoir(farm, systemId, { code: 'LW-T' });
  const start = farm.deps.clock.now();
  givenRefill(farm, reservoirId, { at: start });
  givenChangeOver(farm, reservoirId, start + 1000);
  farm.wait(DAY);
  givenReading(farm, systemId, 2.9, { unit: 'meq/L', takenAt: start + DAY / 2 });
  const viewer = await farm.as('viewer');

  const { text } = await viewer.get(`/api/systems/${systemId}/timeline/export`);

  const lines = text.trim().split('\r\n');
  expect(lines).toHaveLength(3);
  expect(lines[1]).toContain('put online');
  expect(lines[2]).toMatch(/alkalinity,2\.9,meq\/L,0\.\d+,/);
});
