import { and, asc, count, desc, eq, gt, isNull, lt, or, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { ListQuery, Page } from '../../shared/contracts/common.ts';
import type { Invitation, Person } from '../../shared/contracts/people.ts';
import type { Db } from '../db/client.ts';
import { mailedTokens, stores, users } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';

const nameAndId = z.tuple([z.string(), z.string()]);
const timeAndId = z.tuple([z.number(), z.string()]);

/** People by name. `search` looks into name and e-mail. */
export function listPeople(db: Db, { cursor, limit, search }: ListQuery): Page<Person> {
  const matches = search ? or(contains(users.name, search), contains(users.email, search)) : undefined;
  const [name, id] = cursor ? readCursor(cursor, nameAndId) : [null, ''];
  const after = name === null ? undefined : or(gt(users.name, name), and(eq(users.name, name), gt(users.id, id)));
  const rows = db
    .select({ user: users, storeName: stores.name })
    .from(users)
    .leftJoin(stores, eq(stores.id, users.storeId))
    .where(and(matches, after))
    .orderBy(asc(users.name), asc(users.id))
    .limit(limit + 1)
    .all();
  const total = db.select({ people: count() }).from(users).where(matches).get()?.people ?? 0;
  return pageFrom(rows, limit, total, {
    item: (row) => toPerson(row.user, row.storeName),
    cursor: ({ user }) => [user.name, user.id],
  });
}

/** Invitations not accepted yet, newest first, the expired ones too. */
export function listInvitations(db: Db, { cursor, limit, search }: ListQuery, now: number): Page<Invitation> {
  const open = and(
    eq(mailedTokens.kind, 'invitation'),
    isNull(mailedTokens.usedAt),
    search ? contains(mailedTokens.email, search) : undefined,
  );
  const [at, id] = cursor ? readCursor(cursor, timeAndId) : [null, ''];
  const after =
    at === null
      ? undefined
      : or(lt(mailedTokens.createdAt, at), and(eq(mailedTokens.createdAt, at), lt(mailedTokens.id, id)));
  const rows = db
    .select({ token: mailedTokens, storeName: stores.name })
    .from(mailedTokens)
    .leftJoin(stores, eq(stores.id, mailedTokens.storeId))
    .where(and(open, after))
    .orderBy(desc(mailedTokens.createdAt), desc(mailedTokens.id))
    .limit(limit + 1)
    .all();
  const total = db.select({ tokens: count() }).from(mailedTokens).where(open).get()?.tokens ?? 0;
  return pageFrom(rows, limit, total, {
    item: (row) => toInvitation(row.token, row.storeName, now),
    cursor: ({ token }) => [token.createdAt, token.id],
  });
}

export function toPerson(user: typeof users.$inferSelect, storeName: string | null): Person {
  const { id, name, email, role, storeId, createdAt, disabledAt, version } = user;
  return { id, name, email, role, storeId, storeName, createdAt, disabledAt, version };
}

export function toInvitation(
  token: typeof mailedTokens.$inferSelect,
  storeName: string | null,
  now: number,
): Invitation {
  const { id, email, role, storeId, createdAt, createdBy, expiresAt } = token;
  if (role === null) throw new Error(`Invitation ${id} names no role.`);
  return {
    id,
    email,
    role,
    storeId,
    storeName,
    createdAt,
    createdBy: createdBy ?? '',
    expiresAt,
    expired: expiresAt <= now,
  };
}

function contains(column: typeof users.name | typeof users.email | typeof mailedTokens.email, text: string): SQL {
  return sql`instr(lower(${column}), lower(${text})) > 0`;
}
