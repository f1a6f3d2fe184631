import { expect, it } from 'vitest';
import { auditLog, readingImportFiles, readingImports, readings } from '../../../server/db/schema/index.ts';
import { importReadings } from '../../../server/jobs/import-readings.ts';
import { givenReading, givenSystem } from '../../support/given-water.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

const START = Date.parse('2020-01-01T00:00:00Z');

/** A pH every minute from 2020. */
function minutes(count: number): string {
  const rows = Array.from({ length: count }, (_, index) => {
    const taken = new Date(START + index * 60_000).toISOString().slice(0, 16);
    return `${taken}Z,8.1`;
  });
  return ['taken,ph', ...rows].join('\n');
}

function send(client: TestClient, path: string, content: string, fields: Record<string, string> = {}) {
  const request = client.post(path);
  for (const [name, value] of Object.entries(fields)) void request.field(name, value);
  return request.attach('file', Buffer.from(content), { filename: 'log.csv', contentType: 'text/csv' });
}

async function importFarm() {
  const farm = await startFarm();
  const systemId = givenSystem(farm, { code: 'B' });
  return { farm, systemId, grower: await farm.as('grower') };
}

async function begun(grower: TestClient, systemId: string, file: string): Promise<string> {
  const { body } = await send(grower, '/api/reading-imports/preview', file, { systemId });
  const reply = await send(grower, '/api/reading-imports', file, { mapping: JSON.stringify(body.mapping) });
  return String(reply.body.id);
}

/** Runs the job and looks at the import each time that the job lets others have their turn. */
async function watched(farm: TestFarm, importId: string): Promise<{ state: string; rowsDone: number }[]> {
  const seen: { state: string; rowsDone: number }[] = [];
  let isOver = false;
  const job = importReadings(farm.deps).finally(() => {
    isOver = true;
  });
  while (!isOver) {
    const row = farm.db
      .select()
      .from(readingImports)
      .all()
      .find(({ id }) => id === importId);
    if (row) seen.push({ state: row.state, rowsDone: row.rowsDone });
    await new Promise((resolve) => setImmediate(resolve));
  }
  await job;
  return seen;
}

it('when a file of 20,000 rows is imported, it goes on after the answer in steps that others can see', async () => {
  const { farm, systemId, grower } = await importFarm();
  const importId = await begun(grower, systemId, minutes(20_000));
  expect((await grower.get(`/api/reading-imports/${importId}`)).body).toMatchObject({ state: 'waiting', readings: 0 });

  const seen = await watched(farm, importId);

  const steps = seen.filter(({ state }) => state === 'running').map(({ rowsDone }) => rowsDone);
  expect(new Set(steps).size).toBeGreaterThan(20);
  expect(steps).toEqual([...steps].sort((a, b) => a - b));
  const { body } = await grower.get(`/api/reading-imports/${importId}`);
  expect(body).toMatchObject({
    state: 'finished',
    rows: 20_000,
    rowsDone: 20_000,
    readings: 20_000,
    by: 'Test grower',
  });
  expect(farm.db.select().from(readings).all()).toHaveLength(20_000);
  expect(farm.db.select().from(readingImportFiles).all()).toEqual([]);
  const audited = farm.db
    .select()
    .from(auditLog)
    .all()
    .filter(({ entityId }) => entityId === importId);
  expect(audited).toMatchObject([{ action: 'reading_import.committed', actorName: 'Test grower' }]);
}, 60_000);

it('when an import is taken back while it runs, it stops and nothing of it is left', async () => {
  const { farm, systemId, grower } = await importFarm();
  const importId = await begun(grower, systemId, minutes(8000));
  const job = importReadings(farm.deps);
  while (farm.db.select().from(readings).all().length === 0) await new Promise((resolve) => setImmediate(resolve));

  const stopped = await grower.delete(`/api/reading-imports/${importId}`);
  await job;

  expect(stopped.status).toBe(200);
  expect(farm.db.select().from(readings).all()).toEqual([]);
  expect(farm.db.select().from(readingImports).all()).toEqual([]);
  expect((await grower.get(`/api/reading-imports/${importId}`)).status).toBe(404);
}, 60_000);

it('when the server was stopped half-way, the import begins anew and every value comes once', async () => {
  const { farm, systemId, grower } = await importFarm();
  const importId = await begun(grower, systemId, minutes(8000));
  // As a stop leaves it: under way, with some values stored.
  farm.db.update(readingImports).set({ state: 'running', rowsDone: 500, readings: 1 }).run();
  givenReading(farm, systemId, 8.1, { parameter: 'ph', unit: 'pH', takenAt: START });
  farm.db.update(readings).set({ importId }).run();

  await importReadings(farm.deps);

  expect((await grower.get(`/api/reading-imports/${importId}`)).body).toMatchObject({
    state: 'finished',
    readings: 8000,
  });
  expect(farm.db.select().from(readings).all()).toHaveLength(8000);
}, 60_000);

it('when a large file brings nothing new, the import fails with the reason and nothing is stored', async () => {
  const { farm, systemId, grower } = await importFarm();
  const file = minutes(8000);
  const first = await begun(grower, systemId, file);
  await importReadings(farm.deps);
  const second = await begun(grower, systemId, file);
  await importReadings(farm.deps);

  const { body } = await grower.get(`/api/reading-imports/${second}`);
  expect(body).toMatchObject({ state: 'failed', readings: 0 });
  expect(body.failure).toMatch(/brings no new reading/);
  expect(
    farm.db
      .select()
      .from(readings)
      .all()
      .every((each) => each.importId === first),
  ).toBe(true);
}, 60_000);

it('when a file has more rows than are allowed, says to split it', async () => {
  const { systemId, grower } = await importFarm();

  const more = await send(grower, '/api/reading-imports/preview', minutes(100_001), { systemId });

  expect(more.status).toBe(400);
  expect(more.body.fields[0].message).toMatch(/Split it/);
}, 60_000);
