import { z } from 'zod';
import { done, id, idParams, instant, noteText } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { litres, parameterCode } from './systems.ts';

const Chem = z.object({
  alkalinityMeqL: z.number(),
  calciumMgL: z.number(),
  salinity: z.number(),
  phNbs: z.number(),
  phTotal: z.number(),
  omegaAragonite: z.number(),
  pco2Uatm: z.number(),
});

const limit = z.enum(['ph', 'omega', 'change', 'beyond']);

/** Limewater that ran into a system all at once. */
export const Overfill = z.object({
  id,
  systemId: id,
  reservoirId: id,
  reservoirCode: z.string(),
  litres: z.number(),
  alkalinityMeqL: z.number(),
  at: instant,
  by: z.string(),
  note: z.string(),
});
export type Overfill = z.infer<typeof Overfill>;

/** What happens if the top-off control of a system sticks. */
export const SystemOverfill = z.object({
  systemId: id,
  systemCode: z.string(),
  netVolumeL: z.number(),
  /** What is online, or what would go online next; null where the system has no limewater standing. */
  reservoir: z
    .object({
      id,
      code: z.string(),
      isOnline: z.boolean(),
      levelL: z.number(),
      usableL: z.number(),
      volumeL: z.number(),
      alkalinityMeqL: z.number(),
      acetateMeqL: z.number(),
      pumpLPerH: z.number().nullable(),
    })
    .nullable(),
  /** The water that it would run into; `takenAt` null where a usual value stands in for a test. */
  water: z.array(z.object({ parameter: parameterCode, value: z.number(), takenAt: instant.nullable() })),
  /** What would run in. */
  litres: z.number(),
  /** Just before, when mixed, and in balance with the room; null where it is beyond what can be reckoned. */
  effect: z.object({ before: Chem, atOnce: Chem, equilibrated: Chem }).nullable(),
  broken: z.array(limit),
  limits: z.object({ ph: z.number(), omegaAragonite: z.number(), changeMeqL: z.number() }),
  /** The most that may stand in the reservoir above its intake; null without one, or where the tests can't be true. */
  largest: z.object({ litres: z.number(), stoppedBy: limit.nullable() }).nullable(),
  roomPco2Uatm: z.number(),
  /** Overfills of the last 30 days, newest first. */
  recent: z.array(Overfill),
});
export type SystemOverfill = z.infer<typeof SystemOverfill>;

export const AskOverfill = z.strictObject({
  /** Another reservoir than the one that is online. */
  reservoirId: id.optional(),
  /** A pump that runs so many hours until somebody sees it; all of the reservoir when left out. */
  litresPerHour: z.coerce.number().positive().max(10_000).optional(),
  hours: z.coerce.number().positive().max(240).optional(),
});
export type AskOverfill = z.infer<typeof AskOverfill>;

export const LogOverfill = z.strictObject({
  reservoirId: id.optional(),
  at: instant.optional(),
  /** What ran in; all above the intake when left out. */
  litres: litres.optional(),
  /** What stood in the reservoir just before; by its last level and usual use when left out. */
  levelBeforeL: z.number('Enter the litres.').min(0, 'Zero or more.').max(10_000_000).optional(),
  note: noteText.default(''),
});
export type LogOverfill = z.infer<typeof LogOverfill>;

export const overfillEndpoints = {
  ask: {
    method: 'get',
    path: '/api/systems/:id/overfill',
    access: 'water.read',
    summary: 'What happens if the top-off control sticks',
    params: idParams,
    query: AskOverfill,
    response: SystemOverfill,
  },
  log: {
    method: 'post',
    path: '/api/systems/:id/overfills',
    access: 'water.log',
    summary: 'Log that limewater ran in all at once',
    params: idParams,
    body: LogOverfill,
    response: Overfill,
    creates: true,
  },
  undo: {
    method: 'delete',
    path: '/api/overfills/:id',
    access: 'water.log',
    summary: 'Take an overfill back',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
