import { z } from 'zod';
import { calendarDay, done, id, idParams, instant, nothing } from './common.ts';
import type { Endpoint } from './endpoint.ts';

/** A system's habit of changing water, with when it is due and what was done last. */
export const WaterChangePlan = z.object({
  systemId: id,
  systemCode: z.string(),
  systemName: z.string(),
  netVolumeL: z.number(),
  /** Null: no habit was set. */
  plan: z
    .object({
      everyDays: z.int(),
      fraction: z.number(),
      startOn: calendarDay,
      litres: z.number(),
      by: z.string(),
    })
    .nullable(),
  last: z.object({ at: instant, on: calendarDay, litres: z.number() }).nullable(),
  nextOn: calendarDay.nullable(),
  daysLate: z.int().min(0),
  /** The latest test of what a change moves; null where it was never tested. */
  levels: z.object({
    alkalinity: z.number().nullable(),
    calcium: z.number().nullable(),
    magnesium: z.number().nullable(),
    nitrate: z.number().nullable(),
    salinity: z.number().nullable(),
  }),
});
export type WaterChangePlan = z.infer<typeof WaterChangePlan>;

/** What the planned changes of the next weeks want. */
export const WaterChangePlans = z.object({
  items: z.array(WaterChangePlan),
  horizonDays: z.int(),
  /** Day by day, with what they add up to. */
  coming: z.array(
    z.object({
      on: calendarDay,
      systemId: id,
      systemCode: z.string(),
      litres: z.number(),
      saltG: z.number(),
      /** New water and salt in store that is left after this one; below zero it does not suffice. */
      leftL: z.number(),
      saltLeftG: z.number(),
    }),
  ),
  salinity: z.number(),
  readyL: z.number(),
  saltOnHandG: z.number(),
});
export type WaterChangePlans = z.infer<typeof WaterChangePlans>;

export const SetWaterChangePlan = z.strictObject({
  everyDays: z.int('Enter whole days.').min(1, 'At least a day.').max(365, 'At most 365 days.'),
  fraction: z.number('Enter the part.').min(0.001, 'At least 0.1 %.').max(1, 'At most all of it.'),
  startOn: calendarDay.optional(),
});
export type SetWaterChangePlan = z.infer<typeof SetWaterChangePlan>;

export const waterChangePlanEndpoints = {
  list: {
    method: 'get',
    path: '/api/water-change-plans',
    access: 'water.read',
    summary: 'When each system is due for a water change, and what the next weeks want',
    query: nothing,
    response: WaterChangePlans,
  },
  set: {
    method: 'put',
    path: '/api/systems/:id/water-change-plan',
    access: 'water.configure',
    summary: 'Set how often and how much water of a system is changed',
    params: idParams,
    body: SetWaterChangePlan,
    response: WaterChangePlan,
  },
  clear: {
    method: 'delete',
    path: '/api/systems/:id/water-change-plan',
    access: 'water.configure',
    summary: 'Give the habit up',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
