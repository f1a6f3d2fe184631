import { sql } from 'drizzle-orm';
import { check, index, integer, sqliteTable, text, unique } from 'drizzle-orm/sqlite-core';
import type { InvoiceContent } from '../../../shared/contracts/invoices.ts';
import { day, id, instant, version } from './columns.ts';
import { batches, lines, plugs } from './stock.ts';

export const stores = sqliteTable('store', {
  id: id(),
  code: text('code').notNull().unique(),
  name: text('name').notNull(),
  email: text('email').notNull(),
  phone: text('phone').notNull().default(''),
  address: text('address').notNull().default(''),
  createdAt: instant('created_at').notNull(),
  retiredAt: instant('retired_at'),
  version: version(),
});

/** A line in a grade offered at a price. */
export const listings = sqliteTable(
  'listing',
  {
    id: id(),
    lineId: text('line_id')
      .notNull()
      .references(() => lines.id),
    grade: text('grade').notNull(),
    priceMinor: integer('price_minor').notNull(),
    active: integer('active', { mode: 'boolean' }).notNull().default(true),
    createdAt: instant('created_at').notNull(),
    version: version(),
  },
  (table) => [
    unique('listing_once').on(table.lineId, table.grade),
    check('listing_price', sql`${table.priceMinor} >= 0`),
  ],
);

/** An order of a store. Its states: placed (stock held, not paid) > paid > picking > packed > shipped; or cancelled. */
export const orders = sqliteTable(
  'order',
  {
    id: id(),
    number: integer('number').notNull().unique(),
    storeId: text('store_id')
      .notNull()
      .references(() => stores.id),
    state: text('state', { enum: ['placed', 'paid', 'picking', 'packed', 'shipped', 'cancelled'] }).notNull(),
    currency: text('currency').notNull(),
    subtotalMinor: integer('subtotal_minor').notNull(),
    taxMinor: integer('tax_minor').notNull(),
    totalMinor: integer('total_minor').notNull(),
    /** Tax rate of the day it was placed, in hundredths of a percent. */
    taxPercent: integer('tax_percent_hundredths').notNull().default(0),
    shipOn: day('ship_on'),
    note: text('note').notNull().default(''),
    placedAt: instant('placed_at').notNull(),
    placedBy: text('placed_by').notNull(),
    /** Unpaid orders free their stock at this time. */
    holdUntil: instant('hold_until'),
    paidAt: instant('paid_at'),
    packedAt: instant('packed_at'),
    shippedAt: instant('shipped_at'),
    cancelledAt: instant('cancelled_at'),
    cancelReason: text('cancel_reason').notNull().default(''),
    carrier: text('carrier').notNull().default(''),
    tracking: text('tracking').notNull().default(''),
    boxes: integer('boxes').notNull().default(0),
    version: version(),
  },
  (table) => [
    index('order_store').on(table.storeId, table.number),
    index('order_state').on(table.state, table.number),
    check('order_total', sql`${table.totalMinor} = ${table.subtotalMinor} + ${table.taxMinor}`),
  ],
);

export const orderLines = sqliteTable(
  'order_line',
  {
    id: id(),
    orderId: text('order_id')
      .notNull()
      .references(() => orders.id),
    listingId: text('listing_id')
      .notNull()
      .references(() => listings.id),
    lineId: text('line_id')
      .notNull()
      .references(() => lines.id),
    grade: text('grade').notNull(),
    quantity: integer('quantity').notNull(),
    /** Pieces that could not be packed and are paid back. */
    missing: integer('missing').notNull().default(0),
    priceMinor: integer('price_minor').notNull(),
  },
  (table) => [
    index('order_line_order').on(table.orderId),
    check('order_line_quantity', sql`${table.quantity} > 0`),
    check('order_line_missing', sql`${table.missing} BETWEEN 0 AND ${table.quantity}`),
  ],
);

/**
 * Pieces of a batch promised to an order line. `pieces` counts down as plugs are picked and is zero when the order is
 * packed or cancelled. A held frag still stands on its rack, so holds are claims on a batch beside the ledger; the
 * database refuses a new hold beyond what stands on racks (drizzle/0001_ledger_guards.sql).
 */
export const holds = sqliteTable(
  'hold',
  {
    id: id(),
    orderLineId: text('order_line_id')
      .notNull()
      .references(() => orderLines.id),
    batchId: text('batch_id')
      .notNull()
      .references(() => batches.id),
    pieces: integer('pieces').notNull(),
    createdAt: instant('created_at').notNull(),
  },
  (table) => [
    unique('hold_once').on(table.orderLineId, table.batchId),
    index('hold_batch').on(table.batchId),
    check('hold_pieces', sql`${table.pieces} >= 0`),
  ],
);

/** A plug scanned for an order. `undoneAt` set: put back. */
export const picks = sqliteTable(
  'pick',
  {
    id: id(),
    orderLineId: text('order_line_id')
      .notNull()
      .references(() => orderLines.id),
    plugCode: text('plug_code')
      .notNull()
      .references(() => plugs.code),
    movementId: integer('movement_id').notNull(),
    /** The hold whose count this pick took; null when another batch of the line stood in. */
    holdId: text('hold_id').references(() => holds.id),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    undoneAt: instant('undone_at'),
  },
  (table) => [index('pick_order_line').on(table.orderLineId), index('pick_plug').on(table.plugCode)],
);

/** A try to be paid for an order through the payment service. */
export const payments = sqliteTable(
  'payment',
  {
    id: id(),
    orderId: text('order_id')
      .notNull()
      .references(() => orders.id),
    sessionId: text('session_id').notNull().unique(),
    intentId: text('intent_id'),
    url: text('url').notNull(),
    amountMinor: integer('amount_minor').notNull(),
    currency: text('currency').notNull(),
    state: text('state', { enum: ['open', 'paid', 'expired', 'failed'] }).notNull(),
    /** Why the last try to pay was refused, in the payment service's words. */
    refusal: text('refusal').notNull().default(''),
    createdAt: instant('created_at').notNull(),
    paidAt: instant('paid_at'),
  },
  (table) => [
    index('payment_order').on(table.orderId),
    index('payment_intent').on(table.intentId),
    index('payment_state').on(table.state),
  ],
);

export const refunds = sqliteTable(
  'refund',
  {
    id: id(),
    paymentId: text('payment_id')
      .notNull()
      .references(() => payments.id),
    externalId: text('external_id').unique(),
    amountMinor: integer('amount_minor').notNull(),
    reason: text('reason').notNull(),
    state: text('state', { enum: ['pending', 'succeeded', 'failed'] }).notNull(),
    createdAt: instant('created_at').notNull(),
    by: text('by').notNull(),
  },
  (table) => [
    index('refund_payment').on(table.paymentId),
    index('refund_state').on(table.state),
    check('refund_amount', sql`${table.amountMinor} > 0`),
  ],
);

/** Events of the payment service that were handled, so that a repeat changes nothing. */
export const paymentEvents = sqliteTable('payment_event', {
  id: text('id').primaryKey(),
  type: text('type').notNull(),
  at: instant('at').notNull(),
});

/** Invoices are numbered without gaps and never changed. */
export const invoices = sqliteTable('invoice', {
  id: id(),
  number: integer('number').notNull().unique(),
  orderId: text('order_id')
    .notNull()
    .unique()
    .references(() => orders.id),
  issuedOn: day('issued_on').notNull(),
  /** What it says, as it was on that day; later edits of farm or store don't reach it. */
  content: text('content', { mode: 'json' }).$type<InvoiceContent>().notNull(),
  createdAt: instant('created_at').notNull(),
});
