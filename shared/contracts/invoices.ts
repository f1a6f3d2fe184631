import { z } from 'zod';
import { calendarDay, currencyCode, minorAmount } from './common.ts';

const Party = z.object({ name: z.string(), address: z.string(), email: z.string(), phone: z.string() });

/** All that an invoice says, kept as it was on its day. */
export const InvoiceContent = z.object({
  number: z.int(),
  orderNumber: z.int(),
  issuedOn: calendarDay,
  placedOn: calendarDay,
  currency: currencyCode,
  farm: Party,
  store: Party.extend({ code: z.string() }),
  lines: z.array(
    z.object({
      code: z.string(),
      name: z.string(),
      grade: z.string(),
      quantity: z.int(),
      priceMinor: minorAmount,
      amountMinor: minorAmount,
    }),
  ),
  subtotalMinor: minorAmount,
  /** Percent, with at most two decimals. */
  taxPercent: z.number(),
  taxMinor: minorAmount,
  totalMinor: minorAmount,
  /** Paid in all, and of that given back. */
  paidMinor: minorAmount,
  refundedMinor: minorAmount,
  carrier: z.string(),
  tracking: z.string(),
});
export type InvoiceContent = z.infer<typeof InvoiceContent>;
