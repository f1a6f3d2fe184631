import { z } from 'zod';
import { calendarDay, currencyCode, id, instant, minorAmount, price, version } from '../common.ts';
import { grade } from '../stock/values.ts';

/** In the order in which an order goes through them; `cancelled` ends it early. */
export const ORDER_STATES = ['placed', 'paid', 'picking', 'packed', 'shipped', 'cancelled'] as const;
export type OrderState = (typeof ORDER_STATES)[number];
export const orderState = z.enum(ORDER_STATES);

export const OrderLine = z.object({
  id,
  listingId: id,
  lineId: id,
  lineCode: z.string(),
  tradeName: z.string(),
  grade,
  quantity: z.int(),
  picked: z.int(),
  /** Could not be packed and was paid back. */
  missing: z.int(),
  priceMinor: price,
  amountMinor: minorAmount,
});
export type OrderLine = z.infer<typeof OrderLine>;

/** What the store and the farm both see of an order. */
export const OrderFacts = z.object({
  id,
  number: z.int(),
  state: orderState,
  currency: currencyCode,
  subtotalMinor: minorAmount,
  /** Percent, with at most two decimals. */
  taxPercent: z.number(),
  taxMinor: minorAmount,
  totalMinor: minorAmount,
  shipOn: calendarDay.nullable(),
  note: z.string(),
  placedAt: instant,
  placedBy: z.string(),
  /** Unpaid orders free their stock at this time. */
  holdUntil: instant.nullable(),
  paidAt: instant.nullable(),
  packedAt: instant.nullable(),
  shippedAt: instant.nullable(),
  cancelledAt: instant.nullable(),
  cancelReason: z.string(),
  carrier: z.string(),
  tracking: z.string(),
  boxes: z.int(),
  version,
});
export type OrderFacts = z.infer<typeof OrderFacts>;

export const OrderListItem = z.object({
  id,
  number: z.int(),
  storeId: id,
  storeName: z.string(),
  state: orderState,
  currency: currencyCode,
  totalMinor: minorAmount,
  pieces: z.int(),
  picked: z.int(),
  placedAt: instant,
  holdUntil: instant.nullable(),
  shipOn: calendarDay.nullable(),
});
export type OrderListItem = z.infer<typeof OrderListItem>;

export const OrderInvoice = z.object({ number: z.int(), issuedOn: calendarDay });
