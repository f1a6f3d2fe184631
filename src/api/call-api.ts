import type { z } from 'zod';
import { type Endpoint, type ResponseOf } from '@shared/contracts/endpoint.ts';
import { ApiError, toApiError } from '@/api/api-error.ts';
import { type LooseCall, sendRequest } from '@/api/send-request.ts';

type Part<Name extends string, Schema> = Schema extends z.ZodType
  ? Record<never, never> extends z.input<Schema>
    ? { [K in Name]?: z.input<Schema> }
    : { [K in Name]: z.input<Schema> }
  : Record<never, never>;

interface CallExtras {
  /** The one file of an upload. */
  file?: File;
  /** Keep it over retries of the same submit: the server then does it once. Made when left out. */
  idempotencyKey?: string;
  /** The version that the person saw, for endpoints that edit. */
  ifMatch?: number;
  signal?: AbortSignal;
}

/** What an endpoint needs: parts whose every field is optional may be left out. */
export type CallOptions<E extends Endpoint> = Part<'params', E['params']> &
  Part<'query', E['query']> &
  Part<'body', E['body']> &
  CallExtras;

type CallArguments<E extends Endpoint> =
  Record<never, never> extends CallOptions<E> ? [options?: CallOptions<E>] : [options: CallOptions<E>];

/** Calls an endpoint and returns its parsed answer. Every failure is an `ApiError`. */
export async function callApi<const E extends Endpoint>(
  endpoint: E,
  ...[options]: CallArguments<E>
): Promise<ResponseOf<E>> {
  // The conditional types above are for callers; inside, the parts are plain optional records.
  const response = await sendRequest(endpoint, (options ?? {}) as LooseCall);
  return (await parseAnswer(endpoint, response)) as ResponseOf<E>;
}

async function parseAnswer(endpoint: Endpoint, response: Response): Promise<unknown> {
  if (!endpoint.response) return undefined;
  const answer: unknown = await response.json().catch((error: unknown) => {
    throw toApiError(error);
  });
  const parsed = endpoint.response.safeParse(answer);
  if (parsed.success) return parsed.data;
  throw new ApiError({
    code: 'server.failed',
    status: response.status,
    detail: 'The answer of the server could not be read. Load the page again to get the current version.',
    details: { issues: parsed.error.issues.slice(0, 5).map((issue) => `${issue.path.join('.')}: ${issue.message}`) },
  });
}
