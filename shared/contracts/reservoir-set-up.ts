import { z } from 'zod';
import { SLUDGE_WEEKS } from '../domain/reservoir-care.ts';
import { id, labelCode } from './common.ts';
import { litres } from './systems.ts';

/** What a vessel is like; null where nobody measured it. */
const heightMm = z.number().min(10, 'At least 10 mm.').max(10_000, 'At most 10,000 mm.');
const vessel = {
  heightMm: heightMm.nullable(),
  footprintCm2: z.number().min(1, 'At least 1 cm².').max(10_000_000, 'At most 10,000,000 cm².').nullable(),
  intakeMm: z.number().min(0, 'Zero or more.').max(10_000, 'At most 10,000 mm.').nullable(),
  covered: z.boolean(),
  pumpLPerH: z.number().min(0.01, 'At least 0.01 L an hour.').max(100_000, 'At most 100,000 L an hour.').nullable(),
  replaceDays: z.int('Whole days.').min(1, 'At least a day.').max(90, 'At most 90 days.').nullable(),
  sludgeWeeks: z
    .int('Whole weeks.')
    .min(SLUDGE_WEEKS.least, 'At least a week.')
    .max(SLUDGE_WEEKS.most, 'At most 26 weeks.'),
};

export const CreateReservoir = z.strictObject({
  ...{ code: labelCode, systemId: id, volumeL: litres },
  ...z.object(vessel).partial().shape,
});
export type CreateReservoir = z.infer<typeof CreateReservoir>;
export const EditReservoir = z.strictObject({
  ...z.object({ code: labelCode, volumeL: litres, ...vessel }).partial().shape,
  /** True puts it away for good, false brings it back. */
  retired: z.boolean().optional(),
});
export type EditReservoir = z.infer<typeof EditReservoir>;

export const ShareReservoir = z.strictObject({
  /** Parts of the whole flow; they add up to 1. The reservoir's own system is one of them. */
  feeds: z
    .array(
      z.strictObject({
        systemId: id,
        share: z.number('Enter the share.').min(0.001, 'At least 0.1 %.').max(1, 'At most 100 %.'),
      }),
    )
    .min(1, 'At least one system.')
    .max(20, 'At most 20 systems.'),
});
export type ShareReservoir = z.infer<typeof ShareReservoir>;
