import { z } from 'zod';
import { done, id, idParams, instant, noteText } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { litres } from './systems.ts';

/** What was tested of new water; each may be left out where it was not. */
export const newWaterReadings = {
  alkalinityMeqL: z.number('Enter the alkalinity.').min(0, 'Zero or more.').max(20, 'At most 20 meq/L.'),
  calciumMgL: z.number('Enter the calcium.').min(0, 'Zero or more.').max(1500, 'At most 1,500 mg/L.'),
  magnesiumMgL: z.number('Enter the magnesium.').min(0, 'Zero or more.').max(4000, 'At most 4,000 mg/L.'),
  salinity: z.number('Enter the salinity.').min(0, 'Zero or more.').max(45, 'At most 45 ppt.'),
};

export const LogWaterChange = z
  .strictObject({
    systemId: id,
    at: instant.optional(),
    litres,
    /** A batch of new salt water that it comes from; what is left out here is taken from its readings. */
    saltBatchId: id.optional(),
    alkalinityMeqL: newWaterReadings.alkalinityMeqL.optional(),
    calciumMgL: newWaterReadings.calciumMgL.optional(),
    magnesiumMgL: newWaterReadings.magnesiumMgL.optional(),
    salinity: newWaterReadings.salinity.optional(),
    /** Salt weighed for this water alone; a batch has its own. */
    saltG: z.number().min(0, 'Zero or more.').max(10_000_000, 'At most 10,000 kg.').default(0),
    saltItemId: id.optional(),
  })
  .superRefine(({ saltBatchId, alkalinityMeqL, saltG }, context) => {
    if (saltBatchId === undefined && alkalinityMeqL === undefined) {
      context.addIssue({ code: 'custom', path: ['alkalinityMeqL'], message: 'Enter the alkalinity.' });
    }
    if (saltBatchId !== undefined && saltG > 0) {
      context.addIssue({
        code: 'custom',
        path: ['saltG'],
        message: 'The batch has its salt already. Leave it at zero.',
      });
    }
  });
export type LogWaterChange = z.infer<typeof LogWaterChange>;

export const LogDose = z.strictObject({
  systemId: id,
  itemId: id,
  at: instant.optional(),
  /** In the item's unit. */
  amount: z.number('Enter the amount.').positive('Above zero.').max(10_000_000),
  note: noteText.default(''),
});
export type LogDose = z.infer<typeof LogDose>;

/** A water change or a dose of another supplement. */
export const Addition = z.object({
  id,
  kind: z.enum(['water_change', 'dose']),
  systemId: id,
  at: instant,
  by: z.string(),
  name: z.string(),
  amount: z.number(),
  unit: z.string(),
  /** New water's alkalinity, or what the dose added to the system, meq/L. */
  alkalinityMeqL: z.number(),
  /** The same for calcium and magnesium, mg/L; null where the new water was not tested for it. */
  calciumMgL: z.number().nullable(),
  magnesiumMgL: z.number().nullable(),
  /** Of new water, ppt; null for doses and where it was not tested. */
  salinity: z.number().nullable(),
});
export type Addition = z.infer<typeof Addition>;

export const additionEndpoints = {
  list: {
    method: 'get',
    path: '/api/systems/:id/additions',
    access: 'water.read',
    summary: 'Latest water changes and doses',
    params: idParams,
    response: z.object({ items: z.array(Addition) }),
  },
  logWaterChange: {
    method: 'post',
    path: '/api/water-changes',
    access: 'water.log',
    summary: 'Log a water change',
    body: LogWaterChange,
    response: Addition,
    creates: true,
  },
  undoWaterChange: {
    method: 'delete',
    path: '/api/water-changes/:id',
    access: 'water.log',
    summary: 'Take a water change back',
    params: idParams,
    response: done,
  },
  logDose: {
    method: 'post',
    path: '/api/doses',
    access: 'water.log',
    summary: 'Log a dose of another supplement',
    body: LogDose,
    response: Addition,
    creates: true,
  },
  undoDose: {
    method: 'delete',
    path: '/api/doses/:id',
    access: 'water.log',
    summary: 'Take a dose back',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
