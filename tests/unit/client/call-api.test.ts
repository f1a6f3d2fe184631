import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import type { Endpoint } from '../../../shared/contracts/endpoint.ts';
import { connectApi } from '../../../src/api/api-context.ts';
import { callApi } from '../../../src/api/call-api.ts';
import { fileNameOf } from '../../../src/api/download.ts';

const make = {
  method: 'post',
  path: '/api/things/:id',
  access: 'account.own',
  summary: 'Make a thing',
  params: z.strictObject({ id: z.string() }),
  query: z.strictObject({ tag: z.array(z.string()).optional(), page: z.number().optional() }),
  body: z.strictObject({ name: z.string() }),
  response: z.object({ id: z.string() }),
  creates: true,
} as const satisfies Endpoint;
const edit = { ...make, method: 'patch', edits: true } as const satisfies Endpoint;
const given = { params: { id: 'a b' }, body: { name: 'Wicket' } };

const fetched = vi.fn<typeof fetch>();
const renewSession = vi.fn(() => Promise.resolve());
const onSessionLost = vi.fn();

function answer(status: number, body: unknown): Response {
  return new Response(JSON.stringify(body), { status });
}
function problem(status: number, code: string, more: object = {}): Response {
  return answer(status, { type: 't', title: 'x', status, code, detail: 'Do this.', fields: [], details: {}, ...more });
}
function sent(call: number): { address: string; headers: Headers; body: unknown } {
  const [address, init] = fetched.mock.calls[call] ?? [];
  return { address: address as string, headers: new Headers(init?.headers), body: init?.body };
}

beforeEach(() => {
  vi.stubGlobal('fetch', fetched);
  connectApi({ csrfToken: () => 'token-1', renewSession, onSessionLost });
});
afterEach(() => {
  vi.unstubAllGlobals();
  vi.resetAllMocks();
});

describe('callApi', () => {
  it('when it creates, sends the filled path, the token and a key, and gives the parsed answer', async () => {
    fetched.mockResolvedValueOnce(answer(201, { id: '7' }));

    const made = await callApi(make, { ...given, query: { tag: ['x', 'y'] } });

    const { address, headers, body } = sent(0);
    expect(made).toEqual({ id: '7' });
    expect(address).toBe('/api/things/a%20b?tag=x&tag=y');
    expect(headers.get('X-CSRF-Token')).toBe('token-1');
    expect(headers.get('Idempotency-Key')).toMatch(/^[0-9a-f-]{32,36}$/);
    expect(body).toBe('{"name":"Wicket"}');
  });

  it('when it edits, sends the version that was seen in quotes', async () => {
    fetched.mockResolvedValueOnce(answer(200, { id: '7' }));

    await callApi(edit, { ...given, ifMatch: 3 });

    expect(sent(0).headers.get('If-Match')).toBe('"3"');
  });

  it('when the server refuses, throws its problem with code, status, words and fields', async () => {
    fetched.mockResolvedValueOnce(problem(409, 'stock.not_enough', { fields: [{ path: 'name', message: 'No.' }] }));

    await expect(callApi(make, given)).rejects.toMatchObject({
      code: 'stock.not_enough',
      status: 409,
      detail: 'Do this.',
      fields: [{ path: 'name', message: 'No.' }],
    });
  });

  it('when nothing answers, says that the server is out of reach', async () => {
    fetched.mockRejectedValueOnce(new TypeError('Failed to fetch'));

    await expect(callApi(make, given)).rejects.toMatchObject({ code: 'service.unavailable', isUnreachable: true });
  });

  it('when a proxy answers 502 with a page, says that the server is not ready', async () => {
    fetched.mockResolvedValueOnce(new Response('<html>Bad gateway</html>', { status: 502 }));

    await expect(callApi(make, given)).rejects.toMatchObject({ code: 'service.unavailable', isUnreachable: false });
  });

  it('when the session has ended, tells so once and throws', async () => {
    fetched.mockResolvedValueOnce(problem(401, 'session.required'));

    await expect(callApi(make, given)).rejects.toMatchObject({ code: 'session.required' });

    expect(onSessionLost).toHaveBeenCalledTimes(1);
  });

  it('when the token is stale, fetches a new one and sends the same submit again', async () => {
    fetched.mockResolvedValueOnce(problem(403, 'session.csrf')).mockResolvedValueOnce(answer(201, { id: '7' }));

    await callApi(make, given);

    expect(renewSession).toHaveBeenCalledTimes(1);
    expect(sent(1).headers.get('Idempotency-Key')).toBe(sent(0).headers.get('Idempotency-Key'));
  });

  it('when the answer breaks the contract, does not let it through', async () => {
    fetched.mockResolvedValueOnce(answer(200, { id: 7 }));

    await expect(callApi(make, given)).rejects.toMatchObject({ code: 'server.failed' });
  });
});

describe('fileNameOf', () => {
  it.each([
    ['attachment; filename="labels.pdf"', 'labels.pdf'],
    ['attachment; filename="x.csv"; filename*=UTF-8\'\'M%C3%BChle.csv', 'Mühle.csv'],
    [null, undefined],
  ])('reads %s as %s', (header, name) => {
    expect(fileNameOf(header)).toBe(name);
  });
});
