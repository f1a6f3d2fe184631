import { z } from 'zod';
import { id, instant, noteText } from './common.ts';
import { litres } from './systems.ts';

/** What people do to a reservoir. A level that is left out is the last known one. */
const level = z.number('Enter the litres.').min(0, 'Zero or more.').max(10_000_000);
const at = instant.optional();
const note = noteText.default('');

export const RefillReservoir = z.strictObject({
  at,
  /** What was left in it before the new mix. */
  levelBeforeL: level.optional(),
  waterL: litres,
  limeG: z.number('Enter the grams.').min(0, 'Zero or more.').max(1_000_000),
  limeItemId: id.optional(),
  vinegarMl: z.number('Enter the millilitres.').min(0, 'Zero or more.').max(1_000_000).default(0),
  vinegarItemId: id.optional(),
  temperatureC: z.number().min(15, 'From 15 °C.').max(30, 'Up to 30 °C.').default(25),
  note,
});
export type RefillReservoir = z.infer<typeof RefillReservoir>;

export const LogLevel = z.strictObject({ at, levelL: level, note });
export type LogLevel = z.infer<typeof LogLevel>;

export const ChangeOver = z.strictObject({
  at,
  /** What is left in the reservoir that is online now. */
  formerLevelL: level.optional(),
  /** Height of the intake above the bottom, mm; as the vessel has it when left out. */
  intakeMm: z.number('Enter the millimetres.').min(0, 'Zero or more.').max(10_000).optional(),
  covered: z.boolean().optional(),
  note,
});
export type ChangeOver = z.infer<typeof ChangeOver>;

/** Plain RO/DI water that makes up what evaporated or was short. */
export const TopUp = z.strictObject({ at, levelBeforeL: level.optional(), waterL: litres, note });
export type TopUp = z.infer<typeof TopUp>;

const conductivity = z
  .number('Enter the reading.')
  .min(0.01, 'At least 0.01 mS/cm.')
  .max(20, 'At most 20 mS/cm: limewater reads about 8 to 11.');
export const CheckStrength = z.strictObject({
  at,
  levelL: level.optional(),
  /** The meter's reading at 25 °C, mS/cm. */
  conductivityMsCm: conductivity,
  /** The farm's own reading of fresh saturated limewater by the same meter; kept for the next check. */
  freshMsCm: conductivity.optional(),
  note,
});
export type CheckStrength = z.infer<typeof CheckStrength>;

export const RemoveSludge = z.strictObject({ at, levelBeforeL: level.optional(), levelL: level, note });
export type RemoveSludge = z.infer<typeof RemoveSludge>;

export const MarkSpent = z.strictObject({ at, levelL: level.optional(), note });
export type MarkSpent = z.infer<typeof MarkSpent>;

export const CleanReservoir = z.strictObject({ at, levelBeforeL: level.optional(), note });
export type CleanReservoir = z.infer<typeof CleanReservoir>;

export const UndoEvent = z.strictObject({ eventId: id });
