import { z } from 'zod';
import { id, idParams, instant, listQuery, minorAmount, pageOf, shortText } from '../common.ts';
import type { Endpoint } from '../endpoint.ts';
import { OrderFacts, OrderInvoice, OrderLine, OrderListItem, orderState } from './values.ts';

export const ListOrders = listQuery.extend({ state: orderState.optional(), storeId: id.optional() });
export type ListOrders = z.infer<typeof ListOrders>;

export const Payment = z.object({
  id,
  state: z.enum(['open', 'paid', 'expired', 'failed']),
  amountMinor: minorAmount,
  refusal: z.string(),
  createdAt: instant,
  paidAt: instant.nullable(),
});
export const Refund = z.object({
  id,
  amountMinor: minorAmount,
  reason: z.string(),
  state: z.enum(['pending', 'succeeded', 'failed']),
  createdAt: instant,
  by: z.string(),
});
export type Refund = z.infer<typeof Refund>;

/** Everything of an order, for staff. */
export const OrderPage = OrderFacts.extend({
  store: z.object({ id, code: z.string(), name: z.string(), email: z.string(), address: z.string() }),
  lines: z.array(OrderLine),
  payments: z.array(Payment),
  refunds: z.array(Refund),
  /** Paid and not given back. */
  refundableMinor: minorAmount,
  invoice: OrderInvoice.nullable(),
});
export type OrderPage = z.infer<typeof OrderPage>;

export const CancelOrder = z.strictObject({ reason: shortText });
export type CancelOrder = z.infer<typeof CancelOrder>;
export const RefundOrder = z.strictObject({
  amountMinor: z.int('Enter an amount.').min(1, 'Enter an amount above zero.').max(100_000_000_000),
  reason: shortText,
});
export type RefundOrder = z.infer<typeof RefundOrder>;

export const orderEndpoints = {
  list: {
    method: 'get',
    path: '/api/orders',
    access: 'orders.read',
    summary: 'Orders, newest first, by state and store',
    query: ListOrders,
    response: pageOf(OrderListItem).extend({
      /** Orders in each state, whatever the filter. */
      states: z.partialRecord(orderState, z.int()),
    }),
  },
  show: {
    method: 'get',
    path: '/api/orders/:id',
    access: 'orders.read',
    summary: 'One order',
    params: idParams,
    response: OrderPage,
  },
  cancel: {
    method: 'post',
    path: '/api/orders/:id/cancel',
    access: 'orders.work',
    summary: 'Cancel an order; what was paid is given back',
    params: idParams,
    body: CancelOrder,
    response: OrderPage,
  },
  refund: {
    method: 'post',
    path: '/api/orders/:id/refunds',
    access: 'orders.work',
    summary: 'Give back all or a part of what was paid',
    params: idParams,
    body: RefundOrder,
    response: Refund,
    creates: true,
  },
  invoice: {
    method: 'get',
    path: '/api/orders/:id/invoice.pdf',
    access: 'orders.read',
    summary: 'The invoice as a PDF',
    params: idParams,
    answer: 'file',
  },
} as const satisfies Record<string, Endpoint>;
