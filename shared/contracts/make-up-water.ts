import { z } from 'zod';
import { CARTRIDGE_STAGES } from '../domain/cartridges.ts';
import { calendarDay, done, id, idParams, instant, nothing, noteText, shortText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

const tds = z.number('Enter the TDS.').min(0, 'Zero or more.').max(5000, 'At most 5,000 mg/L.').nullable();
const litresMade = z.number('Enter the litres.').min(0, 'Zero or more.').max(10_000_000).nullable();

/** A look at the unit that makes pure water; TDS in mg/L. */
export const MakeUpReading = z.object({
  id,
  at: instant,
  tdsIn: tds,
  tdsMembrane: tds,
  tdsOut: tds,
  /** Since the look before. */
  litresMade,
  /** Part of the salts that the membrane held back, %. */
  rejection: z.number().nullable(),
  by: z.string(),
  note: z.string(),
});
export type MakeUpReading = z.infer<typeof MakeUpReading>;

export const LogMakeUpReading = z
  .strictObject({
    at: instant.optional(),
    tdsIn: tds.optional(),
    tdsMembrane: tds.optional(),
    tdsOut: tds.optional(),
    litresMade: litresMade.optional(),
    note: noteText.default(''),
  })
  .superRefine((given, context) => {
    const values = [given.tdsIn, given.tdsMembrane, given.tdsOut, given.litresMade];
    if (values.every((value) => value === undefined || value === null)) {
      context.addIssue({ code: 'custom', path: ['tdsOut'], message: 'Enter one of the readings at least.' });
    }
    if (typeof given.tdsIn === 'number' && typeof given.tdsMembrane === 'number' && given.tdsMembrane > given.tdsIn) {
      const message = 'More than went in: check which meter was read.';
      context.addIssue({ code: 'custom', path: ['tdsMembrane'], message });
    }
  });
export type LogMakeUpReading = z.infer<typeof LogMakeUpReading>;

const lifeDays = z.int('Enter whole days.').min(1, 'At least a day.').max(3650, 'At most ten years.').nullable();
const lifeL = z.number('Enter the litres.').min(1, 'At least 1 L.').max(100_000_000).nullable();
const limit = z.number('Enter the limit.').min(0, 'Zero or more.').max(5000, 'At most 5,000.').nullable();

/** A cartridge that is in the unit or was; `limit` is % rejection for a membrane and mg/L TDS for resin. */
export const Cartridge = z.object({
  id,
  stage: z.enum(CARTRIDGE_STAGES),
  name: z.string(),
  itemId: id.nullable(),
  installedOn: calendarDay,
  removedOn: calendarDay.nullable(),
  lifeDays,
  lifeL,
  limit,
  daysUsed: z.int(),
  litresUsed: z.number(),
  state: z.enum(['ok', 'soon', 'due']),
  dueBy: z.enum(['days', 'litres', 'limit']).nullable(),
  usedPart: z.number(),
  by: z.string(),
  note: z.string(),
  version,
});
export type Cartridge = z.infer<typeof Cartridge>;

export const InstallCartridge = z.strictObject({
  stage: z.enum(CARTRIDGE_STAGES, 'Choose where it sits.'),
  name: shortText,
  installedOn: calendarDay.optional(),
  lifeDays: lifeDays.optional(),
  lifeL: lifeL.optional(),
  limit: limit.optional(),
  /** A supply of which one piece is taken. */
  itemId: id.nullable().optional(),
  /** The cartridge that it takes the place of. */
  replacesId: id.nullable().optional(),
  note: noteText.default(''),
});
export type InstallCartridge = z.infer<typeof InstallCartridge>;

export const MakeUpWater = z.object({
  /** Newest first. */
  readings: z.array(MakeUpReading),
  /** Those in the unit, in the order that water runs through them. */
  cartridges: z.array(Cartridge),
  /** Those taken out, latest first. */
  replaced: z.array(Cartridge),
  /** Mean of the last four weeks; null where too little was logged. */
  litresPerDay: z.number().nullable(),
});
export type MakeUpWater = z.infer<typeof MakeUpWater>;

export const makeUpWaterEndpoints = {
  show: {
    method: 'get',
    path: '/api/make-up-water',
    access: 'water.read',
    summary: 'Quality of the make-up water, and the cartridges that make it',
    query: nothing,
    response: MakeUpWater,
  },
  log: {
    method: 'post',
    path: '/api/make-up-water/readings',
    access: 'water.log',
    summary: 'Log TDS and litres of the make-up water unit',
    body: LogMakeUpReading,
    response: MakeUpReading,
    creates: true,
  },
  undoReading: {
    method: 'delete',
    path: '/api/make-up-water/readings/:id',
    access: 'water.log',
    summary: 'Take a make-up water reading back',
    params: idParams,
    response: done,
  },
  install: {
    method: 'post',
    path: '/api/make-up-water/cartridges',
    access: 'water.log',
    summary: 'Install a cartridge, in place of another where there is one',
    body: InstallCartridge,
    response: Cartridge,
    creates: true,
  },
  undoInstall: {
    method: 'delete',
    path: '/api/make-up-water/cartridges/:id',
    access: 'water.log',
    summary: 'Take back the installing of a cartridge; the one before is in again',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
