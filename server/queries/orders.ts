import { and, asc, count, desc, eq, isNull, lt, or, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import type { ListOrders, OrderFacts, OrderLine, OrderListItem, OrderState } from '../../shared/contracts/orders.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { invoices, lines, orderLines, orders, payments, picks, refunds, stores } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { likePattern } from './like-pattern.ts';
import { gradeCode } from './listings.ts';

export type OrderRow = typeof orders.$inferSelect;

/** @throws {DomainError} `record.not_found` */
export function orderRow(db: Db, id: string): OrderRow {
  const row = db.select().from(orders).where(eq(orders.id, id)).get();
  if (!row) throw unknownOrder();
  return row;
}

/**
 * An order of one store. Orders of others are answered as if they did not exist.
 * @param storeId the caller's own store, never a store that a request names
 * @throws {DomainError} `record.not_found`
 */
export function ownOrderRow(db: Db, storeId: string | null, id: string): OrderRow {
  const row = orderRow(db, id);
  if (storeId === null || row.storeId !== storeId) throw unknownOrder();
  return row;
}

/** What an order wants, with how much of it is picked, by line and grade. */
export function orderLinesOf(db: Db, orderId: string): OrderLine[] {
  return db
    .select({
      row: orderLines,
      line: lines,
      picked: sql<number>`(SELECT count(*) FROM pick WHERE pick.order_line_id = ${orderLines.id}
        AND pick.undone_at IS NULL)`,
    })
    .from(orderLines)
    .innerJoin(lines, eq(lines.id, orderLines.lineId))
    .where(eq(orderLines.orderId, orderId))
    .orderBy(asc(lines.code), asc(orderLines.grade), asc(orderLines.id))
    .all()
    .map(({ row, line, picked }) => ({
      id: row.id,
      listingId: row.listingId,
      lineId: row.lineId,
      lineCode: line.code,
      tradeName: line.tradeName,
      grade: gradeCode(row.grade),
      quantity: row.quantity,
      picked,
      missing: row.missing,
      priceMinor: row.priceMinor,
      amountMinor: row.priceMinor * (row.quantity - row.missing),
    }));
}

/** Codes of the plugs that are picked for an order now. */
export function pickedPlugs(db: Db, orderId: string) {
  return db
    .select({ pick: picks, lineCode: lines.code, orderLineId: orderLines.id })
    .from(picks)
    .innerJoin(orderLines, eq(orderLines.id, picks.orderLineId))
    .innerJoin(lines, eq(lines.id, orderLines.lineId))
    .where(and(eq(orderLines.orderId, orderId), isNull(picks.undoneAt)))
    .orderBy(asc(lines.code), asc(picks.plugCode))
    .all();
}

export function invoiceOf(db: Db, orderId: string) {
  return db.select().from(invoices).where(eq(invoices.orderId, orderId)).get() ?? null;
}

export function paymentsOf(db: Db, orderId: string) {
  return db.select().from(payments).where(eq(payments.orderId, orderId)).orderBy(desc(payments.createdAt)).all();
}

export function refundsOf(db: Db, orderId: string) {
  return db
    .select({ refund: refunds })
    .from(refunds)
    .innerJoin(payments, eq(payments.id, refunds.paymentId))
    .where(eq(payments.orderId, orderId))
    .orderBy(desc(refunds.createdAt), desc(refunds.id))
    .all()
    .map(({ refund }) => refund);
}

/** Orders newest first. `search` finds a number or a part of the store's name. */
export function listOrders(db: Db, { cursor, limit, search, state, storeId }: ListOrders): Page<OrderListItem> {
  const matches = and(
    state ? eq(orders.state, state) : undefined,
    storeId ? eq(orders.storeId, storeId) : undefined,
    search ? searched(search) : undefined,
  );
  const after = cursor ? lt(orders.number, readCursor(cursor, z.tuple([z.number()]))[0]) : undefined;
  const rows = db
    .select({ order: orders, storeName: stores.name, pieces: PIECES, picked: PICKED })
    .from(orders)
    .innerJoin(stores, eq(stores.id, orders.storeId))
    .where(and(matches, after))
    .orderBy(desc(orders.number))
    .limit(limit + 1)
    .all();
  const total =
    db.select({ all: count() }).from(orders).innerJoin(stores, eq(stores.id, orders.storeId)).where(matches).get()
      ?.all ?? 0;
  return pageFrom(rows, limit, total, {
    item: ({ order, storeName, pieces, picked }) => {
      const { id, number, state: now, currency, totalMinor, placedAt, holdUntil, shipOn } = order;
      const { storeId: store } = order;
      return {
        ...{ id, number, storeId: store, storeName, state: now, currency, totalMinor, pieces, picked },
        ...{ placedAt, holdUntil, shipOn },
      };
    },
    cursor: ({ order }) => [order.number],
  });
}

/** How many orders there are in each state. */
export function orderStates(db: Db): Partial<Record<OrderState, number>> {
  const rows = db.select({ state: orders.state, all: count() }).from(orders).groupBy(orders.state).all();
  return Object.fromEntries(rows.map(({ state, all }) => [state, all]));
}

export function toOrderFacts(row: OrderRow): OrderFacts {
  const { storeId: _store, taxPercent, ...facts } = row;
  return { ...facts, taxPercent: taxPercent / 100 };
}

const PIECES = sql<number>`(SELECT coalesce(sum(l.quantity - l.missing), 0) FROM order_line AS l
  WHERE l.order_id = ${orders.id})`;
const PICKED = sql<number>`(SELECT count(*) FROM order_line AS l JOIN pick AS p ON p.order_line_id = l.id
  WHERE l.order_id = ${orders.id} AND p.undone_at IS NULL)`;

function searched(text: string): SQL | undefined {
  const number = /^#?(\d{1,12})$/.exec(text)?.[1];
  const byName = sql`${stores.name} LIKE ${likePattern(text)} ESCAPE '\\'`;
  return number === undefined ? byName : or(eq(orders.number, Number(number)), byName);
}

function unknownOrder(): DomainError {
  return new DomainError('record.not_found', 'This order is not known.');
}
