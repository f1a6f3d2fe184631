import { z } from 'zod';
import { id, idParams, instant } from './common.ts';
import type { Endpoint } from './endpoint.ts';

const Rate = z.object({
  litresPerDay: z.number(),
  /** 95 % interval; null where there are too few looks to tell. */
  ...{ low: z.number().nullable(), high: z.number().nullable() },
  days: z.number(),
  stretches: z.int(),
});

/** Water that a system loses to the air. */
export const SystemEvaporation = z.object({
  systemId: id,
  /** From the limewater that replaced it. */
  byUse: Rate.nullable(),
  /** From the salt that stayed behind, between two readings without a water change. */
  bySalinity: Rate.extend({
    ...{ from: instant, to: instant, salinityFrom: z.number(), salinityTo: z.number(), toppedUpL: z.number() },
  }).nullable(),
  surfaceM2: z.number().nullable(),
  /** Against what any air takes from a square metre; null where the surface is not known. */
  bySurface: z
    .object({ perM2: z.number(), check: z.enum(['low', 'usual', 'high']), least: z.number(), most: z.number() })
    .nullable(),
});
export type SystemEvaporation = z.infer<typeof SystemEvaporation>;

export const evaporationEndpoints = {
  show: {
    method: 'get',
    path: '/api/systems/:id/evaporation',
    access: 'water.read',
    summary: 'Evaporation of a system, and how it was told',
    params: idParams,
    response: SystemEvaporation,
  },
} as const satisfies Record<string, Endpoint>;
