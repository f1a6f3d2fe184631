import { z } from 'zod';
import { emailAddress, id, idParams, instant, labelCode, listQuery, pageOf, shortText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

/** A shop that buys from the farm. */
export const Store = z.object({
  id,
  code: z.string(),
  name: z.string(),
  email: z.string(),
  phone: z.string(),
  address: z.string(),
  createdAt: instant,
  /** Set: its buyers can see their orders, but not place new ones. */
  retiredAt: instant.nullable(),
  version,
});
export type Store = z.infer<typeof Store>;

export const StoreListItem = Store.extend({
  /** Orders that are neither shipped nor cancelled. */
  openOrders: z.int(),
  orders: z.int(),
  lastOrderAt: instant.nullable(),
});
export type StoreListItem = z.infer<typeof StoreListItem>;

export const StorePage = Store.extend({
  openOrders: z.int(),
  orders: z.int(),
  buyers: z.array(z.object({ id, name: z.string(), email: z.string(), disabled: z.boolean() })),
});
export type StorePage = z.infer<typeof StorePage>;

const phone = z.string().trim().max(40, 'At most 40 characters.');
const address = z.string().trim().max(500, 'At most 500 characters.');

export const CreateStore = z.strictObject({
  code: labelCode,
  name: shortText,
  email: emailAddress,
  phone: phone.default(''),
  address: address.default(''),
});
export type CreateStore = z.infer<typeof CreateStore>;

export const EditStore = z.strictObject({
  code: labelCode.optional(),
  name: shortText.optional(),
  email: emailAddress.optional(),
  phone: phone.optional(),
  address: address.optional(),
  retired: z.boolean().optional(),
});
export type EditStore = z.infer<typeof EditStore>;

export const storeEndpoints = {
  list: {
    method: 'get',
    path: '/api/stores',
    access: 'stores.read',
    summary: 'Stores with their orders',
    query: listQuery,
    response: pageOf(StoreListItem),
  },
  show: {
    method: 'get',
    path: '/api/stores/:id',
    access: 'stores.read',
    summary: 'One store and its buyers',
    params: idParams,
    response: StorePage,
  },
  create: {
    method: 'post',
    path: '/api/stores',
    access: 'stores.work',
    summary: 'Add a store',
    body: CreateStore,
    response: Store,
    creates: true,
  },
  edit: {
    method: 'patch',
    path: '/api/stores/:id',
    access: 'stores.work',
    summary: 'Change a store, or retire it',
    params: idParams,
    body: EditStore,
    response: Store,
    edits: true,
  },
} as const satisfies Record<string, Endpoint>;
