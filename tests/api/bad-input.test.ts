import { afterAll, beforeEach, describe, expect, it, vi } from 'vitest';
import type { z } from 'zod';
import { type Endpoint, pathOf } from '../../shared/contracts/endpoint.ts';
import { BAD_PATH_PARTS, BAD_QUERY_VALUES, BAD_VALUES, jsonOf, RawJson } from '../support/bad-input/bad-values.ts';
import { leavesOf, pathNames, sampleOf, withValue } from '../support/bad-input/sample-request.ts';
import { faultOf, problemOf, type Reply, type Sent, Site } from '../support/bad-input/sweep.ts';
import { workedFarm } from '../support/bad-input/worked-farm.ts';

// Some endpoints hash a password for each of their many bad values, which takes long on a busy machine.
vi.setConfig({ testTimeout: 180_000 });

const { farm, known, knownAt } = await workedFarm();
const site = new Site(farm);
/** What the payment service signs is read after its signature alone; files have a sweep of their own. */
const endpoints = (await site.open()).filter(({ path, upload }) => !path.startsWith('/api/webhooks/') && !upload);
const json = { 'Content-Type': 'application/json' };

beforeEach(() => {
  site.renew();
});
afterAll(() => site.close());

interface Request {
  path: string;
  query: Record<string, unknown>;
  body: Record<string, unknown> | undefined;
}

/** A request that fits the contract and names records that exist. */
function goodRequest(endpoint: Endpoint, parts: Record<string, unknown> = {}): Request {
  const chosen = knownAt(endpoint);
  return {
    path: pathOf(endpoint, { ...known, ...chosen, ...parts }),
    query: sampleOf(endpoint.query, known, chosen),
    body: endpoint.body ? sampleOf(endpoint.body, known, chosen) : undefined,
  };
}

function sent(endpoint: Endpoint, { path, query, body }: Request, headers: Record<string, string> = {}): Sent {
  const search = new URLSearchParams(Object.entries(query).map(([name, value]) => [name, String(value)])).toString();
  return {
    path: search ? `${path}?${search}` : path,
    body: body === undefined ? undefined : jsonOf(body),
    headers: { ...(body ? json : {}), ...(endpoint.edits ? { 'If-Match': '"1"' } : {}), ...headers },
  };
}

/** What the contract itself refuses is answered with 400 and words at one of the fields that it refuses. */
function refusalFault(schema: z.ZodType | undefined, value: unknown, reply: Reply): string | null {
  const refused = schema?.safeParse(JSON.parse(jsonOf(value))).error?.issues ?? [];
  if (refused.length === 0) return null;
  if (reply.status !== 400) return `answers ${reply.status} where the contract refuses`;
  const told = (problemOf(reply.text)?.fields ?? []).map(({ path }) => path);
  return refused.some(({ path }) => told.some((each) => each.startsWith(path.join('.'))))
    ? null
    : `says that ${told.join(', ')} is wrong`;
}

const named = (list: readonly Endpoint[]) =>
  list.map((endpoint) => [endpoint.method, endpoint.path, endpoint] as const);
const withBody = endpoints.filter(({ body }) => body);

describe('before anything is spoilt', () => {
  /** Open to an empty farm and to a demo farm only. */
  const closedHere = ['/api/setup', '/api/session/demo'];

  it.each(named(endpoints.filter(({ path }) => !closedHere.includes(path))))(
    '%s %s takes its good request',
    async (_method, _path, endpoint) => {
      const reply = await site.send(endpoint, sent(endpoint, goodRequest(endpoint)));

      expect(reply.status, reply.text.slice(0, 600)).toBeLessThan(300);
    },
  );
});

describe('when one field is wrong, the request is refused with words at that field and nothing is written', () => {
  it.each(named(withBody))('%s %s', async (_method, _path, endpoint) => {
    const good = goodRequest(endpoint);
    const faults: string[] = [];
    const spoilt = [
      ...leavesOf(endpoint.body).flatMap((path) => [
        ...Object.entries(BAD_VALUES).map(([name, value]) => ({ path, name, value })),
        ...(path.at(-1) === 0 ? [] : [{ path, name: 'nothing at all', value: undefined }]),
      ]),
      { path: ['notKnown'], name: 'a field that is not known', value: 1 },
      { path: ['__proto__x'], name: 'a field with an odd name', value: new RawJson('{"__proto__":1}') },
    ];
    for (const { path, name, value } of spoilt) {
      const body = withValue(good.body, path, value) as Record<string, unknown>;
      const reply = await site.send(endpoint, sent(endpoint, { ...good, body }));
      const fault = faultOf(reply) ?? refusalFault(endpoint.body, body, reply);
      if (fault) faults.push(`${path.join('.')} = ${name}: ${fault}`);
    }

    expect(faults).toEqual([]);
  });
});

