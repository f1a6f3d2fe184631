import { and, eq } from 'drizzle-orm';
import { expect, it } from 'vitest';
import { auditLog, readings } from '../../../server/db/schema/index.ts';
import { givenReading, givenSystem } from '../../support/given-water.ts';
import { startFarm } from '../../support/start-farm.ts';

const NOON = Date.parse('2026-03-01T12:00:00Z');

it('when values are logged in the units a person chose, they are stored in canonical units', async () => {
  const farm = await startFarm();
  const systemId = givenSystem(farm);
  const grower = await farm.as('grower');

  const reply = await grower.post('/api/readings').send({
    systemId,
    takenAt: NOON,
    values: [
      { parameter: 'alkalinity', value: 8.2, unit: 'dKH' },
      { parameter: 'temperature', value: 77, unit: 'F' },
      { parameter: 'calcium', value: 430, unit: 'mg/L' },
    ],
    method: 'photometer',
  });

  expect(reply.status).toBe(201);
  const stored = farm.db.select().from(readings).all();
  // 1 dKH = 20/56.077 meq/L, by arithmetic from atomic weights.
  expect(stored[0]).toMatchObject({ parameter: 'alkalinity', takenAt: NOON, method: 'photometer', by: 'Test grower' });
  expect(stored[0]?.value).toBeCloseTo((8.2 * 20) / 56.077, 9);
  expect(stored[1]?.value).toBeCloseTo(25, 9);
  expect(stored[2]?.value).toBe(430);
});

it.each([
  ['a value in the wrong unit', { parameter: 'alkalinity', value: 140, unit: 'dKH' }, /0\.8 to 28 dKH/],
  ['a unit that the parameter has not', { parameter: 'calcium', value: 430, unit: 'dKH' }, /mg\/L/],
  ['an impossible specific gravity', { parameter: 'salinity', value: 35, unit: 'sg' }, /SG/],
])('when one of the values is %s, says so at its field and logs none', async (_, bad, message) => {
  const farm = await startFarm();
  const systemId = givenSystem(farm);
  const grower = await farm.as('grower');

  const reply = await grower
    .post('/api/readings')
    .send({ systemId, values: [{ parameter: 'ph', value: 8.1, unit: 'pH' }, bad] });

  expect(reply.status).toBe(400);
  expect(reply.body.fields).toEqual([{ path: 'values.1.value', message: expect.stringMatching(message) }]);
  expect(farm.db.select().from(readings).all()).toEqual([]);
});

it.each([
  ['no value', { values: [] }, 'values'],
  ['text for a number', { values: [{ parameter: 'ph', value: 'eight', unit: 'pH' }] }, 'values.0.value'],
  ['a time to come', { takenAt: Date.parse('2026-03-03T00:00:00Z') }, 'takenAt'],
  ['an unknown field', { colour: 'blue' }, 'colour'],
  ['a huge note', { note: 'x'.repeat(3000) }, 'note'],
])('when readings come with %s, refuses at the field', async (_, fields, path) => {
  const farm = await startFarm();
  const systemId = givenSystem(farm);
  const grower = await farm.as('grower');

  const reply = await grower
    .post('/api/readings')
    .send({ systemId, values: [{ parameter: 'ph', value: 8.1, unit: 'pH' }], ...fields });

  expect(reply.status).toBe(400);
  expect(reply.body.fields.map((field: { path: string }) => field.path)).toContain(path);
  expect(farm.db.select().from(readings).all()).toEqual([]);
});

it('when the same parameter is logged twice for one time, refuses the second and keeps the first', async () => {
  const farm = await startFarm();
  const systemId = givenSystem(farm);
  givenReading(farm, systemId, 8.2, { takenAt: NOON });
  const grower = await farm.as('grower');

  const reply = await grower
    .post('/api/readings')
    .send({ systemId, takenAt: NOON, values: [{ parameter: 'alkalinity', value: 8.4, unit: 'dKH' }] });

  expect(reply.status).toBe(409);
  expect(reply.body.fields[0]).toMatchObject({ path: 'values.0.value' });
  expect(farm.db.select().from(readings).all()).toHaveLength(1);
});

it('when a reading is corrected, the audit log holds both values; a stale correction is refused', async () => {
  const farm = await startFarm();
  const readingId = givenReading(farm, givenSystem(farm), 8.2, { takenAt: NOON });
  const grower = await farm.as('grower');

  const corrected = await grower
    .patch(`/api/readings/${readingId}`)
    .set('If-Match', '"1"')
    .send({ value: 3, unit: 'meq/L' });
  const stale = await grower.patch(`/api/readings/${readingId}`).set('If-Match', '"1"').send({ note: 'late' });

  expect(corrected.body).toMatchObject({ value: 3, version: 2, takenAt: NOON });
  expect(stale.status).toBe(412);
  const [audited] = farm.db
    .select()
    .from(auditLog)
    .where(and(eq(auditLog.entityId, readingId), eq(auditLog.action, 'reading.changed')))
    .all();
  expect(audited).toMatchObject({ before: { version: 1 }, after: { value: 3 } });
});

