import { expect, it } from 'vitest';
import { readingImports, readings } from '../../../server/db/schema/index.ts';
import { IMPORT_MAX_BYTES } from '../../../shared/contracts/reading-imports.ts';
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
    { role: 'calcium', unit: 'mg/L' },
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

  const large = await send(grower, '/api/reading-imports/preview', 'x'.repeat(IMPORT_MAX_BYTES + 1));
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

it('when times fall where the clocks go forward, says so; where they go back, takes the first and counts them', async () => {
  const { grower } = await importFarm();
  const file = [
    'taken,system,alk dKH',
    '2025-03-30 01:30,B,8.2',
    '2025-10-26 01:30,B,8.3',
    '2025-10-26T01:30Z,B,8.4',
  ].join('\n');

  const { body } = await send(grower, '/api/reading-imports/preview', file);

  expect(body).toMatchObject({ readings: 2, badRows: 1, twiceTimes: 1 });
  expect(body.problems[0].message).toMatch(/never was in Europe\/Lisbon: the clocks went forward/);
  expect(body.first.map(({ takenAt }: { takenAt: number }) => takenAt)).toEqual([
    Date.parse('2025-10-26T00:30:00Z'),
    Date.parse('2025-10-26T01:30:00Z'),
  ]);
});

it('when another time zone is chosen, times without an offset are by its clocks; a made-up zone is refused', async () => {
  const { farm, grower } = await importFarm();
  const file = 'taken,system,alk dKH\n2026-02-01 08:00,B,8.2\n';
  const { body } = await send(grower, '/api/reading-imports/preview', file);

  await send(grower, '/api/reading-imports', file, {
    mapping: JSON.stringify({ ...body.mapping, timeZone: 'America/New_York' }),
  });
  const odd = await send(grower, '/api/reading-imports', file, {
    mapping: JSON.stringify({ ...body.mapping, timeZone: 'Moon/Crater' }),
  });

  expect(farm.db.select().from(readings).all()[0]?.takenAt).toBe(Date.parse('2026-02-01T13:00:00Z'));
  expect(odd.status).toBe(400);
});

it('when a file groups thousands, the mark before its decimals is recognised', async () => {
  const { grower } = await importFarm();
  const point = 'taken,system,mg\n2026-02-01 08:00,B,"1,345"\n';
  const comma = 'taken;system;mg;po4\n2026-02-01 08:00;B;1.345;0,045\n';

  const first = await send(grower, '/api/reading-imports/preview', point);
  const second = await send(grower, '/api/reading-imports/preview', comma);

  expect(first.body).toMatchObject({ mapping: { decimalMark: 'point' }, first: [{ value: 1345 }] });
  expect(second.body).toMatchObject({ mapping: { decimalMark: 'comma' }, first: [{ value: 1345 }, { value: 0.045 }] });
});

it('when a value can not be, its row says what was probably meant', async () => {
  const { grower } = await importFarm();

  const { body } = await send(grower, '/api/reading-imports/preview', 'taken,system,alk dKH\n2026-02-01 08:00,B,83\n');

  expect(body.problems).toEqual([
    { line: 2, column: 'alk dKH', message: expect.stringMatching(/Did you mean 8\.3 dKH\?/) },
  ]);
});

it('when rows are left out, they can be had as a file of their own, mended and imported again', async () => {
  const { farm, grower } = await importFarm();
  const file = 'taken,system,alk dKH\n2026-02-01 08:00,B,8.2\n2026-02-02 08:00,Z,8.3\n';
  const { body } = await send(grower, '/api/reading-imports/preview', file);
  const mapping = JSON.stringify(body.mapping);
  await send(grower, '/api/reading-imports', file, { mapping });

  const left = await send(grower, '/api/reading-imports/problems', file, { mapping });
  expect(left.headers['content-disposition']).toContain('rows-left-out.csv');
  expect(left.text).toContain('2026-02-02 08:00,Z,8.3,3,There is no system “Z”.');
  const mended = left.text.replace(',Z,', ',B,');
  const again = await send(grower, '/api/reading-imports/preview', mended);
  await send(grower, '/api/reading-imports', mended, { mapping: JSON.stringify(again.body.mapping) });

  expect(farm.db.select().from(readings).all()).toHaveLength(2);
});

it('when readings are exported, the file can be imported again: all of it is there already, and it restores what is lost', async () => {
  const { farm, systemId, grower } = await importFarm();
  const takenAt = Date.parse('2026-02-01T08:00:00Z');
  givenReading(farm, systemId, 8.2, { takenAt, method: 'Photometer', note: '=1+1' });
  givenReading(farm, systemId, 1345, { parameter: 'magnesium', unit: 'mg/L', takenAt });
  givenReading(farm, systemId, 1.0261, { parameter: 'salinity', unit: 'sg', takenAt });
  const before = farm.db.select().from(readings).all();
  const { text } = await grower.get('/api/readings/export');

  const known = await send(grower, '/api/reading-imports/preview', text);
  farm.db.delete(readings).run();
  const { body } = await send(grower, '/api/reading-imports', text, { mapping: JSON.stringify(known.body.mapping) });

  expect(known.body).toMatchObject({ readings: 0, duplicates: 3, badRows: 0 });
  expect(body).toMatchObject({ state: 'finished', readings: 3 });
  const after = farm.db.select().from(readings).all();
  const facts = (rows: typeof before) =>
    rows.map(({ parameter, value, method, note, by, takenAt: at }) => ({ parameter, value, method, note, by, at }));
  expect(facts(after)).toEqual(facts(before));
});
