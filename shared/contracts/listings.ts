import { z } from 'zod';
import { id, idParams, listQuery, pageOf, price, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { grade } from './stock/values.ts';

/** A line in a grade offered to stores at a price, with what can be sold of it today. */
export const Listing = z.object({
  id,
  lineId: id,
  lineCode: z.string(),
  tradeName: z.string(),
  taxon: z.string(),
  grade,
  priceMinor: price,
  active: z.boolean(),
  /** Fit for sale, promised ones among them. */
  saleable: z.int(),
  /** Promised to orders and not picked yet. */
  held: z.int(),
  /** Can still be ordered. */
  free: z.int(),
  version,
});
export type Listing = z.infer<typeof Listing>;

export const listingPrice = price.min(1, 'Enter a price above zero.');
export const CreateListing = z.strictObject({ lineId: id, grade, priceMinor: listingPrice });
export type CreateListing = z.infer<typeof CreateListing>;
export const EditListing = z.strictObject({ priceMinor: listingPrice.optional(), active: z.boolean().optional() });
export type EditListing = z.infer<typeof EditListing>;

export const listingEndpoints = {
  list: {
    method: 'get',
    path: '/api/listings',
    access: 'listings.read',
    summary: 'What is offered to stores, and at which price',
    query: listQuery,
    response: pageOf(Listing),
  },
  create: {
    method: 'post',
    path: '/api/listings',
    access: 'listings.price',
    summary: 'Offer a line in a grade',
    body: CreateListing,
    response: Listing,
    creates: true,
  },
  edit: {
    method: 'patch',
    path: '/api/listings/:id',
    access: 'listings.price',
    summary: 'Change a price, or switch an offer off or on',
    params: idParams,
    body: EditListing,
    response: Listing,
    edits: true,
  },
} as const satisfies Record<string, Endpoint>;
