import { expect, it } from 'vitest';
import { readingImports, readings } from '../../../server/db/schema/index.ts';
import { startFarm, type TestClient } from '../../support/start-farm.ts';
import { givenReading, givenSystem } from '../../support/given-water.ts';

const FILE = [
  'Date;Time;Tank;Alk (dKH);Ca mg/L;Temp °F;Comment',
  '01.03.2026;08:30;B;8,2;430;77;before lights',
  '28.02.2026;08:15;b;8,4;;77,5;',
  '',
].join('\r\n');

function send(client: TestClient, path: string, content: string | Buffer, fields: Record<string, string> = {}) {
  const request = client.post(path);
  for (const [name, value] of Object.entries(fields)) void request.field(name, value);
  return request.attach('file', Buffer.from(content), { filename: 'log.csv', contentType: 'text/csv' });
}

async function importFarm() {
  const farm = await startFarm();
  const systemId = givenSystem(farm, { code: 'B' });
  return { farm, systemId, grower: await farm.as('grower') };
}

it('when a file is previewed, its columns, units and dates are recognised and nothing is stored', async () => {
  const { farm, grower } = await importFarm();

  const { status, body } = await send(grower, '/api/reading-imports/preview', FILE);

  expect(status).toBe(200);
  expect(body.mapping.columns).toEqual([
    { role: 'day', unit: '' },
    { role: 'time', unit: '' },
    { role: 'system', unit: '' },
    { role: 'alkalinity', unit: 'dKH' },
    { role: 'calcium', unit: '' },
    { role: 'temperature', unit: 'F' },
    { role: 'note', unit: '' },
  ]);
  expect(body).toMatchObject({ rows: 2, readings: 5, duplicates: 0, badRows: 0, problems: [] });
  // Lisbon is on UTC in winter.
  expect(body.first[0]).toMatchObject({ line: 2, systemCode: 'B', takenAt: Date.parse('2026-03-01T08:30:00Z') });
  expect(body.mapping.dateOrder).toBe('dmy');
  expect(farm.db.select().from(readings).all()).toEqual([]);
});

it('when it is imported, all good rows are stored as one import in canonical units, and undone as one', async () => {
  const { farm, grower } = await importFarm();
  const preview = await send(grower, '/api/reading-imports/preview', FILE);
  const mapping = JSON.stringify(preview.body.mapping);

  const { status, body } = await send(grower, '/api/reading-imports', FILE, { mapping });

  expect(status).toBe(201);
  expect(body).toMatchObject({ fileName: 'log.csv', readings: 5, by: 'Test grower' });
  const stored = farm.db.select().from(readings).all();
  expect(stored).toHaveLength(5);
  expect(stored.every(({ importId }) => importId === body.id)).toBe(true);
  expect(stored.find(({ parameter }) => parameter === 'temperature')?.value).toBeCloseTo(25, 9);
  expect(stored[0]).toMatchObject({ note: 'before lights' });

  const undone = await grower.delete(`/api/reading-imports/${body.id}`);
  expect(undone.status).toBe(200);
  expect(farm.db.select().from(readings).all()).toEqual([]);
  expect(farm.db.select().from(readingImports).all()).toEqual([]);
});

it('when some rows are bad, the preview names their lines and reasons and the good ones are imported', async () => {
  const { farm, grower } = await importFarm();
  const file = [
    'taken,system,alkalinity dKH,pH',
    '2026-03-01 08:00,B,8.2,8.1',
    '2026-03-01 09:00,Z,8.2,',
    '2026-02-30 08:00,B,8.2,',
    '2026-03-01 10:00,B,eight,',
    '2026-03-01 11:00,B,82,8.1',
    '2026-12-24 08:00,B,8.2,',
    '2026-03-01 12:00,B,,',
  ].join('\n');

  const preview = await send(grower, '/api/reading-imports/preview', file);
  const commit = await send(grower, '/api/reading-imports', file, { mapping: JSON.stringify(preview.body.mapping) });

  expect(preview.body).toMatchObject({ rows: 7, readings: 2, badRows: 6 });
  expect(preview.body.problems.map(({ line }: { line: number }) => line)).toEqual([3, 4, 5, 6, 7, 8]);
  expect(preview.body.problems[2]).toMatchObject({ column: 'alkalinity dKH', message: '“eight” is no number.' });
  expect(commit.body.readings).toBe(2);
  expect(farm.db.select().from(readings).all()).toHaveLength(2);
});

