import { z } from 'zod';
import { RESERVOIR_EVENT_KINDS } from '../domain/reservoir-state.ts';
import { done, id, idParams, instant, listQuery, pageOf, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import {
  ChangeOver,
  CheckStrength,
  CleanReservoir,
  LogLevel,
  MarkSpent,
  RefillReservoir,
  RemoveSludge,
  TopUp,
  UndoEvent,
} from './reservoir-acts.ts';
import { CreateReservoir, EditReservoir, ShareReservoir } from './reservoir-set-up.ts';

export const RESERVOIR_STATES = ['standby', 'settling', 'online', 'spent'] as const;
export type ReservoirState = (typeof RESERVOIR_STATES)[number];

export const ReservoirFeed = z.object({ systemId: id, systemCode: z.string(), share: z.number() });
export type ReservoirFeed = z.infer<typeof ReservoirFeed>;

export const Reservoir = z.object({
  id,
  code: z.string(),
  /** The system it belongs to; `feeds` holds all that it feeds. */
  systemId: id,
  systemCode: z.string(),
  systemName: z.string(),
  /** What it holds when full. */
  volumeL: z.number(),
  /** A settling reservoir stands by from `readyAt` on. */
  state: z.enum(RESERVOIR_STATES),
  levelL: z.number(),
  /** What stands above the intake; all of it where the intake is not known. */
  usableL: z.number(),
  belowIntakeL: z.number(),
  alkalinityMeqL: z.number(),
  readyAt: instant.nullable(),
  /** When its level was last known. */
  levelAt: instant.nullable(),
  /** Mean use while online, last 7 days. */
  litresPerDay: z.number().nullable(),
  /** When it runs dry at its intake at that use; online reservoirs only. */
  emptyAt: instant.nullable(),
  /** What the whole of it would add to the smallest system that it feeds, were it dosed at once, meq/L. */
  wholeDoseMeqL: z.number(),
  ...{ heightMm: z.number().nullable(), footprintCm2: z.number().nullable(), intakeMm: z.number().nullable() },
  covered: z.boolean(),
  pumpLPerH: z.number().nullable(),
  ...{ replaceDays: z.int().nullable(), sludgeWeeks: z.int() },
  onlineSince: instant.nullable(),
  /** When it should be replaced, by the farm's habit; online reservoirs only. */
  dueAt: instant.nullable(),
  sludgeDueAt: instant.nullable(),
  /** The last strength check of what stands in it: a part of what was expected. */
  lastCheck: z.object({ at: instant, strengthLeft: z.number() }).nullable(),
  strengthLow: z.boolean(),
  feeds: z.array(ReservoirFeed),
  retiredAt: instant.nullable(),
  version,
});
export type Reservoir = z.infer<typeof Reservoir>;

export const ReservoirEvent = z.object({
  id,
  reservoirId: id,
  kind: z.enum(RESERVOIR_EVENT_KINDS),
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
  conductivityMsCm: z.number().nullable(),
  freshMsCm: z.number().nullable(),
  strengthLeft: z.number().nullable(),
  intakeMm: z.number().nullable(),
  covered: z.boolean().nullable(),
  note: z.string(),
});
export type ReservoirEvent = z.infer<typeof ReservoirEvent>;

/** What a refill made, beside the reservoir as it stands now. */
export const RefillResult = z.object({
  reservoir: Reservoir,
  event: ReservoirEvent,
  vinegarHelps: z.boolean(),
  shortOf: z.enum(['lime', 'solubility']),
  saturation: z.number(),
});
export type RefillResult = z.infer<typeof RefillResult>;

/** A reservoir as it stands after something happened to it, and what did. */
export const ReservoirChange = z.object({ reservoir: Reservoir, event: ReservoirEvent });
export type ReservoirChange = z.infer<typeof ReservoirChange>;

/** Amounts of a mix, for the card that is printed. */
const MixingCard = z.strictObject({
  waterL: z.coerce.number().min(0.001).max(10_000_000),
  limeG: z.coerce.number().min(0).max(1_000_000),
  vinegarMl: z.coerce.number().min(0).max(1_000_000).default(0),
  temperatureC: z.coerce.number().min(15).max(30).default(25),
});
export type MixingCard = z.infer<typeof MixingCard>;

export const reservoirEndpoints = {
  list: {
    method: 'get',
    path: '/api/reservoirs',
    access: 'water.read',
    summary: 'Reservoirs of limewater',
    query: z.strictObject({ systemId: id.optional(), retired: z.enum(['no', 'only']).default('no') }),
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
    response: ReservoirChange,
    creates: true,
  },
  topUp: {
    method: 'post',
    path: '/api/reservoirs/:id/top-ups',
    access: 'water.log',
    summary: 'Add plain water to a reservoir',
    params: idParams,
    body: TopUp,
    response: ReservoirChange,
    creates: true,
  },
  checkStrength: {
    method: 'post',
    path: '/api/reservoirs/:id/strength-checks',
    access: 'water.log',
    summary: 'Check the strength of a reservoir by its conductivity',
    params: idParams,
    body: CheckStrength,
    response: ReservoirChange,
    creates: true,
  },
  removeSludge: {
    method: 'post',
    path: '/api/reservoirs/:id/sludge-removals',
    access: 'water.log',
    summary: 'Take the sludge out of a reservoir',
    params: idParams,
    body: RemoveSludge,
    response: ReservoirChange,
    creates: true,
  },
  markSpent: {
    method: 'post',
    path: '/api/reservoirs/:id/spent',
    access: 'water.log',
    summary: 'Take a reservoir off with nothing in its place',
    params: idParams,
    body: MarkSpent,
    response: ReservoirChange,
    creates: true,
  },
  clean: {
    method: 'post',
    path: '/api/reservoirs/:id/cleanings',
    access: 'water.log',
    summary: 'Empty and clean a reservoir',
    params: idParams,
    body: CleanReservoir,
    response: ReservoirChange,
    creates: true,
  },
  share: {
    method: 'put',
    path: '/api/reservoirs/:id/feeds',
    access: 'water.configure',
    summary: 'Set which systems a reservoir feeds, and the share of each',
    params: idParams,
    body: ShareReservoir,
    response: Reservoir,
    edits: true,
  },
  mixingCard: {
    method: 'get',
    path: '/api/reservoirs/:id/mixing-card.pdf',
    access: 'water.read',
    summary: 'The mixing card as a PDF',
    params: idParams,
    query: MixingCard,
    answer: 'file',
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
