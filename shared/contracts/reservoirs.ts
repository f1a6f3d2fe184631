import { z } from 'zod';
import { done, id, idParams, instant, labelCode, listQuery, noteText, pageOf, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { litres } from './systems.ts';

export const RESERVOIR_STATES = ['standby', 'settling', 'online', 'spent'] as const;
export type ReservoirState = (typeof RESERVOIR_STATES)[number];

export const Reservoir = z.object({
  id,
  code: z.string(),
  systemId: id,
  systemCode: z.string(),
  systemName: z.string(),
  volumeL: z.number(),
  /** A settling reservoir stands by from `readyAt` on. */
  state: z.enum(RESERVOIR_STATES),
  levelL: z.number(),
  alkalinityMeqL: z.number(),
  readyAt: instant.nullable(),
  /** When its level was last known. */
  levelAt: instant.nullable(),
  /** Mean use while online, last 7 days. */
  litresPerDay: z.number().nullable(),
  /** When it runs empty at that use; online reservoirs only. */
  emptyAt: instant.nullable(),
  /** What the whole of it would add to the system, were it dosed at once, meq/L. */
  wholeDoseMeqL: z.number(),
  version,
});
export type Reservoir = z.infer<typeof Reservoir>;

export const ReservoirEvent = z.object({
  id,
  reservoirId: id,
  kind: z.enum(['refill', 'level', 'online', 'offline']),
  at: instant,
  by: z.string(),
  levelBeforeL: z.number(),
  levelL: z.number(),
  alkalinityMeqL: z.number(),
  waterL: z.number().nullable(),
  limeG: z.number().nullable(),
  limePurity: z.number().nullable(),
  vinegarMl: z.number().nullable(),
  acidPercent: z.number().nullable(),
  temperatureC: z.number().nullable(),
  undissolvedG: z.number().nullable(),
  calciumMgL: z.number().nullable(),
  note: z.string(),
});
export type ReservoirEvent = z.infer<typeof ReservoirEvent>;

export const CreateReservoir = z.strictObject({ code: labelCode, systemId: id, volumeL: litres });
export type CreateReservoir = z.infer<typeof CreateReservoir>;
export const EditReservoir = CreateReservoir.pick({ code: true, volumeL: true }).partial().strict();
export type EditReservoir = z.infer<typeof EditReservoir>;

const level = z.number('Enter the litres.').min(0, 'Zero or more.').max(10_000_000);
const at = instant.optional();

export const RefillReservoir = z.strictObject({
  at,
  /** What was left in it before the new mix; the last known level when left out. */
  levelBeforeL: level.optional(),
  waterL: litres,
  limeG: z.number('Enter the grams.').min(0, 'Zero or more.').max(1_000_000),
  limeItemId: id.optional(),
  vinegarMl: z.number('Enter the millilitres.').min(0, 'Zero or more.').max(1_000_000).default(0),
  vinegarItemId: id.optional(),
  temperatureC: z.number().min(15, 'From 15 °C.').max(30, 'Up to 30 °C.').default(25),
  note: noteText.default(''),
});
export type RefillReservoir = z.infer<typeof RefillReservoir>;
export const LogLevel = z.strictObject({ at, levelL: level, note: noteText.default('') });
export type LogLevel = z.infer<typeof LogLevel>;
export const ChangeOver = z.strictObject({
  at,
  /** What is left in the reservoir that is online now; its last known level when left out. */
  formerLevelL: level.optional(),
  note: noteText.default(''),
});
export type ChangeOver = z.infer<typeof ChangeOver>;
export const UndoEvent = z.strictObject({ eventId: id });

/** What a refill made, beside the reservoir as it stands now. */
export const RefillResult = z.object({
  reservoir: Reservoir,
  event: ReservoirEvent,
  vinegarHelps: z.boolean(),
  shortOf: z.enum(['lime', 'solubility']),
  saturation: z.number(),
});
export type RefillResult = z.infer<typeof RefillResult>;

export const ChangeOverResult = z.object({ reservoir: Reservoir, event: ReservoirEvent });
export type ChangeOverResult = z.infer<typeof ChangeOverResult>;

export const reservoirEndpoints = {
  list: {
    method: 'get',
    path: '/api/reservoirs',
    access: 'water.read',
    summary: 'Reservoirs of limewater',
    query: z.strictObject({ systemId: id.optional() }),
    response: z.object({ items: z.array(Reservoir) }),
  },
  show: {
    method: 'get',
    path: '/api/reservoirs/:id',
    access: 'water.read',
    summary: 'One reservoir',
    params: idParams,
    response: Reservoir,
  },
  events: {
    method: 'get',
    path: '/api/reservoirs/:id/events',
    access: 'water.read',
    summary: 'What happened to a reservoir, newest first',
    params: idParams,
    query: listQuery.pick({ cursor: true, limit: true }),
    response: pageOf(ReservoirEvent),
  },
  create: {
    method: 'post',
    path: '/api/reservoirs',
    access: 'water.configure',
    summary: 'Add a reservoir',
    body: CreateReservoir,
    response: Reservoir,
    creates: true,
  },
  edit: {
    method: 'patch',
    path: '/api/reservoirs/:id',
    access: 'water.configure',
    summary: 'Change a reservoir',
    params: idParams,
    body: EditReservoir,
    response: Reservoir,
    edits: true,
  },
  refill: {
    method: 'post',
    path: '/api/reservoirs/:id/refills',
    access: 'water.log',
    summary: 'Mix limewater in a reservoir',
    params: idParams,
    body: RefillReservoir,
    response: RefillResult,
    creates: true,
  },
  logLevel: {
    method: 'post',
    path: '/api/reservoirs/:id/levels',
    access: 'water.log',
    summary: 'Log the level of a reservoir',
    params: idParams,
    body: LogLevel,
    response: ReservoirEvent,
    creates: true,
  },
  changeOver: {
    method: 'post',
    path: '/api/reservoirs/:id/changeovers',
    access: 'water.log',
    summary: 'Put a reservoir online in place of the one that was',
    params: idParams,
    body: ChangeOver,
    response: ChangeOverResult,
    creates: true,
  },
  undo: {
    method: 'post',
    path: '/api/reservoirs/:id/undo',
    access: 'water.log',
    summary: 'Take back the last event of a reservoir',
    params: idParams,
    body: UndoEvent,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
