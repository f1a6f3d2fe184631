import { createHash } from 'node:crypto';
import { and, count, eq, gt, inArray, lte, max } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import type { Write } from '../db/write.ts';
import { signInFailures } from '../db/schema/index.ts';

const SECOND = 1000;
const WINDOW = 15 * 60 * SECOND;
const FIRST_WAIT = 5 * SECOND;

export interface SignInTry {
  /** E-mail as typed; it counts the same whether or not an account has it. */
  email: string;
  /** Network that the try comes from: an address, or a block of them. */
  address: string;
}

/**
 * Counts a try as failed before its password is looked at, so that many at once can not slip through together.
 * @throws {DomainError} `rate.limited` while the account or the address must wait; such a try is not counted
 */
export function countTry(write: Write, attempt: SignInTry): void {
  const waitMs = Math.max(...subjectsOf(attempt).map((subject) => waitOf(write, subject)));
  if (waitMs > 0) {
    const retryAfterSeconds = Math.ceil(waitMs / SECOND);
    throw new DomainError(
      'rate.limited',
      `Too many tries that did not work. Wait ${retryAfterSeconds} seconds, then try again.`,
      { details: { retryAfterSeconds } },
    );
  }
  for (const { key } of subjectsOf(attempt)) {
    write.tx.insert(signInFailures).values({ subject: key, at: write.now }).run();
  }
}

/** Takes back what `countTry` counted, after the right password. */
export function forgetTries(write: Write, attempt: SignInTry): void {
  const keys = subjectsOf(attempt).map(({ key }) => key);
  write.tx.delete(signInFailures).where(inArray(signInFailures.subject, keys)).run();
}

/** Failures that no longer slow anyone down need not be kept. */
export function forgetOldTries(write: Write): void {
  write.tx
    .delete(signInFailures)
    .where(lte(signInFailures.at, write.now - WINDOW))
    .run();
}

interface Subject {
  key: string;
  /** Failures within the window that are let pass without a wait. */
  free: number;
}

/** People mistype, and a whole shop shares one address: both get tries for free, the address more of them. */
function subjectsOf({ email, address }: SignInTry): Subject[] {
  // Hashed: people type all kinds of things into the e-mail field, passwords among them.
  const account = createHash('sha256').update(email).digest('hex');
  return [
    { key: `account:${account}`, free: 5 },
    { key: `address:${address}`, free: 20 },
  ];
}

/** How long this subject must still wait: doubles with every failure beyond the free ones, up to the window's length. */
function waitOf(write: Write, { key, free }: Subject): number {
  const recent = write.tx
    .select({ failures: count(), last: max(signInFailures.at) })
    .from(signInFailures)
    .where(and(eq(signInFailures.subject, key), gt(signInFailures.at, write.now - WINDOW)))
    .get();
  if (!recent || recent.last === null || recent.failures < free) return 0;
  const wait = Math.min(WINDOW, FIRST_WAIT * 2 ** (recent.failures - free));
  return Math.max(0, recent.last + wait - write.now);
}