it('when a reading is taken back, it is gone and the audit log tells what it was', async () => {
  const farm = await startFarm();
  const readingId = givenReading(farm, givenSystem(farm), 8.2);
  const grower = await farm.as('grower');

  const first = await grower.delete(`/api/readings/${readingId}`);
  const second = await grower.delete(`/api/readings/${readingId}`);

  expect([first.status, second.status]).toEqual([200, 404]);
  expect(farm.db.select().from(readings).all()).toEqual([]);
  expect(farm.db.select().from(auditLog).where(eq(auditLog.action, 'reading.removed')).all()).toMatchObject([
    { entityId: readingId, before: { parameter: 'alkalinity' } },
  ]);
});

it('when the list is read page by page, every reading comes once, newest first', async () => {
  const farm = await startFarm();
  const [one, two] = [givenSystem(farm), givenSystem(farm)];
  // Both systems at the same instants, so that the order among equals matters.
  for (let day = 0; day < 6; day += 1) {
    for (const systemId of [one, two]) givenReading(farm, systemId, 8, { takenAt: NOON - day * 86_400_000 });
  }
  const viewer = await farm.as('viewer');

  const seen: { id: string; takenAt: number }[] = [];
  for (let cursor: string | null = ''; cursor !== null;) {
    const reply = await viewer.get(`/api/readings?limit=5${cursor ? `&cursor=${cursor}` : ''}`);
    expect(reply.body.total).toBe(12);
    seen.push(...reply.body.items);
    cursor = reply.body.nextCursor;
  }

  expect(new Set(seen.map(({ id }) => id)).size).toBe(12);
  expect(seen.map(({ takenAt }) => takenAt)).toEqual([...seen.map(({ takenAt }) => takenAt)].sort((a, b) => b - a));
  expect((await viewer.get(`/api/readings?systemId=${one}`)).body.total).toBe(6);
  expect((await viewer.get('/api/readings?parameter=calcium')).body.total).toBe(0);
  expect((await viewer.get('/api/readings?cursor=made-up')).status).toBe(400);
});

it('when readings are exported, the file has one line each with formulas defused', async () => {
  const farm = await startFarm();
  const systemId = givenSystem(farm, { code: 'B' });
  givenReading(farm, systemId, 8.2, { takenAt: NOON, note: '=HYPERLINK("x")' });
  const viewer = await farm.as('viewer');

  const reply = await viewer.get(`/api/readings/export?systemId=${systemId}`);

  expect(reply.headers['content-disposition']).toContain('readings.csv');
  const lines = reply.text.trim().split('\r\n');
  expect(lines).toHaveLength(2);
  expect(lines[1]).toContain('2026-03-01T12:00:00.000Z,B,alkalinity,2.92');
  expect(lines[1]).toContain("'=HYPERLINK");
});

it('when a chart asks for a year of frequent readings, it gets at most 1,000 points and no spike is lost', async () => {
  const farm = await startFarm();
  const systemId = givenSystem(farm, { bands: [{ parameter: 'ph', low: 8, high: 8.4 }] });
  const now = farm.deps.clock.now();
  farm.write((write) => {
    const rows = Array.from({ length: 3000 }, (_, index) => ({
      ...{ id: write.newId(), systemId, parameter: 'ph', value: index === 1234 ? 9.4 : 8.1 },
      ...{ takenAt: now - index * 3_600_000, by: 'probe', createdAt: now },
    }));
    for (let start = 0; start < rows.length; start += 500) {
      write.tx
        .insert(readings)
        .values(rows.slice(start, start + 500))
        .run();
    }
  });
  const viewer = await farm.as('viewer');

  const seriesOf = async (days: number) => {
    const query = `parameters=ph&from=${now - days * 86_400_000}&to=${now}`;
    const { body } = await viewer.get(`/api/systems/${systemId}/timeline?${query}`);
    return body.series[0];
  };
  const [year, week] = [await seriesOf(365), await seriesOf(7)];

  expect(year.total).toBe(3000);
  expect(year.points.length).toBeLessThanOrEqual(1000);
  expect(Math.max(...year.points.map((point: { value: number }) => point.value))).toBe(9.4);
  expect(year.band).toEqual({ parameter: 'ph', low: 8, high: 8.4 });
  expect(week.points).toHaveLength(169);
});
