import { z } from 'zod';
import { emailAddress, id, idParams, shortText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

export const Supplier = z.object({ id, name: z.string(), email: z.string(), items: z.int(), version });
export type Supplier = z.infer<typeof Supplier>;

export const CreateSupplier = z.strictObject({
  name: shortText,
  email: z.union([z.literal(''), emailAddress]).default(''),
});
export type CreateSupplier = z.infer<typeof CreateSupplier>;
export const EditSupplier = z.strictObject({
  name: shortText.optional(),
  email: z.union([z.literal(''), emailAddress]).optional(),
});
export type EditSupplier = z.infer<typeof EditSupplier>;

export const supplierEndpoints = {
  list: {
    method: 'get',
    path: '/api/supplies/suppliers',
    access: 'supplies.read',
    summary: 'All suppliers',
    response: z.object({ items: z.array(Supplier) }),
  },
  create: {
    method: 'post',
    path: '/api/supplies/suppliers',
    access: 'supplies.work',
    summary: 'Add a supplier',
    body: CreateSupplier,
    response: Supplier,
    creates: true,
  },
  edit: {
    method: 'patch',
    path: '/api/supplies/suppliers/:id',
    access: 'supplies.work',
    summary: 'Change a supplier',
    params: idParams,
    body: EditSupplier,
    response: Supplier,
    edits: true,
  },
} as const satisfies Record<string, Endpoint>;