describe('when the body as a whole can not be read, it is refused and nothing is written', () => {
  const bodies: Record<string, Sent> = {
    'no body': { path: '', body: undefined, headers: {} },
    'a list': { path: '', body: '[]' },
    'a list of itself': { path: '', body: '[[1],[2]]' },
    'a text': { path: '', body: '"text"' },
    'a number': { path: '', body: '5' },
    nothing: { path: '', body: 'null' },
    'half of an object': { path: '', body: '{"a":' },
    'a comma too many': { path: '', body: '{"a":1,}' },
    'bytes that are no text': { path: '', body: Buffer.from([0x7b, 0xff, 0xfe, 0x00, 0x7d]) },
    'twenty thousand brackets': { path: '', body: '['.repeat(20_000) },
    'an object inside an object, five thousand times': {
      path: '',
      body: `${'{"a":'.repeat(5000)}1${'}'.repeat(5000)}`,
    },
    'more than a megabyte': { path: '', body: JSON.stringify({ note: 'x'.repeat(1_100_000) }) },
    'plain text': { path: '', body: '{}', headers: { 'Content-Type': 'text/plain' } },
    'a form': { path: '', body: 'code=A&name=B', headers: { 'Content-Type': 'application/x-www-form-urlencoded' } },
    'a multipart form without an end': {
      path: '',
      body: '--x\r\nContent-Disposition: form-data; name="code"\r\n\r\nA',
      headers: { 'Content-Type': 'multipart/form-data; boundary=x' },
    },
    'an unknown character set': {
      path: '',
      body: '{}',
      headers: { 'Content-Type': 'application/json; charset=ogham' },
    },
    'bytes that are said to be packed': { path: '', body: '{}', headers: { ...json, 'Content-Encoding': 'gzip' } },
    'an unknown packing': { path: '', body: '{}', headers: { ...json, 'Content-Encoding': 'parcel' } },
  };

  it.each(named(withBody))('%s %s', async (_method, _path, endpoint) => {
    const faults: string[] = [];
    const { path } = sent(endpoint, goodRequest(endpoint));
    const edits = endpoint.edits ? { 'If-Match': '"1"' } : {};
    const mayBeEmpty = endpoint.body?.safeParse({}).success;
    for (const [name, { body, headers = json }] of Object.entries(bodies)) {
      const reply = await site.send(endpoint, { path, body, headers: { ...edits, ...headers } });
      const fault = faultOf(reply) ?? (reply.status < 400 && !mayBeEmpty ? `takes it with ${reply.status}` : null);
      if (fault) faults.push(`${name}: ${fault}`);
    }

    expect(faults).toEqual([]);
  });
});

describe('when the address is wrong, it is refused with words', () => {
  it.each(named(endpoints.filter((endpoint) => pathNames(endpoint).length > 0)))(
    '%s %s',
    async (_method, _path, endpoint) => {
      const faults: string[] = [];
      for (const part of pathNames(endpoint)) {
        for (const [name, text] of Object.entries(BAD_PATH_PARTS)) {
          const parts = endpoint.path.replace(`:${part}`, () => text);
          const good = goodRequest(endpoint);
          const path = pathOf({ ...endpoint, path: parts as Endpoint['path'] }, { ...known, ...knownAt(endpoint) });
          const reply = await site.send(endpoint, sent(endpoint, { ...good, path }));
          const fault = faultOf(reply) ?? (reply.status < 400 ? `takes it with ${reply.status}` : null);
          if (fault) faults.push(`${part} = ${name}: ${fault}`);
        }
      }

      expect(faults).toEqual([]);
    },
  );

  it.each(named(endpoints.filter(({ query }) => query)))('%s %s, in its question', async (_method, _path, endpoint) => {
    const faults: string[] = [];
    const good = goodRequest(endpoint);
    for (const path of [...leavesOf(endpoint.query), ['notKnown']]) {
      for (const [name, value] of Object.entries(BAD_QUERY_VALUES)) {
        const query = withValue(good.query, path, value) as Record<string, unknown>;
        const reply = await site.send(endpoint, sent(endpoint, { ...good, query }));
        const fault = faultOf(reply) ?? refusalFault(endpoint.query, query, reply);
        if (fault) faults.push(`${path.join('.')} = ${name}: ${fault}`);
      }
      for (const odd of [
        `${String(path[0])}=1&${String(path[0])}=2`,
        `${String(path[0])}[a]=1`,
        '%E0%A4%A=1',
        '%00=1',
      ]) {
        const reply = await site.send(endpoint, { path: `${good.path}?${odd}` });
        const fault = faultOf(reply);
        if (fault) faults.push(`?${odd}: ${fault}`);
      }
    }

    expect(faults).toEqual([]);
  });
});

describe('when a header is wrong, it is refused with words', () => {
  it.each(named(endpoints.filter(({ edits }) => edits)))(
    '%s %s, with odd versions',
    async (_method, _path, endpoint) => {
      const good = goodRequest(endpoint);
      const answers: Record<string, number> = {};
      for (const version of ['', '1', '"0"', '"-1"', '"x"', '*', '"999999999999999"', '"1", "2"', 'x'.repeat(6000)]) {
        const reply = await site.send(endpoint, sent(endpoint, good, { 'If-Match': version }));
        expect(faultOf(reply), version).toBeNull();
        answers[version.slice(0, 20)] = reply.status;
      }

      expect(Object.values(answers).filter((status) => status !== 428 && status !== 412)).toEqual([]);
    },
  );

  it.each(named(endpoints.filter(({ creates }) => creates)))(
    '%s %s, with odd idempotency keys',
    async (_method, _path, endpoint) => {
      for (const key of ['', ' ', 'x'.repeat(6000), '"', '\u00ff', '__proto__']) {
        const reply = await site.send(endpoint, sent(endpoint, goodRequest(endpoint), { 'Idempotency-Key': key }));
        expect(faultOf(reply), key).toBeNull();
      }
    },
  );
});
