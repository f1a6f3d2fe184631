import { and, count, eq, gt, isNull } from 'drizzle-orm';
import type { ChangePassword, ResetPassword } from '../../shared/contracts/session.ts';
import { DomainError } from '../../shared/errors.ts';
import { type Actor, inWrite, SYSTEM, type Write } from '../db/write.ts';
import { mailedTokens, users } from '../db/schema/index.ts';
import type { Deps } from '../deps.ts';
import { findFarm } from '../queries/farm.ts';
import { actorOf, findActiveUser, type UserRow } from './auth-service.ts';
import { queueMail } from './mail-templates.ts';
import { newToken, openToken } from './mailed-tokens.ts';
import { hashPassword, isPassword } from './passwords.ts';
import { endSessionsOf } from './session-ending.ts';
import { countTry, forgetTries } from './sign-in-slowdown.ts';
import { assertStrongPassword } from './weak-passwords.ts';

const RESET_LIFE = 3_600_000;
/** Links to one address within their life; more are left out, so that nobody's inbox can be flooded. */
const MAX_OPEN_RESETS = 3;

/** Mails a link to set a new password, where the e-mail has an account. The caller is told the same either way. */
export function requestReset(deps: Deps, email: string): void {
  inWrite(deps, SYSTEM, (write) => {
    const user = findActiveUser(write.tx, email);
    if (!user || openResets(write, email) >= MAX_OPEN_RESETS) return;
    const { token, tokenHash } = newToken();
    write.tx
      .insert(mailedTokens)
      .values({
        id: write.newId(),
        kind: 'password_reset',
        tokenHash,
        email,
        userId: user.id,
        createdAt: write.now,
        expiresAt: write.now + RESET_LIFE,
      })
      .run();
    queueMail(write, 'password-reset', email, { token, name: user.name });
    write.audit({ action: 'user.reset_requested', entity: 'user', entityId: user.id });
  });
}

/**
 * Sets a new password by a mailed link, once, and ends every session of the person.
 * @throws {DomainError} `token.invalid`; `input.invalid` at `password`
 */
export async function resetPassword(deps: Deps, { token, password }: ResetPassword, address: string): Promise<void> {
  const person = userOfToken(deps.db, token, deps.clock.now());
  assertStrongPassword(password, knownOf(deps, person));
  const passwordHash = await hashPassword(password);
  inWrite(deps, actorOf(person), (write) => {
    const user = userOfToken(write.tx, token, write.now);
    setPassword(write, user, passwordHash, 'user.password_reset');
    forgetTries(write, { email: user.email, address });
  });
}

/**
 * Changes the password of who is signed in and ends their sessions on all devices.
 * @throws {DomainError} `input.invalid` at `current` or `password`; `rate.limited`
 */
export async function changePassword(
  deps: Deps,
  caller: Actor & { email: string },
  { current, password }: ChangePassword,
  address: string,
): Promise<void> {
  const attempt = { email: caller.email, address };
  inWrite(deps, caller, (write) => countTry(write, attempt));
  const user = findActiveUser(deps.db, caller.email);
  if (!user || !(await isPassword(user.passwordHash, current))) throw notCurrent();
  inWrite(deps, caller, (write) => forgetTries(write, attempt));
  assertStrongPassword(password, knownOf(deps, user));
  const passwordHash = await hashPassword(password);
  inWrite(deps, caller, (write) => {
    // A mailed link may have set another one meanwhile; the password known here must not undo that.
    const now = findActiveUser(write.tx, user.email);
    if (now?.passwordHash !== user.passwordHash) throw notCurrent();
    setPassword(write, now, passwordHash, 'user.password_changed');
  });
}

function notCurrent(): DomainError {
  return new DomainError('input.invalid', 'Your current password is another one.', {
    fields: [{ path: 'current', message: 'This is not your current password.' }],
  });
}

function openResets(write: Write, email: string): number {
  const open = write.tx
    .select({ tokens: count() })
    .from(mailedTokens)
    .where(
      and(
        eq(mailedTokens.email, email),
        eq(mailedTokens.kind, 'password_reset'),
        gt(mailedTokens.expiresAt, write.now),
        isNull(mailedTokens.usedAt),
      ),
    )
    .get();
  return open?.tokens ?? 0;
}

function userOfToken(db: Write['tx'], token: string, now: number): UserRow {
  const { email } = openToken(db, 'password_reset', token, now);
  const user = findActiveUser(db, email);
  if (!user) throw new DomainError('token.invalid', 'This link was used already or is too old. Ask for a new one.');
  return user;
}

/** Every open link and session of the person ends with the old password. */
function setPassword(write: Write, user: UserRow, passwordHash: string, action: string): void {
  write.tx
    .update(users)
    .set({ passwordHash, version: user.version + 1 })
    .where(eq(users.id, user.id))
    .run();
  write.tx
    .update(mailedTokens)
    .set({ usedAt: write.now })
    .where(and(eq(mailedTokens.userId, user.id), isNull(mailedTokens.usedAt)))
    .run();
  endSessionsOf(write, user.id);
  write.audit({ action, entity: 'user', entityId: user.id });
}

function knownOf({ db }: Deps, user: UserRow): string[] {
  return [user.name, user.email, findFarm(db)?.name ?? ''];
}
