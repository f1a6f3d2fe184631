import { createHash, randomBytes } from 'node:crypto';
import { and, eq, gt, isNull } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { mailedTokens } from '../db/schema/index.ts';

export type MailedToken = typeof mailedTokens.$inferSelect;

/** A fresh secret for a link, and the hash that alone is kept of it. */
export function newToken(): { token: string; tokenHash: string } {
  const token = randomBytes(32).toString('base64url');
  return { token, tokenHash: hashOf(token) };
}

/**
 * The unused, unexpired token row that a link's secret belongs to.
 * @throws {DomainError} `token.invalid`
 */
export function openToken(db: Db, kind: MailedToken['kind'], token: string, now: number): MailedToken {
  const row = db
    .select()
    .from(mailedTokens)
    .where(
      and(
        eq(mailedTokens.tokenHash, hashOf(token)),
        eq(mailedTokens.kind, kind),
        isNull(mailedTokens.usedAt),
        gt(mailedTokens.expiresAt, now),
      ),
    )
    .get();
  if (!row) throw new DomainError('token.invalid', 'This link was used already or is too old. Ask for a new one.');
  return row;
}

function hashOf(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}
