import { z } from 'zod';
import type { Endpoint } from './endpoint.ts';

/** What a farm measured of its own limewater work; null where nobody has yet. */
export const LimewaterHabits = z.object({
  /** A level spoon of the farm's lime with the farm's spoon, g. */
  spoonG: z.number().nullable(),
  /** Conductivity of fresh saturated limewater by the farm's meter at 25 °C, mS/cm. */
  freshMsCm: z.number().nullable(),
});
export type LimewaterHabits = z.infer<typeof LimewaterHabits>;

export const ChangeLimewaterHabits = z.strictObject({
  spoonG: z
    .number('Enter the grams.')
    .min(0.2, 'At least 0.2 g in a spoon.')
    .max(500, 'At most 500 g in a spoon.')
    .optional(),
  freshMsCm: z.number('Enter the reading.').min(0.01, 'At least 0.01 mS/cm.').max(20, 'At most 20 mS/cm.').optional(),
});
export type ChangeLimewaterHabits = z.infer<typeof ChangeLimewaterHabits>;

export const limewaterHabitsEndpoints = {
  show: {
    method: 'get',
    path: '/api/limewater-habits',
    access: 'water.read',
    summary: 'The farm’s own spoon and its reading of fresh limewater',
    response: LimewaterHabits,
  },
  change: {
    method: 'patch',
    path: '/api/limewater-habits',
    access: 'water.configure',
    summary: 'Set the farm’s own spoon or its reading of fresh limewater',
    body: ChangeLimewaterHabits,
    response: LimewaterHabits,
  },
} as const satisfies Record<string, Endpoint>;
