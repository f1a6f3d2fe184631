import { z } from 'zod';
import { currencyCode, emailAddress, shortText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

/** How long an unpaid order may keep its pieces. The payment service keeps a checkout open for half an hour at least. */
export const HOLD_MINUTES = { least: 31, most: 24 * 60 } as const;

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
  /** How long an unpaid order keeps its pieces, minutes. */
  holdMinutes: z.int(),
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
  holdMinutes: z
    .int('Enter whole minutes.')
    .min(HOLD_MINUTES.least, `At least ${HOLD_MINUTES.least} minutes: the payment page stays open for half an hour.`)
    .max(HOLD_MINUTES.most, 'At most 1440 minutes, which is a day.')
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
