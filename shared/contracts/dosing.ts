import { z } from 'zod';
import { done, id, idParams, instant, labelCode, nothing, noteText, shortText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

const amountPerDay = z
  .number('Enter the amount a day.')
  .min(0.001, 'At least 0.001.')
  .max(1_000_000, 'At most 1,000,000.');
const measured = z.number('Enter what came.').min(0.01, 'At least 0.01 mL.').max(100_000, 'At most 100 L.');
const minute = z.int('Enter a time.').min(0, 'Enter a time.').max(1439, 'Enter a time.');

/** Part of the day in which a pump runs, minutes after midnight on the farm's clock; it may go over midnight. */
export const DoseWindow = z
  .strictObject({ startMinute: minute, endMinute: minute })
  .refine(({ startMinute, endMinute }) => startMinute !== endMinute, {
    path: ['endMinute'],
    message: 'It must end at another time than it begins.',
  });
export type DoseWindow = z.infer<typeof DoseWindow>;

export const PumpCalibration = z.object({
  id,
  pumpId: id,
  askedMl: z.number(),
  measuredMl: z.array(z.number()),
  /** What came of each mL asked for, with its standard error where it was measured more than once. */
  factor: z.number(),
  error: z.number().nullable(),
  /** The pump was set right by it and gave what was asked from then on. */
  adjusted: z.boolean(),
  /** Change since the pump was left the time before, as a part; null for the first. */
  drift: z.number().nullable(),
  at: instant,
  by: z.string(),
  note: z.string(),
});
export type PumpCalibration = z.infer<typeof PumpCalibration>;

export const DosingPump = z.object({
  id,
  code: z.string(),
  name: z.string(),
  retired: z.boolean(),
  version,
  /** What comes of each mL asked for now. */
  factor: z.number(),
  /** Its last drift was so large that the tube wants care. */
  clean: z.boolean(),
  /** What it doses now. */
  doses: z.array(z.object({ systemId: id, systemCode: z.string(), itemName: z.string() })),
  calibrations: z.array(PumpCalibration),
});
export type DosingPump = z.infer<typeof DosingPump>;

/** A supplement given steadily; `toAt` is null while it runs. */
export const DosingRate = z.object({
  id,
  systemId: id,
  systemCode: z.string(),
  itemId: id,
  itemName: z.string(),
  unit: z.string(),
  pumpId: id.nullable(),
  pumpCode: z.string().nullable(),
  /** As the pump is set, in the item's unit. */
  amountPerDay: z.number(),
  /** As it comes by the pump's last calibration. */
  givenPerDay: z.number(),
  window: z.object({ startMinute: minute, endMinute: minute }).nullable(),
  fromAt: instant,
  toAt: instant.nullable(),
  by: z.string(),
  endedBy: z.string().nullable(),
  note: z.string(),
  /** What it brings the system in a day, as it comes. */
  brings: z.object({ alkalinityMeqL: z.number(), calciumMgL: z.number(), magnesiumMgL: z.number() }),
  /** What the books could not cover: it ran, but the lots held less. */
  unbooked: z.number(),
  /** When what is in store has run through at this rate and all others of it; null where nothing uses it up. */
  lastsUntil: instant.nullable(),
});
export type DosingRate = z.infer<typeof DosingRate>;

export const StartDosing = z.strictObject({
  systemId: id,
  itemId: id,
  pumpId: id.nullable().optional(),
  amountPerDay,
  window: DoseWindow.nullable().optional(),
  at: instant.optional(),
  note: noteText.default(''),
});
export type StartDosing = z.infer<typeof StartDosing>;
export const ChangeDosing = z.strictObject({
  amountPerDay,
  pumpId: id.nullable().optional(),
  window: DoseWindow.nullable().optional(),
  at: instant.optional(),
  note: noteText.default(''),
});
export type ChangeDosing = z.infer<typeof ChangeDosing>;

export const CreatePump = z.strictObject({ code: labelCode, name: shortText });
export type CreatePump = z.infer<typeof CreatePump>;
export const EditPump = z.strictObject({
  code: labelCode.optional(),
  name: shortText.optional(),
  retired: z.boolean().optional(),
});
export type EditPump = z.infer<typeof EditPump>;
export const CalibratePump = z.strictObject({
  askedMl: z.number('Enter what was asked for.').min(0.1, 'At least 0.1 mL.').max(10_000, 'At most 10 L.'),
  measuredMl: z.array(measured).min(1, 'Enter what came.').max(10, 'At most ten.'),
  adjusted: z.boolean().default(false),
  at: instant.optional(),
  note: noteText.default(''),
});
export type CalibratePump = z.infer<typeof CalibratePump>;

export const dosingEndpoints = {
  pumps: {
    method: 'get',
    path: '/api/dosing-pumps',
    access: 'water.read',
    summary: 'Dosing pumps with their calibrations',
    query: nothing,
    response: z.object({ items: z.array(DosingPump) }),
  },
  createPump: {
    method: 'post',
    path: '/api/dosing-pumps',
    access: 'water.configure',
    summary: 'Add a dosing pump',
    body: CreatePump,
    response: DosingPump,
    creates: true,
  },
  editPump: {
    method: 'patch',
    path: '/api/dosing-pumps/:id',
    access: 'water.configure',
    summary: 'Change a dosing pump, or retire it',
    params: idParams,
    body: EditPump,
    response: DosingPump,
    edits: true,
  },
  calibrate: {
    method: 'post',
    path: '/api/dosing-pumps/:id/calibrations',
    access: 'water.log',
    summary: 'Log what a pump gave when it was asked for an amount',
    params: idParams,
    body: CalibratePump,
    response: DosingPump,
    creates: true,
  },
  undoCalibration: {
    method: 'delete',
    path: '/api/pump-calibrations/:id',
    access: 'water.log',
    summary: 'Take a calibration back',
    params: idParams,
    response: done,
  },
  running: {
    method: 'get',
    path: '/api/dosing-rates',
    access: 'water.read',
    summary: 'What is dosed steadily now, in every system',
    query: nothing,
    response: z.object({ items: z.array(DosingRate) }),
  },
  ofSystem: {
    method: 'get',
    path: '/api/systems/:id/dosing-rates',
    access: 'water.read',
    summary: 'Steady dosing of a system, running ones first, then the latest that ended',
    params: idParams,
    response: z.object({ items: z.array(DosingRate) }),
  },
  start: {
    method: 'post',
    path: '/api/dosing-rates',
    access: 'water.log',
    summary: 'Begin to dose a supplement steadily',
    body: StartDosing,
    response: DosingRate,
    creates: true,
  },
  change: {
    method: 'post',
    path: '/api/dosing-rates/:id/changes',
    access: 'water.log',
    summary: 'Change a running dose from a time on',
    params: idParams,
    body: ChangeDosing,
    response: DosingRate,
    creates: true,
  },
  stop: {
    method: 'post',
    path: '/api/dosing-rates/:id/stop',
    access: 'water.log',
    summary: 'Stop a running dose',
    params: idParams,
    body: z.strictObject({ at: instant.optional() }),
    response: DosingRate,
    creates: true,
  },
  resume: {
    method: 'post',
    path: '/api/dosing-rates/:id/resume',
    access: 'water.log',
    summary: 'Take a stop back, as if it had never been',
    params: idParams,
    body: nothing,
    response: DosingRate,
    creates: true,
  },
  undo: {
    method: 'delete',
    path: '/api/dosing-rates/:id',
    access: 'water.log',
    summary: 'Take a dose back that was begun by mistake; the one that it changed runs on',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
