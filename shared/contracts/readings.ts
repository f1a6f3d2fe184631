import { z } from 'zod';
import { PARAMETER_CODES } from '../domain/units.ts';
import { done, id, idParams, instant, listQuery, noteText, pageOf, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { parameterCode, TargetBand } from './systems.ts';

/** A measured value in the parameter's canonical unit. */
export const Reading = z.object({
  id,
  systemId: id,
  systemCode: z.string(),
  systemName: z.string(),
  parameter: parameterCode,
  value: z.number(),
  method: z.string(),
  note: z.string(),
  takenAt: instant,
  by: z.string(),
  importId: id.nullable(),
  version,
});
export type Reading = z.infer<typeof Reading>;

const method = z.string().trim().max(80, 'At most 80 characters.');
const unit = z.string().max(20);

export const LogReadings = z.strictObject({
  systemId: id,
  takenAt: instant.optional(),
  values: z
    .array(z.strictObject({ parameter: parameterCode, value: z.number('Enter a number.'), unit }))
    .min(1, 'Enter at least one value.')
    .max(PARAMETER_CODES.length),
  method: method.default(''),
  note: noteText.default(''),
});
export type LogReadings = z.infer<typeof LogReadings>;

export const EditReading = z.strictObject({
  value: z.number('Enter a number.').optional(),
  /** Unit of `value`; the canonical one when left out. */
  unit: unit.optional(),
  takenAt: instant.optional(),
  method: method.optional(),
  note: noteText.optional(),
});
export type EditReading = z.infer<typeof EditReading>;

export const ReadingFilter = z.strictObject({
  systemId: id.optional(),
  parameter: parameterCode.optional(),
  importId: id.optional(),
});
export type ReadingFilter = z.infer<typeof ReadingFilter>;
export const ListReadings = z.strictObject({
  ...listQuery.pick({ cursor: true, limit: true }).shape,
  ...ReadingFilter.shape,
});
export type ListReadings = z.infer<typeof ListReadings>;

export const SERIES_DAYS = [7, 30, 90, 365] as const;
export type SeriesDays = (typeof SERIES_DAYS)[number];

export const ReadingSeries = z.object({
  parameter: parameterCode,
  from: instant,
  to: instant,
  /** Each with half of the 95 % interval of its test. */
  points: z.array(z.object({ at: instant, value: z.number(), error: z.number() })),
  /** Readings in the period; more than points where the server left some out. */
  total: z.int(),
  band: TargetBand.nullable(),
});
export type ReadingSeries = z.infer<typeof ReadingSeries>;

export const readingEndpoints = {
  list: {
    method: 'get',
    path: '/api/readings',
    access: 'water.read',
    summary: 'Readings, newest first',
    query: ListReadings,
    response: pageOf(Reading),
  },
  log: {
    method: 'post',
    path: '/api/readings',
    access: 'water.log',
    summary: 'Log readings of one system at one time',
    body: LogReadings,
    response: z.object({ items: z.array(Reading) }),
    creates: true,
  },
  edit: {
    method: 'patch',
    path: '/api/readings/:id',
    access: 'water.log',
    summary: 'Correct a reading',
    params: idParams,
    body: EditReading,
    response: Reading,
    edits: true,
  },
  remove: {
    method: 'delete',
    path: '/api/readings/:id',
    access: 'water.log',
    summary: 'Take a reading back',
    params: idParams,
    response: done,
  },
  export: {
    method: 'get',
    path: '/api/readings/export',
    access: 'water.read',
    summary: 'Readings as a CSV file',
    query: ReadingFilter,
    answer: 'file',
  },
  series: {
    method: 'get',
    path: '/api/systems/:id/series',
    access: 'water.read',
    summary: 'Readings of one parameter for a chart',
    params: idParams,
    query: z.strictObject({
      parameter: parameterCode,
      days: z.coerce
        .number()
        .pipe(z.union(SERIES_DAYS.map((days) => z.literal(days))))
        .default(90),
    }),
    response: ReadingSeries,
  },
} as const satisfies Record<string, Endpoint>;
