import type { Request } from 'express';
import type { z } from 'zod';
import type { Endpoint } from '../../shared/contracts/endpoint.ts';
import { DomainError, type FieldError } from '../../shared/errors.ts';
import type { Input } from './api.ts';
import type { Caller } from './caller.ts';
import { uploadOf } from './upload.ts';

/** Parses params, query, body and version of a request by the endpoint's contract. All field errors come at once. */
export function parseInput<E extends Endpoint>(endpoint: E, request: Request, caller: Caller | null): Input<E> {
  const fields: FieldError[] = [];
  const params = parsePart(endpoint.params, request.params, fields);
  const query = parsePart(endpoint.query, request.query, fields);
  const body = parsePart(endpoint.body, request.body ?? {}, fields);
  if (fields.length > 0) {
    throw new DomainError('input.invalid', 'Some of what was entered needs another look.', { fields });
  }
  return {
    params,
    query,
    body,
    caller,
    ifMatch: endpoint.edits ? readIfMatch(request) : undefined,
    upload: endpoint.upload ? uploadOf(request, endpoint.upload) : undefined,
  } as Input<E>; // each part was parsed by the schema that the type is made from
}

function parsePart(schema: z.ZodType | undefined, value: unknown, fields: FieldError[]): unknown {
  if (!schema) return undefined;
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  for (const issue of parsed.error.issues) {
    const keys = issue.code === 'unrecognized_keys' ? issue.keys : [];
    if (keys.length > 0)
      fields.push(
        ...keys.map((key) => ({ path: [...issue.path, key].join('.'), message: 'This field is not known.' })),
      );
    else fields.push({ path: issue.path.join('.'), message: issue.message });
  }
  return undefined;
}

function readIfMatch(request: Request): number {
  const match = /^(?:W\/)?"(\d{1,15})"$/.exec(request.get('If-Match') ?? '');
  if (!match) {
    throw new DomainError(
      'edit.version_required',
      'Say which version you are changing: send If-Match with its number.',
    );
  }
  return Number(match[1]);
}
