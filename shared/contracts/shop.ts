import { z } from 'zod';
import { calendarDay, currencyCode, id, idParams, listQuery, minorAmount, noteText, pageOf, price } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { OrderFacts, OrderInvoice, OrderLine, OrderListItem } from './orders/values.ts';
import { grade } from './stock/values.ts';

/** What a store can order now: nothing of the farm's inside but the count that is free. */
export const Offer = z.object({
  listingId: id,
  lineCode: z.string(),
  tradeName: z.string(),
  taxon: z.string(),
  grade,
  priceMinor: price,
  free: z.int(),
  /** Likely sizes of the free pieces, mm; null while none is free. */
  sizeMm: z.object({ min: z.number(), max: z.number() }).nullable(),
});
export type Offer = z.infer<typeof Offer>;

export const Availability = z.object({
  offers: z.array(Offer),
  currency: currencyCode,
  taxPercent: z.number(),
  /** How long an order's pieces are kept for its payment. */
  holdMinutes: z.int(),
  /** The store is retired: it can look, but not order. */
  closed: z.boolean(),
});
export type Availability = z.infer<typeof Availability>;

export const PlaceOrder = z.strictObject({
  lines: z
    .array(
      z.strictObject({
        listingId: id,
        quantity: z.int('Enter a whole number.').min(1, 'At least 1.').max(5000, 'At most 5,000.'),
        /** The price that the buyer saw; another one by now is not charged unseen. */
        priceMinor: price,
      }),
    )
    .min(1, 'Choose something to order first.')
    .max(50, 'At most 50 lines in one order.')
    .refine(
      (lines) => new Set(lines.map(({ listingId }) => listingId)).size === lines.length,
      'Order each offer once.',
    ),
  shipOn: calendarDay.nullable().default(null),
  note: noteText.default(''),
});
export type PlaceOrder = z.infer<typeof PlaceOrder>;

export const ShopOrder = OrderFacts.extend({
  lines: z.array(OrderLine),
  /** Why the last try to pay was refused; empty when nothing was. */
  refusal: z.string(),
  refundedMinor: minorAmount,
  refundPendingMinor: minorAmount,
  invoice: OrderInvoice.nullable(),
  /** Codes of the plugs that were shipped; each has a public page. */
  plugs: z.array(z.object({ code: z.string(), lineCode: z.string() })),
});
export type ShopOrder = z.infer<typeof ShopOrder>;

export const shopEndpoints = {
  availability: {
    method: 'get',
    path: '/api/shop/availability',
    access: 'shop.read',
    summary: 'What can be ordered now',
    response: Availability,
  },
  place: {
    method: 'post',
    path: '/api/shop/orders',
    access: 'shop.order',
    summary: 'Place an order',
    body: PlaceOrder,
    response: ShopOrder,
    creates: true,
  },
  list: {
    method: 'get',
    path: '/api/shop/orders',
    access: 'shop.read',
    summary: 'Orders of your store, newest first',
    query: listQuery,
    response: pageOf(OrderListItem),
  },
  show: {
    method: 'get',
    path: '/api/shop/orders/:id',
    access: 'shop.read',
    summary: 'One order of your store',
    params: idParams,
    response: ShopOrder,
  },
  pay: {
    method: 'post',
    path: '/api/shop/orders/:id/pay',
    access: 'shop.order',
    summary: 'Where to pay an order',
    params: idParams,
    response: z.object({ url: z.string() }),
  },
  cancel: {
    method: 'post',
    path: '/api/shop/orders/:id/cancel',
    access: 'shop.order',
    summary: 'Cancel an order that is not paid',
    params: idParams,
    response: ShopOrder,
  },
  invoice: {
    method: 'get',
    path: '/api/shop/orders/:id/invoice.pdf',
    access: 'shop.read',
    summary: 'The invoice as a PDF',
    params: idParams,
    answer: 'file',
  },
} as const satisfies Record<string, Endpoint>;
