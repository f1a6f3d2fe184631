import { problem } from '@shared/contracts/common.ts';
import { type Endpoint, pathOf } from '@shared/contracts/endpoint.ts';
import { ApiError, unreachable } from '@/api/api-error.ts';
import { apiContext } from '@/api/api-context.ts';
import { newKey } from '@/api/new-key.ts';

/** The parts of a call without their types; `callApi` checks them against the endpoint. */
export interface LooseCall {
  params?: Record<string, unknown>;
  query?: Record<string, unknown>;
  body?: unknown;
  file?: File;
  idempotencyKey?: string;
  ifMatch?: number;
  signal?: AbortSignal;
}

/** Sends a call and returns the good answer; throws an `ApiError` for every other outcome. */
export async function sendRequest(endpoint: Endpoint, call: LooseCall): Promise<Response> {
  // One key for the whole logical submit, also when the request is sent again below.
  const keyed = endpoint.creates ? { ...call, idempotencyKey: call.idempotencyKey ?? newKey() } : call;
  try {
    return await sendOnce(endpoint, keyed);
  } catch (error) {
    if (!(error instanceof ApiError) || error.code !== 'session.csrf') throw error;
    await apiContext().renewSession();
    return sendOnce(endpoint, keyed);
  }
}

async function sendOnce(endpoint: Endpoint, call: LooseCall): Promise<Response> {
  const response = await fetch(addressOf(endpoint, call), {
    method: endpoint.method.toUpperCase(),
    headers: headersOf(endpoint, call),
    body: bodyOf(endpoint, call),
    credentials: 'same-origin',
    signal: call.signal ?? null,
  }).catch((error: unknown) => {
    // A call that the page itself gave up is not a failure to show.
    if (call.signal?.aborted) throw error;
    throw unreachable();
  });
  if (response.ok) return response;

  const error = await problemOf(response);
  if (error.code === 'session.required') apiContext().onSessionLost();
  throw error;
}

/** The address of a call, also usable as a plain link to a file. */
export function addressOf(endpoint: Endpoint, call: Pick<LooseCall, 'params' | 'query'>): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(call.query ?? {})) {
    for (const each of Array.isArray(value) ? value : [value]) {
      if (each !== undefined && each !== null) search.append(name, String(each));
    }
  }
  const path = pathOf(endpoint, call.params);
  return search.size > 0 ? `${path}?${search.toString()}` : path;
}

function headersOf(endpoint: Endpoint, call: LooseCall): Headers {
  const headers = new Headers({ Accept: 'application/json, application/problem+json, */*;q=0.5' });
  if (endpoint.method !== 'get') headers.set('X-CSRF-Token', apiContext().csrfToken());
  if (call.body !== undefined && !endpoint.upload) headers.set('Content-Type', 'application/json');
  if (call.idempotencyKey !== undefined) headers.set('Idempotency-Key', call.idempotencyKey);
  if (endpoint.edits && call.ifMatch !== undefined) headers.set('If-Match', `"${String(call.ifMatch)}"`);
  return headers;
}

function bodyOf(endpoint: Endpoint, call: LooseCall): BodyInit | null {
  if (!endpoint.upload) return call.body === undefined ? null : JSON.stringify(call.body);

  const form = new FormData();
  // Text fields go first: the server knows them by the time that the file arrives.
  for (const [name, value] of Object.entries(call.body ?? {})) {
    if (value !== undefined && value !== null) form.append(name, String(value));
  }
  if (call.file) form.append(endpoint.upload.field, call.file);
  return form;
}

async function problemOf(response: Response): Promise<ApiError> {
  const parsed = problem.safeParse(await response.json().catch(() => undefined));
  if (parsed.success) return new ApiError(parsed.data);
  const away = response.status === 502 || response.status === 503 || response.status === 504;
  return new ApiError({
    code: away ? 'service.unavailable' : 'server.failed',
    status: response.status,
    detail: away
      ? 'The farm server is not ready. Wait a moment, then try again.'
      : 'The server could not do this. Try again; if it happens again, tell the owner of the farm.',
  });
}
