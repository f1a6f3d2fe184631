import { z } from 'zod';
import { Alert } from './alerts.ts';
import { instant, nothing } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { SystemGlance } from './water.ts';

/** A system on the page of all systems. */
export const WaterSystem = z.object({
  ...SystemGlance.shape,
  /** Alkalinity of the last month, few enough points for a small picture. */
  recent: z.array(z.object({ at: instant, value: z.number() })),
  /** Open alerts that nobody said they know of, the most urgent first. */
  alerts: z.array(Alert),
});
export type WaterSystem = z.infer<typeof WaterSystem>;

export const waterOverviewEndpoints = {
  show: {
    method: 'get',
    path: '/api/water',
    access: 'water.read',
    summary: 'Every system at a glance, the most urgent first',
    query: nothing,
    response: z.object({
      /** The stretch of time that `recent` tells of. */
      from: instant,
      to: instant,
      items: z.array(WaterSystem),
    }),
  },
} as const satisfies Record<string, Endpoint>;
