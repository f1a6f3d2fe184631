import { z } from 'zod';
import { newWaterReadings } from './additions.ts';
import { done, id, idParams, instant, nothing, noteText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { litres } from './systems.ts';

const temperatureC = z.number('Enter the temperature.').min(0, 'Zero or more.').max(40, 'At most 40 °C.');
const readings = {
  salinity: newWaterReadings.salinity.nullable(),
  alkalinityMeqL: newWaterReadings.alkalinityMeqL.nullable(),
  calciumMgL: newWaterReadings.calciumMgL.nullable(),
  magnesiumMgL: newWaterReadings.magnesiumMgL.nullable(),
  temperatureC: temperatureC.nullable(),
};

/** New salt water, mixed at one time. */
export const SaltBatch = z.object({
  id,
  litres: z.number(),
  remainingL: z.number(),
  saltName: z.string().nullable(),
  saltG: z.number(),
  ...readings,
  at: instant,
  readyAt: instant,
  by: z.string(),
  note: z.string(),
  state: z.enum(['mixing', 'ready', 'used', 'discarded']),
  version,
});
export type SaltBatch = z.infer<typeof SaltBatch>;

export const MixSaltBatch = z.strictObject({
  litres,
  saltG: z.number('Enter the salt.').min(0, 'Zero or more.').max(10_000_000, 'At most 10,000 kg.'),
  saltItemId: id.optional(),
  at: instant.optional(),
  /** How long it is left to mix before it is used; 12 to 24 hours are usual (common practice). */
  readyHours: z.number('Enter the hours.').min(0, 'Zero or more.').max(168, 'At most a week.').default(12),
  salinity: readings.salinity.optional(),
  alkalinityMeqL: readings.alkalinityMeqL.optional(),
  calciumMgL: readings.calciumMgL.optional(),
  magnesiumMgL: readings.magnesiumMgL.optional(),
  temperatureC: readings.temperatureC.optional(),
  note: noteText.default(''),
});
export type MixSaltBatch = z.infer<typeof MixSaltBatch>;

export const EditSaltBatch = z.strictObject({
  salinity: readings.salinity.optional(),
  alkalinityMeqL: readings.alkalinityMeqL.optional(),
  calciumMgL: readings.calciumMgL.optional(),
  magnesiumMgL: readings.magnesiumMgL.optional(),
  temperatureC: readings.temperatureC.optional(),
  note: noteText.optional(),
  /** What is left of it was poured away. */
  discarded: z.boolean().optional(),
});
export type EditSaltBatch = z.infer<typeof EditSaltBatch>;

export const saltBatchEndpoints = {
  list: {
    method: 'get',
    path: '/api/salt-batches',
    access: 'water.read',
    summary: 'New salt water: what is left first, then the latest',
    query: nothing,
    response: z.object({ items: z.array(SaltBatch) }),
  },
  mix: {
    method: 'post',
    path: '/api/salt-batches',
    access: 'water.log',
    summary: 'Mix new salt water',
    body: MixSaltBatch,
    response: SaltBatch,
    creates: true,
  },
  edit: {
    method: 'patch',
    path: '/api/salt-batches/:id',
    access: 'water.log',
    summary: 'Write down what new water tested at, or pour the rest away',
    params: idParams,
    body: EditSaltBatch,
    response: SaltBatch,
    edits: true,
  },
  undo: {
    method: 'delete',
    path: '/api/salt-batches/:id',
    access: 'water.log',
    summary: 'Take back a batch of which nothing was used',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
