import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { IMPORT_MAX_BYTES } from '../../shared/contracts/reading-imports.ts';
import { multipart, type Part } from '../support/bad-input/multipart.ts';
import { faultOf, type Reply, Site } from '../support/bad-input/sweep.ts';
import { READINGS_FILE, workedFarm } from '../support/bad-input/worked-farm.ts';

const { farm, knownAt } = await workedFarm();
const site = new Site(farm);
/** Pictures have tests of their own. */
const endpoints = (await site.open()).filter(({ upload }) => upload?.types.includes('text/csv'));
const named = endpoints.map((endpoint) => [endpoint.path, endpoint] as const);

beforeEach(() => {
  site.renew();
});
afterAll(() => site.close());

const file = (content: string | Buffer, fields: Partial<Part> = {}): Part => ({
  ...{ name: 'file', content, fileName: 'log.csv', contentType: 'text/csv' },
  ...fields,
});

/** A preview may be given of a file of which nothing would be imported: it says why, row by row. */
function takenFault({ status, text, type }: Reply): string | null {
  if (status >= 400) return null;
  // The rows that would be left out, as a file: it holds a reason for each.
  if (type.startsWith('text/csv')) return text.includes('Left out because') ? null : `takes it: ${text.slice(0, 200)}`;
  const { readings, problems } = JSON.parse(text) as { readings: number; problems?: unknown[] };
  return readings === 0 && problems?.length ? null : `takes it: ${text.slice(0, 200)}`;
}

describe('a file that can be read', () => {
  it.each(named)('is taken by %s', async (_, endpoint) => {
    const mapping = { name: 'mapping', content: String(knownAt(endpoint).mapping) };
    const reply = await site.send(endpoint, { path: endpoint.path, ...multipart([mapping, file(READINGS_FILE)]) });

    expect(reply.status, reply.text).toBeLessThan(300);
  });
});

describe('a file that can not be read is refused with words, and nothing is written', () => {
  const good = file(READINGS_FILE);
  const zip = Buffer.concat([Buffer.from('PK\u0003\u0004'), Buffer.alloc(2000, 7)]);
  const uploads: Record<string, Part[]> = {
    'no file': [],
    'an empty file': [file('')],
    'blanks alone': [file(' \r\n \r\n')],
    'heads without rows': [file('Day,Alkalinity\n')],
    'bytes of a packed spreadsheet': [file(zip, { fileName: 'log.xlsx' })],
    'a picture that is called a table': [file(Buffer.from([0x89, 0x50, 0x4e, 0x47, 0, 0, 255, 254]))],
    'NUL characters': [file('Day,Alk\u0000alinity\n2026-02-10,8\u0000.1\n')],
    'one line of a megabyte': [file('x'.repeat(1_000_000))],
    'a hundred columns': [file(`${'a,'.repeat(100)}\n${'1,'.repeat(100)}\n`)],
    'a quote that never closes': [file('Day,Alkalinity\n"2026-02-10,8.1\n')],
    'a file past the limit': [file(Buffer.alloc(IMPORT_MAX_BYTES + 1, 'a'))],
    'a kind that is not taken': [file(READINGS_FILE, { contentType: 'application/pdf' })],
    'a picture': [file(READINGS_FILE, { fileName: 'log.png', contentType: 'image/png' })],
    'the wrong field': [file(READINGS_FILE, { name: 'table' })],
    'two files': [good, good],
    'a text where the file should be': [{ name: 'file', content: READINGS_FILE }],
    'a field that is not known': [{ name: 'extra', content: 'x' }, good],
    'sixty fields': [...Array.from({ length: 60 }, (_, index) => ({ name: `f${index}`, content: 'x' })), good],
    'a field past the limit': [{ name: 'note', content: 'x'.repeat(200_000) }, good],
  };

  it.each(named)('%s', async (_, endpoint) => {
    const faults: string[] = [];
    const mapping: Part = { name: 'mapping', content: String(knownAt(endpoint).mapping) };
    for (const [name, parts] of Object.entries(uploads)) {
      const reply = await site.send(endpoint, { path: endpoint.path, ...multipart([mapping, ...parts]) });
      const fault = faultOf(reply) ?? takenFault(reply);
      if (fault) faults.push(`${name}: ${fault}`);
    }

    expect(faults).toEqual([]);
  });
});

describe('a file whose columns are named wrongly is refused with words, and nothing is written', () => {
  const column = { role: 'day', unit: '' };
  const mappings: Record<string, string> = {
    'no JSON': '{',
    'an empty text': '',
    nothing: 'null',
    'no columns': '{"columns":[],"dateOrder":"ymd"}',
    'an unknown role': JSON.stringify({ columns: [{ role: 'moon', unit: '' }], dateOrder: 'ymd' }),
    'an unknown unit': JSON.stringify({
      columns: [column, { role: 'alkalinity', unit: 'furlong' }],
      dateOrder: 'ymd',
    }),
    'days alone': JSON.stringify({ columns: [column, column], dateOrder: 'ymd' }),
    'more columns than the file has': JSON.stringify({ columns: Array(30).fill(column), dateOrder: 'ymd' }),
    'a hundred columns': JSON.stringify({ columns: Array(100).fill(column), dateOrder: 'ymd' }),
    'a system that is not there': JSON.stringify({
      columns: [column, { role: 'alkalinity', unit: 'dKH' }],
      dateOrder: 'ymd',
      systemId: '00000000-0000-4000-8000-00000000dead',
    }),
    'a text of 50 kB': 'x'.repeat(50_000),
  };

  it.each(named)('%s', async (_, endpoint) => {
    const faults: string[] = [];
    for (const [name, content] of Object.entries(mappings)) {
      const parts = [{ name: 'mapping', content }, file(READINGS_FILE)];
      const reply = await site.send(endpoint, { path: endpoint.path, ...multipart(parts) });
      const fault = faultOf(reply) ?? takenFault(reply);
      if (fault) faults.push(`${name}: ${fault}`);
    }

    expect(faults).toEqual([]);
  });
});
