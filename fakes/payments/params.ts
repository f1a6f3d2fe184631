import { z } from 'zod';
import { invalidRequest } from './api-error.ts';

/* Form bodies and query strings carry text only, so numbers arrive as digits. */

const integer = z
  .string()
  .regex(/^\d{1,15}$/, 'Invalid integer')
  .transform(Number);
const webUrl = z.url({ protocol: /^https?$/, error: 'Not a valid URL' }).max(5000);
const metadata = z
  .record(z.string().max(40), z.string().max(500))
  .refine((entries) => Object.keys(entries).length <= 50, 'Metadata can have up to 50 keys');
const currency = z
  .string()
  .regex(/^[a-z]{3}$/i, 'Invalid currency')
  .transform((code) => code.toLowerCase());
const expand = z.array(z.string().max(200)).max(20).default([]);

const lineItem = z.strictObject({
  quantity: integer.pipe(z.number().min(1).max(999_999)),
  price_data: z.strictObject({
    currency,
    unit_amount: integer.pipe(z.number().max(99_999_999)),
    tax_behavior: z.enum(['exclusive', 'inclusive', 'unspecified']).optional(),
    product_data: z.strictObject({
      name: z.string().min(1).max(1000),
      description: z.string().max(5000).optional(),
      images: z.array(webUrl).max(8).optional(),
      metadata: metadata.optional(),
    }),
  }),
});

export const CreateSession = z.strictObject({
  mode: z.literal('payment'),
  line_items: z.array(lineItem).min(1).max(100),
  success_url: webUrl,
  cancel_url: webUrl.optional(),
  client_reference_id: z.string().max(200).optional(),
  customer_email: z.email().max(800).optional(),
  metadata: metadata.default({}),
  payment_intent_data: z
    .strictObject({
      description: z.string().max(1000).optional(),
      metadata: metadata.default({}),
      receipt_email: z.email().optional(),
    })
    .default({ metadata: {} }),
  payment_method_types: z.array(z.literal('card')).optional(),
  expires_at: integer.optional(),
  locale: z.string().max(10).optional(),
  submit_type: z.enum(['auto', 'pay']).optional(),
  expand,
});
export type CreateSession = z.infer<typeof CreateSession>;

export const ListSessions = z.strictObject({
  limit: integer.pipe(z.number().min(1).max(100)).default(10),
  starting_after: z.string().optional(),
  payment_intent: z.string().optional(),
  status: z.enum(['open', 'complete', 'expired']).optional(),
  expand,
});
export type ListSessions = z.infer<typeof ListSessions>;

export const CreateRefund = z.strictObject({
  payment_intent: z.string().optional(),
  charge: z.string().optional(),
  amount: integer.pipe(z.number().min(1, 'Invalid positive integer')).optional(),
  reason: z.enum(['duplicate', 'fraudulent', 'requested_by_customer']).optional(),
  metadata: metadata.default({}),
  expand,
});
export type CreateRefund = z.infer<typeof CreateRefund>;

/** For requests that name an object and nothing else. */
export const OnlyExpand = z.strictObject({ expand });

/** Reads parameters, or throws the error which the payment service gives for the first that is wrong. */
export function readParams<Schema extends z.ZodType>(schema: Schema, input: unknown): z.output<Schema> {
  const result = schema.safeParse(input ?? {}, { reportInput: true });
  if (result.success) return result.data;

  const [issue] = result.error.issues;
  if (issue === undefined) throw invalidRequest('The parameters are not valid.');

  if (issue.code === 'unrecognized_keys') {
    const param = bracketed([...issue.path, issue.keys[0] ?? '']);
    throw invalidRequest(`Received unknown parameter: ${param}`, { code: 'parameter_unknown', param });
  }
  const param = bracketed(issue.path);
  if (issue.input === undefined) {
    throw invalidRequest(`Missing required param: ${param}.`, { code: 'parameter_missing', param });
  }
  const code = issue.message === 'Invalid integer' ? 'parameter_invalid_integer' : undefined;
  throw invalidRequest(`${issue.message} (${param})`, { param, ...(code !== undefined && { code }) });
}

/** `['line_items', 0, 'quantity']` as `line_items[0][quantity]`. */
function bracketed([first, ...rest]: readonly PropertyKey[]): string {
  return `${String(first ?? '')}${rest.map((key) => `[${String(key)}]`).join('')}`;
}
