import { z } from 'zod';
import { currencyCode, emailAddress, shortText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

/** The farm's settings. Address, e-mail and tax stand on invoices. */
export const FarmSettings = z.object({
  name: z.string(),
  timeZone: z.string(),
  currency: currencyCode,
  /** Once there is an order, amounts exist in this currency. */
  currencyLocked: z.boolean(),
  address: z.string(),
  email: z.string(),
  phone: z.string(),
  /** Tax on sales, percent, with at most two decimals. */
  taxPercent: z.number(),
  version,
});
export type FarmSettings = z.infer<typeof FarmSettings>;

export const ChangeFarm = z.strictObject({
  name: shortText.optional(),
  timeZone: z.string().min(1, 'Choose a time zone.').max(60).optional(),
  currency: currencyCode.optional(),
  address: z.string().trim().max(500, 'At most 500 characters.').optional(),
  email: z.union([emailAddress, z.literal('')], 'Enter an e-mail address like name@example.com.').optional(),
  phone: z.string().trim().max(40, 'At most 40 characters.').optional(),
  taxPercent: z
    .number()
    .min(0, 'Tax can not be negative.')
    .max(100, 'Tax can not be more than 100 %.')
    .multipleOf(0.01, 'At most two decimals.')
    .optional(),
});
export type ChangeFarm = z.infer<typeof ChangeFarm>;

export const farmEndpoints = {
  show: {
    method: 'get',
    path: '/api/farm',
    access: 'farm.configure',
    summary: 'Settings of the farm',
    response: FarmSettings,
  },
  change: {
    method: 'patch',
    path: '/api/farm',
    access: 'farm.configure',
    summary: 'Change settings of the farm',
    body: ChangeFarm,
    response: FarmSettings,
    edits: true,
  },
} as const satisfies Record<string, Endpoint>;