it('when values are there already, they are left out; where another value is there, the row is refused', async () => {
  const { farm, systemId, grower } = await importFarm();
  const at = (text: string) => ({ takenAt: Date.parse(text) });
  givenReading(farm, systemId, 8.2, at('2026-03-01T08:00:00Z'));
  givenReading(farm, systemId, 8.2, at('2026-03-01T09:00:00Z'));
  const file = [
    'taken,alk dKH',
    '2026-03-01T08:00:00Z,8.2',
    '2026-03-01T09:00:00Z,7.9',
    '2026-03-01T10:00:00Z,8.1',
    '2026-03-01T10:00:00Z,8.1',
  ].join('\n');

  const { body } = await send(grower, '/api/reading-imports/preview', file, { systemId });

  expect(body).toMatchObject({ readings: 1, duplicates: 2, badRows: 1 });
  expect(body.problems[0]).toMatchObject({ line: 3, column: 'alkalinity' });
});

it('when the same file is imported twice, the second brings nothing and says so', async () => {
  const { farm, grower } = await importFarm();
  const { body } = await send(grower, '/api/reading-imports/preview', FILE);
  const mapping = JSON.stringify(body.mapping);
  await send(grower, '/api/reading-imports', FILE, { mapping });

  const second = await send(grower, '/api/reading-imports', FILE, { mapping });

  expect(second.status).toBe(409);
  expect(farm.db.select().from(readingImports).all()).toHaveLength(1);
});

it.each([
  ['a spreadsheet file', Buffer.from([0x50, 0x4b, 0, 4, 0, 0]), 'file'],
  ['an empty file', '', 'file'],
  ['a head alone', 'Date,Alk\n', 'file'],
  ['a hundred columns', `${'a,'.repeat(100)}b\n${'1,'.repeat(100)}2\n`, 'file'],
])('when the file is %s, says what to do', async (_, content, path) => {
  const { grower } = await importFarm();

  const reply = await send(grower, '/api/reading-imports/preview', content);

  expect(reply.status).toBe(400);
  expect(reply.body.fields[0].path).toBe(path);
});

it('when the file is too large or of another kind, refuses it; a made-up mapping gets a message', async () => {
  const { grower } = await importFarm();

  const large = await send(grower, '/api/reading-imports/preview', 'x'.repeat(5_000_001));
  const image = await grower
    .post('/api/reading-imports/preview')
    .attach('file', Buffer.from('x'), { filename: 'x.png', contentType: 'image/png' });
  const odd = await send(grower, '/api/reading-imports', FILE, { mapping: '{"columns":[]}' });
  const twice = await send(grower, '/api/reading-imports', 'a,b\n1,2\n', {
    mapping: JSON.stringify({ columns: [1, 2].map(() => ({ role: 'ph', unit: '' })), dateOrder: 'ymd' }),
  });

  expect([large.status, image.status, odd.status, twice.status]).toEqual([413, 415, 400, 400]);
  expect(odd.body.fields[0].path).toBe('mapping');
  expect(twice.body.fields[0].message).toMatch(/same meaning/);
});

it('when a file has as many rows as is allowed, it is imported whole; with one more it is refused', async () => {
  const { farm, systemId, grower } = await importFarm();
  const start = Date.parse('2020-01-01T00:00:00Z');
  const rows = Array.from(
    { length: 100_000 },
    (_, index) => `${new Date(start + index * 60_000).toISOString().slice(0, 16)}Z,8.1`,
  );
  const file = ['taken,ph', ...rows].join('\n');
  const { body } = await send(grower, '/api/reading-imports/preview', file, { systemId });

  const whole = await send(grower, '/api/reading-imports', file, { mapping: JSON.stringify(body.mapping) });
  const more = await send(grower, '/api/reading-imports/preview', `${file}\n2026-01-01T00:00Z,8.1`, { systemId });

  expect(whole.body.readings).toBe(100_000);
  expect(farm.db.select().from(readings).all()).toHaveLength(100_000);
  expect(more.status).toBe(400);
  expect(more.body.fields[0].message).toMatch(/Split it/);
}, 60_000);
