import { and, eq, isNull } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { type Actor, inWrite, SYSTEM } from '../db/write.ts';
import { users } from '../db/schema/index.ts';
import type { Deps } from '../deps.ts';
import { isPassword } from './passwords.ts';
import { countTry, forgetTries, type SignInTry } from './sign-in-slowdown.ts';

export type UserRow = typeof users.$inferSelect;

/**
 * The person whose e-mail and password these are.
 * @throws {DomainError} `sign_in.refused`, the same for an unknown account, a wrong password and a disabled person;
 *   `rate.limited` after too many of them
 */
export async function signIn(deps: Deps, attempt: SignInTry & { password: string }): Promise<UserRow> {
  inWrite(deps, SYSTEM, (write) => countTry(write, attempt));
  const user = findActiveUser(deps.db, attempt.email);
  if (!(await isPassword(user?.passwordHash ?? null, attempt.password)) || !user) throw refused();
  inWrite(deps, actorOf(user), (write) => {
    // Checking takes a moment, in which the password can be changed or the person disabled.
    if (findActiveUser(write.tx, user.email)?.passwordHash !== user.passwordHash) throw refused();
    forgetTries(write, attempt);
    write.audit({ action: 'user.signed_in', entity: 'user', entityId: user.id });
  });
  return user;
}

function refused(): DomainError {
  return new DomainError(
    'sign_in.refused',
    'This e-mail and password do not go together. Try again, or ask for a link to set a new password.',
  );
}

/** @throws {DomainError} `record.not_found` unless the farm is a demo and this one of its people */
export function signInAsDemo(deps: Deps, email: string): UserRow {
  const user = deps.config.demo ? findActiveUser(deps.db, email) : null;
  if (!user?.demo) throw new DomainError('record.not_found', 'There is no such demo person. Sign in with a password.');
  inWrite(deps, actorOf(user), (write) => {
    write.audit({ action: 'user.signed_in', entity: 'user', entityId: user.id });
  });
  return user;
}

/** Who acts, where no request tells: sign-in and mailed links. */
export function actorOf(user: UserRow): Actor {
  return { userId: user.id, name: user.name, role: user.role, storeId: user.storeId };
}

/** The person with this e-mail, unless disabled. */
export function findActiveUser(db: Db, email: string): UserRow | null {
  return (
    db
      .select()
      .from(users)
      .where(and(eq(users.email, email), isNull(users.disabledAt)))
      .get() ?? null
  );
}
