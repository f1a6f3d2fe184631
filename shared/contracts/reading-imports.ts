import { z } from 'zod';
import { PARAMETER_CODES } from '../domain/units.ts';
import { done, id, idParams, instant } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { parameterCode } from './systems.ts';

/** Enough for as many rows as are allowed, of the widest file that the product itself writes. */
export const IMPORT_MAX_BYTES = 25_000_000;
export const IMPORT_MAX_ROWS = 100_000;
export const IMPORT_MAX_COLUMNS = 60;

/** A column of its own for each parameter; or one value a row, with columns that name its parameter and unit. */
export const COLUMN_ROLES = [
  ...(['ignore', 'taken', 'day', 'time', 'system', 'method', 'lot', 'tester', 'note'] as const),
  ...PARAMETER_CODES,
  ...(['parameter', 'value', 'unit'] as const),
] as const;
export type ColumnRole = (typeof COLUMN_ROLES)[number];

export const DATE_ORDERS = ['ymd', 'dmy', 'mdy'] as const;
export type DateOrder = (typeof DATE_ORDERS)[number];

/** What each column of a file means. */
export const ImportMapping = z.strictObject({
  columns: z
    .array(z.strictObject({ role: z.enum(COLUMN_ROLES), unit: z.string().max(20).default('') }))
    .min(1)
    .max(IMPORT_MAX_COLUMNS),
  dateOrder: z.enum(DATE_ORDERS),
  /** Zone of times that name none; the farm's when empty. */
  timeZone: z.string().max(60).default(''),
  decimalMark: z.enum(['point', 'comma']).default('point'),
  /** The system of all rows, where no column names it. */
  systemId: id.nullable().default(null),
});
export type ImportMapping = z.infer<typeof ImportMapping>;

/** Multipart forms carry text: the mapping travels as JSON. */
const mappingField = z
  .string()
  .max(20_000)
  .transform((text, context) => {
    const parsed = ImportMapping.safeParse(jsonOf(text));
    if (parsed.success) return parsed.data;
    context.addIssue({ code: 'custom', message: 'Choose again what each column means.' });
    return z.NEVER;
  });

export const PreviewImport = z.strictObject({ mapping: mappingField.optional(), systemId: id.optional() });
export const CommitImport = z.strictObject({ mapping: mappingField });

export const ImportProblem = z.object({ line: z.int(), column: z.string(), message: z.string() });
export type ImportProblem = z.infer<typeof ImportProblem>;

export const ImportPreview = z.object({
  fileName: z.string(),
  heads: z.array(z.string()),
  mapping: ImportMapping,
  /** The first rows as they are in the file. */
  sample: z.array(z.array(z.string())),
  rows: z.int(),
  /** Values that would be stored. */
  readings: z.int(),
  /** Values that are stored already, or stand twice in the file, and would be left out. */
  duplicates: z.int(),
  /** Rows that would be left out; the first problems of all. */
  badRows: z.int(),
  problems: z.array(ImportProblem),
  /** Times that came twice when the clocks went back, and were taken as the first. */
  twiceTimes: z.int(),
  first: z
    .array(
      z.object({
        line: z.int(),
        systemCode: z.string(),
        takenAt: instant,
        parameter: parameterCode,
        value: z.number(),
      }),
    )
    .max(20),
});
export type ImportPreview = z.infer<typeof ImportPreview>;

export const ReadingImport = z.object({
  id,
  fileName: z.string(),
  state: z.enum(['waiting', 'running', 'finished', 'failed']),
  rows: z.int(),
  rowsDone: z.int(),
  /** Stored so far. */
  readings: z.int(),
  duplicates: z.int(),
  badRows: z.int(),
  /** Why it failed; nothing of it is stored then. */
  failure: z.string().nullable(),
  at: instant,
  by: z.string(),
});
export type ReadingImport = z.infer<typeof ReadingImport>;

const upload = {
  field: 'file',
  maxBytes: IMPORT_MAX_BYTES,
  types: ['text/csv', 'text/plain', 'application/csv', 'application/vnd.ms-excel'],
} as const;

export const readingImportEndpoints = {
  list: {
    method: 'get',
    path: '/api/reading-imports',
    access: 'water.read',
    summary: 'Latest imports of readings',
    response: z.object({ items: z.array(ReadingImport) }),
  },
  preview: {
    method: 'post',
    path: '/api/reading-imports/preview',
    access: 'water.log',
    summary: 'What an import of this file would do',
    body: PreviewImport,
    upload,
    response: ImportPreview,
  },
  commit: {
    method: 'post',
    path: '/api/reading-imports',
    access: 'water.log',
    summary: 'Import the good rows of a file; a large one goes on after the answer',
    body: CommitImport,
    upload,
    response: ReadingImport,
    creates: true,
  },
  problems: {
    method: 'post',
    path: '/api/reading-imports/problems',
    access: 'water.log',
    summary: 'The rows of a file that would be left out, with the reasons, as a CSV file',
    body: CommitImport,
    upload,
    answer: 'file',
  },
  show: {
    method: 'get',
    path: '/api/reading-imports/:id',
    access: 'water.read',
    summary: 'How far an import is',
    params: idParams,
    response: ReadingImport,
  },
  undo: {
    method: 'delete',
    path: '/api/reading-imports/:id',
    access: 'water.log',
    summary: 'Take a whole import back, or stop one that is under way',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}
