import type { z } from 'zod';
import type { Access } from '../permissions.ts';

type ObjectSchema = z.ZodObject;

/**
 * One route of the API, declared once: the server registers it, the client calls it, the OpenAPI document describes it.
 *
 * `answer`: 'json' (the default) is parsed by `response`; 'file' streams a download and has no `response`.
 * `upload`: the multipart field that carries one file; `body` then holds the text fields.
 * `creates`: a POST that makes something; clients send an `Idempotency-Key` and a repeat gets the first answer.
 * `edits`: changes a versioned record; clients send `If-Match` with the version that they saw.
 */
export interface Endpoint {
  method: 'get' | 'post' | 'patch' | 'put' | 'delete';
  path: `/api/${string}`;
  access: Access;
  summary: string;
  params?: ObjectSchema;
  query?: ObjectSchema;
  body?: z.ZodType;
  response?: z.ZodType;
  answer?: 'json' | 'file';
  upload?: { field: string; maxBytes: number; types: readonly string[] };
  creates?: true;
  edits?: true;
}

type Parsed<S> = S extends z.ZodType ? z.output<S> : undefined;

export type ParamsOf<E extends Endpoint> = Parsed<E['params']>;
export type QueryOf<E extends Endpoint> = Parsed<E['query']>;
export type BodyOf<E extends Endpoint> = Parsed<E['body']>;
/** What a handler returns and a client receives. */
export type ResponseOf<E extends Endpoint> = E['response'] extends z.ZodType ? z.output<E['response']> : void;

/** Fills `:name` parts of an endpoint's path. */
export function pathOf(endpoint: Endpoint, params: Readonly<Record<string, unknown>> = {}): string {
  return endpoint.path.replace(/:([a-zA-Z]+)/g, (_, name: string) => encodeURIComponent(String(params[name])));
}
