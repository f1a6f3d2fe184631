import { z } from 'zod';
import { GRADES, type GradeCode } from '../../domain/growth.ts';
import { GROWTH_FORMS } from '../../domain/growth-forms.ts';
import { calendarDay, instant } from '../common.ts';

/** Values that the stock's contracts share. Lengths are millimetres. */
export const lineCode = z
  .string()
  .trim()
  .toUpperCase()
  .regex(/^[A-Z]{3}$/, 'Use three letters, like WIG.');
export const growthForm = z.enum(
  GROWTH_FORMS.map(({ code }) => code),
  'Choose a growth form.',
);
export const grade = z.enum(GRADES.map(({ code }): GradeCode => code) as [GradeCode, ...GradeCode[]]);
export const sizeMm = z
  .number('Enter a size in millimetres.')
  .positive('A size is more than zero.')
  .max(1500, 'At most 1,500 mm.');
/** A plug code as scanned or typed; the service reads it forgivingly. */
export const plugCodeText = z.string().trim().min(1, 'Scan or type a plug code.').max(200);
export const plugCodes = z.array(plugCodeText).min(1, 'Scan a plug first.').max(500, 'At most 500 plugs at once.');
/** A place on a rack: row letter, dash, column number, like C-11. */
export const position = z
  .string()
  .trim()
  .toUpperCase()
  .regex(/^[A-Z]-?[1-9]\d?$/, 'Use a row letter and a column number, like C-11.')
  .transform((text) => (text.includes('-') ? text : `${text.charAt(0)}-${text.slice(1)}`));
/** When something happened; left out: now. */
export const happenedAt = instant.optional();

export const SYSTEM_KINDS = ['growout', 'broodstock', 'quarantine'] as const;

/** Pieces of a batch, a line or the farm, by what can be done with them. */
export const StockCounts = z.object({
  /** Living pieces: on racks, on the bench and picked for orders. */
  alive: z.int(),
  onRacks: z.int(),
  /** Cut and labelled, but not placed on a rack yet. */
  bench: z.int(),
  /** Healed, large enough and not withheld, on racks outside quarantine. Promised ones are still among them. */
  saleable: z.int(),
  /** Promised to orders and not picked yet. */
  held: z.int(),
  /** On racks, but kept from sale by hand. */
  withheld: z.int(),
});
export type StockCounts = z.infer<typeof StockCounts>;

export const GradeCount = z.object({ grade, alive: z.int(), saleable: z.int() });
export type GradeCount = z.infer<typeof GradeCount>;

export const LineRef = z.object({
  id: z.string(),
  code: z.string(),
  tradeName: z.string(),
  taxon: z.string(),
  growthForm: z.string(),
});
export const RackRef = z.object({
  id: z.string(),
  code: z.string(),
  tankId: z.string(),
  tankName: z.string(),
  systemId: z.string(),
  systemCode: z.string(),
  systemName: z.string(),
  systemKind: z.enum(SYSTEM_KINDS),
});
export type RackRef = z.infer<typeof RackRef>;

/** Expected growth of a batch today and when it becomes what stores buy. */
export const SizeOutlook = z.object({
  mm: z.number(),
  mmPerWeek: z.number(),
  grade,
  healed: z.boolean(),
  healedOn: calendarDay,
  /** First day healed and large enough for the smallest grade that is sold; null: not within ten years. */
  saleableOn: calendarDay.nullable(),
  measuredOn: calendarDay.nullable(),
});
export type SizeOutlook = z.infer<typeof SizeOutlook>;
