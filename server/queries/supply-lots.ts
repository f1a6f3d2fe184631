import { and, count, desc, eq, gt, lt, or, sql } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import type { Count, ListLots, ListUses, Lot, Use } from '../../shared/contracts/supplies.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { consumptions, items, lots, supplyCounts, systems } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';

/** Lots, newest first. */
export function listLots(db: Db, query: ListLots): Page<Lot> {
  const matches = and(
    query.itemId ? eq(lots.itemId, query.itemId) : undefined,
    query.open === 'yes' ? gt(lots.remaining, 0) : undefined,
  );
  const total = db.select({ rows: count() }).from(lots).where(matches).get()?.rows ?? 0;
  const rows = lotsWithItem(db)
    .where(and(matches, query.cursor ? lotAfter(query.cursor) : undefined))
    .orderBy(desc(lots.receivedOn), desc(lots.id))
    .limit(query.limit + 1)
    .all();
  return pageFrom(rows, query.limit, total, { item: toLot, cursor: ({ lot }) => [lot.receivedOn, lot.id] });
}

export function allLots(db: Db): Lot[] {
  return lotsWithItem(db).orderBy(desc(lots.receivedOn), desc(lots.id)).all().map(toLot);
}

/** @throws {DomainError} `record.not_found` */
export function lotById(db: Db, lotId: string): Lot {
  const row = lotsWithItem(db).where(eq(lots.id, lotId)).get();
  if (!row) throw new DomainError('record.not_found', 'This lot is not known.');
  return toLot(row);
}

/** What was taken from lots, newest first. */
export function listUses(db: Db, query: ListUses): Page<Use> {
  const matches = and(
    query.itemId ? eq(consumptions.itemId, query.itemId) : undefined,
    query.cause ? eq(consumptions.cause, query.cause) : undefined,
  );
  const total = db.select({ rows: count() }).from(consumptions).where(matches).get()?.rows ?? 0;
  const rows = usesWithNames(db)
    .where(and(matches, query.cursor ? useAfter(query.cursor) : undefined))
    .orderBy(desc(consumptions.at), desc(consumptions.id))
    .limit(query.limit + 1)
    .all();
  return pageFrom(rows, query.limit, total, { item: (use) => use, cursor: (use) => [use.at, use.id] });
}

export function allUses(db: Db): Use[] {
  return usesWithNames(db).orderBy(desc(consumptions.at), desc(consumptions.id)).all();
}

export function countById(db: Db, countId: string): Count {
  const row = db.select().from(supplyCounts).where(eq(supplyCounts.id, countId)).get();
  if (!row) throw new DomainError('record.not_found', 'This count is not known.');
  return row;
}

function lotsWithItem(db: Db) {
  return db
    .select({ lot: lots, itemCode: items.code, itemName: items.name, unit: items.unit })
    .from(lots)
    .innerJoin(items, eq(items.id, lots.itemId))
    .$dynamic();
}

type LotRow = ReturnType<ReturnType<typeof lotsWithItem>['all']>[number];

function toLot({ lot, itemCode, itemName, unit }: LotRow): Lot {
  return { ...lot, itemCode, itemName, unit };
}

function usesWithNames(db: Db) {
  return db
    .select({
      id: consumptions.id,
      itemId: consumptions.itemId,
      itemCode: items.code,
      itemName: items.name,
      unit: items.unit,
      lotCode: lots.code,
      quantity: consumptions.quantity,
      costMicro: consumptions.costMicro,
      cause: consumptions.cause,
      causeId: consumptions.causeId,
      systemCode: systems.code,
      at: consumptions.at,
      by: consumptions.by,
    })
    .from(consumptions)
    .innerJoin(items, eq(items.id, consumptions.itemId))
    .innerJoin(lots, eq(lots.id, consumptions.lotId))
    .leftJoin(systems, eq(systems.id, consumptions.systemId))
    .$dynamic();
}

function lotAfter(cursor: string) {
  const [day, id] = readCursor(cursor, z.tuple([z.string(), z.string()]));
  return or(lt(lots.receivedOn, day), and(eq(lots.receivedOn, day), lt(lots.id, id)));
}

function useAfter(cursor: string) {
  const [at, id] = readCursor(cursor, z.tuple([z.number(), z.string()]));
  return sql`(${consumptions.at}, ${consumptions.id}) < (${at}, ${id})`;
}
