import { and, asc, count, eq, gt, or, sql } from 'drizzle-orm';
import { z } from 'zod';
import type { ListQuery, Page } from '../../shared/contracts/common.ts';
import type { Store, StoreListItem, StorePage } from '../../shared/contracts/stores.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { stores, users } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { likePattern } from './like-pattern.ts';

export type StoreRow = typeof stores.$inferSelect;

/** @throws {DomainError} `record.not_found` */
export function storeRow(db: Db, id: string): StoreRow {
  const row = db.select().from(stores).where(eq(stores.id, id)).get();
  if (!row) throw new DomainError('record.not_found', 'This store is not known.');
  return row;
}

export function toStore({ id, code, name, email, phone, address, createdAt, retiredAt, version }: StoreRow): Store {
  return { id, code, name, email, phone, address, createdAt, retiredAt, version };
}

/** Stores by name. `search` looks into name, code and e-mail. */
export function listStores(db: Db, { cursor, limit, search }: ListQuery): Page<StoreListItem> {
  const pattern = search ? likePattern(search) : null;
  const matches = pattern
    ? or(...[stores.name, stores.code, stores.email].map((column) => sql`${column} LIKE ${pattern} ESCAPE '\\'`))
    : undefined;
  const [name, id] = cursor ? readCursor(cursor, z.tuple([z.string(), z.string()])) : [null, ''];
  const after = name === null ? undefined : or(gt(stores.name, name), and(eq(stores.name, name), gt(stores.id, id)));
  const rows = db
    .select({ store: stores, ...orderCounts })
    .from(stores)
    .where(and(matches, after))
    .orderBy(asc(stores.name), asc(stores.id))
    .limit(limit + 1)
    .all();
  const total = db.select({ stores: count() }).from(stores).where(matches).get()?.stores ?? 0;
  return pageFrom(rows, limit, total, {
    item: ({ store, ...counts }) => ({ ...toStore(store), ...counts }),
    cursor: ({ store }) => [store.name, store.id],
  });
}

export function showStore(db: Db, id: string): StorePage {
  const row = db
    .select({ store: stores, ...orderCounts })
    .from(stores)
    .where(eq(stores.id, id))
    .get();
  const { store, openOrders, orders } = row ?? { store: storeRow(db, id), openOrders: 0, orders: 0 };
  const buyers = db.select().from(users).where(eq(users.storeId, id)).orderBy(asc(users.name)).all();
  return {
    ...toStore(store),
    openOrders,
    orders,
    buyers: buyers.map((buyer) => ({
      id: buyer.id,
      name: buyer.name,
      email: buyer.email,
      disabled: buyer.disabledAt !== null,
    })),
  };
}

const orderCounts = {
  orders: sql<number>`(SELECT count(*) FROM "order" AS o WHERE o.store_id = store.id)`,
  openOrders: sql<number>`(SELECT count(*) FROM "order" AS o WHERE o.store_id = store.id
    AND o.state NOT IN ('shipped', 'cancelled'))`,
  lastOrderAt: sql<number | null>`(SELECT max(o.placed_at) FROM "order" AS o WHERE o.store_id = store.id)`,
};
