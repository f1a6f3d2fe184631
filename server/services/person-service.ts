import { and, count, eq, isNull, ne } from 'drizzle-orm';
import type { ChangePerson, Person } from '../../shared/contracts/people.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Role } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';
import type { Write } from '../db/write.ts';
import { stores, users } from '../db/schema/index.ts';
import { toPerson } from '../queries/people.ts';
import { assertVersion } from './edit-check.ts';
import { endSessionsOf } from './session-ending.ts';

type StoreRow = typeof stores.$inferSelect;

/**
 * Changes a person's name or role, or disables or enables them. Their permissions change with their next request; who
 * is disabled is signed out at once.
 * @throws {DomainError} `record.not_found`; `edit.stale`; `rule.refused` where no owner would be left; `input.invalid`
 *   at `storeId`
 */
export function changePerson(write: Write, id: string, change: ChangePerson, ifMatch: number): Person {
  const found = write.tx
    .select({ user: users, storeName: stores.name })
    .from(users)
    .leftJoin(stores, eq(stores.id, users.storeId))
    .where(eq(users.id, id))
    .get();
  if (!found) throw new DomainError('record.not_found', 'There is no such person.');
  const before = toPerson(found.user, found.storeName);
  assertVersion(found.user, ifMatch, before);

  const role = change.role ?? before.role;
  const disabledAt = disabledFrom(write, before, change.disabled);
  if (role !== 'owner' || disabledAt !== null) assertOtherOwner(write.tx, id);
  const store = storeOfRole(write.tx, role, role === 'buyer' ? (change.storeId ?? before.storeId) : null);

  const row = write.tx
    .update(users)
    .set({
      name: change.name ?? before.name,
      role,
      storeId: store?.id ?? null,
      disabledAt,
      version: before.version + 1,
    })
    .where(eq(users.id, id))
    .returning()
    .get();
  if (disabledAt !== null) endSessionsOf(write, id);
  const after = toPerson(row, store?.name ?? null);
  write.audit({ action: 'user.changed', entity: 'user', entityId: id, before, after });
  return after;
}

/**
 * The store that goes with a role: one for buyers, none for others.
 * @throws {DomainError} `input.invalid` at `storeId`
 */
export function storeOfRole(db: Db, role: Role, storeId: string | null): StoreRow | null {
  if (role !== 'buyer') {
    if (storeId === null) return null;
    throw wrongStore('Only store buyers belong to a store.');
  }
  const store = storeId === null ? undefined : db.select().from(stores).where(eq(stores.id, storeId)).get();
  if (!store || store.retiredAt !== null) throw wrongStore('Choose the store that this person buys for.');
  return store;
}

function disabledFrom(write: Write, before: Person, disabled: boolean | undefined): number | null {
  if (disabled === undefined) return before.disabledAt;
  return disabled ? (before.disabledAt ?? write.now) : null;
}

function assertOtherOwner(db: Db, id: string): void {
  const others = db
    .select({ owners: count() })
    .from(users)
    .where(and(eq(users.role, 'owner'), isNull(users.disabledAt), ne(users.id, id)))
    .get();
  if ((others?.owners ?? 0) > 0) return;
  throw new DomainError('rule.refused', 'A farm needs an owner. Make someone else an owner first.');
}

function wrongStore(message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path: 'storeId', message }] });
}
