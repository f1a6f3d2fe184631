import { createHash } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import type { Request } from 'express';
import { DomainError } from '../../shared/errors.ts';
import type { Write } from '../db/write.ts';
import { idempotencyKeys } from '../db/schema/index.ts';

export interface RequestIdentity {
  key: string;
  callerId: string;
  route: string;
  /** Parsed params, query and body. */
  content: unknown;
  /** The uploaded file's bytes. */
  file: Buffer | null;
}

/**
 * The key that a request came with; null without one.
 * @throws {DomainError} `input.invalid` for one that is no key
 */
export function requestKey(request: Request): string | null {
  const key = request.get('Idempotency-Key');
  if (!key) return null;
  if (/^[\x21-\x7e]{1,200}$/.test(key)) return key;
  throw new DomainError('input.invalid', 'Send an Idempotency-Key of up to 200 plain characters, such as a UUID.');
}

/**
 * Gives the first answer again when this key was used before, or makes the answer and keeps it, in one transaction.
 * @throws {DomainError} `idempotency.mismatch` when the key was used for something else
 */
export function answerOnce<T>(write: Write, request: RequestIdentity, status: number, make: () => T): T {
  const requestHash = createHash('sha256')
    .update(JSON.stringify([request.route, request.content]))
    .update(request.file ?? '')
    .digest('hex');
  const earlier = write.tx
    .select()
    .from(idempotencyKeys)
    .where(and(eq(idempotencyKeys.callerId, request.callerId), eq(idempotencyKeys.key, request.key)))
    .get();
  if (earlier) {
    if (earlier.requestHash !== requestHash) {
      throw new DomainError(
        'idempotency.mismatch',
        'This Idempotency-Key was used for another request. Send a new key.',
      );
    }
    return earlier.answer as T;
  }
  const answer = make();
  write.tx
    .insert(idempotencyKeys)
    .values({ ...identityColumns(request), requestHash, status, answer: answer ?? null, at: write.now })
    .run();
  return answer;
}

function identityColumns({ key, callerId, route }: RequestIdentity) {
  return { key, callerId, route };
}
