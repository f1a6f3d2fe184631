import { z } from 'zod';

/** Building blocks of the contracts. Strings and lists are always bounded. */
export const id = z.uuid();
export const shortText = z.string().trim().min(1, 'Fill this in.').max(120, 'At most 120 characters.');
export const noteText = z.string().trim().max(2000, 'At most 2,000 characters.');
export const emailAddress = z.email('Enter an e-mail address like name@example.com.').max(254).toLowerCase();
/** A short code printed on labels: capitals, digits and dashes. */
export const labelCode = z
  .string()
  .trim()
  .toUpperCase()
  .regex(/^[A-Z0-9][A-Z0-9-]{0,15}$/, 'Use up to 16 capitals, digits and dashes.');
export const calendarDay = z.iso.date('Enter a day like 2026-03-12.');
/** An instant: milliseconds since 1970 in UTC. */
export const instant = z.int().min(0).max(8_640_000_000_000_000);
export const currencyCode = z.string().regex(/^[A-Z]{3}$/, 'Use a three-letter currency code like EUR.');
export const minorAmount = z.int().min(-9_007_199_254_740_991).max(9_007_199_254_740_991);
export const price = z
  .int('Enter a whole number of minor units.')
  .min(0, 'A price can not be negative.')
  .max(100_000_000);
export const version = z.int().min(1);
export const pieces = z.int('Enter a whole number.').min(1, 'At least 1.').max(5000, 'At most 5,000 at once.');

export const idParams = z.strictObject({ id });
export const nothing = z.strictObject({});
/** The answer of what has nothing to tell; handlers return `DONE`. */
export const done = z.object({ ok: z.literal(true) });
export const DONE = { ok: true } as const;

/** Query of a list page: an opaque cursor from the answer before, and how many rows. */
export const listQuery = z.strictObject({
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
  search: z.string().trim().max(100).optional(),
});
export type ListQuery = z.infer<typeof listQuery>;

/** A page of a list: `nextCursor` is null on the last one; `total` counts all rows that match. */
export function pageOf<T extends z.ZodType>(item: T) {
  return z.object({ items: z.array(item), nextCursor: z.string().nullable(), total: z.int().min(0) });
}
export interface Page<T> {
  items: T[];
  nextCursor: string | null;
  total: number;
}

/** The body of every error answer: RFC 9457 problem details with a stable code and messages at fields. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  code: z.string(),
  detail: z.string(),
  requestId: z.string().optional(),
  fields: z.array(z.object({ path: z.string(), message: z.string() })),
  details: z.record(z.string(), z.unknown()),
});
export type Problem = z.infer<typeof problem>;
