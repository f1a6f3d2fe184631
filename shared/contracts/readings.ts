import { z } from 'zod';
import { PARAMETER_CODES } from '../domain/units.ts';
import { calendarDay, done, id, idParams, instant, listQuery, noteText, nothing, pageOf, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { parameterCode, TargetBand } from './systems.ts';

/** A stated value in the parameter's canonical unit, and what it was made from. */
export const Reading = z.object({
  id,
  systemId: id,
  systemCode: z.string(),
  systemName: z.string(),
  parameter: parameterCode,
  /** The mean of the tests, less the bias of the kit where a check tells it. */
  value: z.number(),
  /** The mean as it was read. */
  measured: z.number(),
  /** Standard deviation by the scatter of tests. */
  sd: z.number(),
  /** Each test, where there was more than one. */
  repeats: z.array(z.number()),
  correction: z.object({ calibrationId: id, bias: z.number(), biasSd: z.number() }).nullable(),
  /** The unit that it was typed in; empty where that is not known. */
  unit: z.string(),
  method: z.string(),
  methodId: id.nullable(),
  kitLotId: id.nullable(),
  kitLotCode: z.string(),
  note: z.string(),
  photoId: id.nullable(),
  takenAt: instant,
  by: z.string(),
  importId: id.nullable(),
  version,
});
export type Reading = z.infer<typeof Reading>;

const method = z.string().trim().max(80, 'At most 80 characters.');
const unit = z.string().max(20);
const value = z.number('Enter a number.');
export const MOST_REPEATS = 9;

/** One parameter's test. An unusual value is stored only when it is confirmed; an impossible one never. */
const TestedValue = z.strictObject({
  parameter: parameterCode,
  value,
  unit,
  /** Further tests of the same water, in the same unit. */
  repeats: z
    .array(value)
    .max(MOST_REPEATS, `At most ${MOST_REPEATS + 1} tests.`)
    .optional(),
  methodId: id.nullable().optional(),
  kitLotId: id.nullable().optional(),
  confirmed: z.boolean().optional(),
});
export type TestedValue = z.infer<typeof TestedValue>;

export const LogReadings = z.strictObject({
  systemId: id,
  takenAt: instant.optional(),
  values: z.array(TestedValue).min(1, 'Enter at least one value.').max(PARAMETER_CODES.length),
  /** In words, where no method of the farm is named at the value. */
  method: method.default(''),
  /** Who tested; the one who logs when left out. */
  testerId: id.optional(),
  note: noteText.default(''),
  photoId: id.optional(),
});
export type LogReadings = z.infer<typeof LogReadings>;

export const EditReading = z.strictObject({
  /** Instead of all tests of the reading. */
  value: value.optional(),
  /** Unit of `value`; the canonical one when left out. */
  unit: unit.optional(),
  confirmed: z.boolean().optional(),
  takenAt: instant.optional(),
  method: method.optional(),
  methodId: id.nullable().optional(),
  kitLotId: id.nullable().optional(),
  note: noteText.optional(),
  photoId: id.nullable().optional(),
});
export type EditReading = z.infer<typeof EditReading>;

export const ReadingFilter = z.strictObject({
  systemId: id.optional(),
  parameter: parameterCode.optional(),
  methodId: id.optional(),
  by: z.string().max(120).optional(),
  /** Days of the farm, both included. */
  from: calendarDay.optional(),
  to: calendarDay.optional(),
  importId: id.optional(),
});
export type ReadingFilter = z.infer<typeof ReadingFilter>;
export const ListReadings = z.strictObject({
  ...listQuery.pick({ cursor: true, limit: true }).shape,
  ...ReadingFilter.shape,
});
export type ListReadings = z.infer<typeof ListReadings>;

/** What a tester needs beside the fields of one system. */
export const LogSheet = z.object({
  parameters: z.array(
    z.object({
      parameter: parameterCode,
      band: TargetBand.nullable(),
      last: z
        .object({
          value: z.number(),
          sd: z.number(),
          takenAt: instant,
          methodId: id.nullable(),
          kitLotId: id.nullable(),
        })
        .nullable(),
      /** What this person last read this parameter in; empty where that is not known. */
      unit: z.string(),
      methodId: id.nullable(),
      kitLotId: id.nullable(),
    }),
  ),
  /** Of the last dose of a supplement other than limewater. */
  lastDoseAt: instant.nullable(),
  testers: z.array(z.object({ id, name: z.string() })),
});
export type LogSheet = z.infer<typeof LogSheet>;

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
  logSheet: {
    method: 'get',
    path: '/api/systems/:id/log-sheet',
    access: 'water.log',
    summary: 'What stands beside the fields for logging readings of a system',
    params: idParams,
    response: LogSheet,
  },
  people: {
    method: 'get',
    path: '/api/readings/people',
    access: 'water.read',
    summary: 'Names that readings were logged under',
    query: nothing,
    response: z.object({ items: z.array(z.string()) }),
  },
} as const satisfies Record<string, Endpoint>;
