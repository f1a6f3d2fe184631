import { z } from 'zod';
import { calendarDay, done, id, idParams, instant, noteText, nothing, shortText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { parameterCode } from './systems.ts';

/** A box of reagents, or one instrument. */
export const KitLot = z.object({
  id,
  methodId: id,
  code: z.string(),
  openedOn: calendarDay.nullable(),
  expiresOn: calendarDay.nullable(),
  usedUp: z.boolean(),
  version,
});
export type KitLot = z.infer<typeof KitLot>;

/** A check against a known solution; figures in the parameter's canonical unit. */
export const Calibration = z.object({
  id,
  methodId: id,
  kitLotId: id.nullable(),
  at: instant,
  by: z.string(),
  note: z.string(),
  solution: z.string(),
  referenceValue: z.number(),
  /** Standard uncertainty of the solution. */
  referenceSd: z.number(),
  found: z.array(z.number()),
  mean: z.number(),
  /** How much too high the method reads. */
  bias: z.number(),
  biasSd: z.number(),
  /** 95 % interval of the bias. */
  low: z.number(),
  high: z.number(),
  /** Whether the bias can be told from zero. */
  isDistinct: z.boolean(),
  /** Readings that it corrects. */
  corrects: z.int(),
});
export type Calibration = z.infer<typeof Calibration>;

export const TestMethod = z.object({
  id,
  parameter: parameterCode,
  name: z.string(),
  /** The unit that the tester reads. */
  unit: z.string(),
  /** Half of the 95 % interval of one test, and the smallest step, in that unit. */
  error: z.number(),
  step: z.number(),
  /** Standard deviation of repeated tests, in the canonical unit. */
  repeatabilitySd: z.number(),
  source: z.string(),
  retired: z.boolean(),
  readings: z.int(),
  lots: z.array(KitLot),
  /** The latest ones, newest first. */
  calibrations: z.array(Calibration),
  version,
});
export type TestMethod = z.infer<typeof TestMethod>;

const unit = z.string().min(1, 'Choose a unit.').max(20);
/** No test shows less, in whatever unit. */
const LEAST = 0.000_001;
const error = z.number('Enter the error.').min(LEAST, 'Above zero.').max(10_000);
const step = z.number('Enter the step.').min(LEAST, 'Above zero.').max(10_000);
const source = z.string().trim().max(300, 'At most 300 characters.');
const lotCode = z.string().trim().min(1, 'Fill this in.').max(40, 'At most 40 characters.');

export const CreateTestMethod = z.strictObject({
  ...{ parameter: parameterCode, name: shortText, unit, error, step },
  source: source.default(''),
});
export type CreateTestMethod = z.infer<typeof CreateTestMethod>;

export const EditTestMethod = z.strictObject({
  ...{ name: shortText.optional(), unit: unit.optional(), error: error.optional(), step: step.optional() },
  ...{ source: source.optional(), retired: z.boolean().optional() },
});
export type EditTestMethod = z.infer<typeof EditTestMethod>;

export const AddKitLot = z.strictObject({
  code: lotCode,
  openedOn: calendarDay.nullable().default(null),
  expiresOn: calendarDay.nullable().default(null),
});
export type AddKitLot = z.infer<typeof AddKitLot>;

export const EditKitLot = z.strictObject({
  ...{ code: lotCode.optional(), usedUp: z.boolean().optional() },
  ...{ openedOn: calendarDay.nullable().optional(), expiresOn: calendarDay.nullable().optional() },
});
export type EditKitLot = z.infer<typeof EditKitLot>;

export const MOST_CHECK_TESTS = 10;
const number = z.number('Enter a number.');

export const Calibrate = z.strictObject({
  kitLotId: id.nullable().default(null),
  at: instant.optional(),
  solution: z.string().trim().max(120, 'At most 120 characters.').default(''),
  /** The unit of the values below. */
  unit,
  referenceValue: number,
  /** Half of the 95 % interval of the solution's value. */
  referenceError: number.min(0, 'Zero or more.').max(10_000),
  found: z.array(number).min(1, 'Enter at least one test.').max(MOST_CHECK_TESTS, `At most ${MOST_CHECK_TESTS} tests.`),
  note: noteText.default(''),
});
export type Calibrate = z.infer<typeof Calibrate>;

export const testMethodEndpoints = {
  list: {
    method: 'get',
    path: '/api/test-methods',
    access: 'water.read',
    summary: 'Test methods with their kit lots and checks',
    query: nothing,
    response: z.object({ items: z.array(TestMethod) }),
  },
  create: {
    method: 'post',
    path: '/api/test-methods',
    access: 'water.configure',
    summary: 'Add a test method',
    body: CreateTestMethod,
    response: TestMethod,
    creates: true,
  },
  addUsual: {
    method: 'post',
    path: '/api/test-methods/usual',
    access: 'water.configure',
    summary: 'Add the usual methods that are not there yet',
    body: nothing,
    response: z.object({ items: z.array(TestMethod) }),
    creates: true,
  },
  edit: {
    method: 'patch',
    path: '/api/test-methods/:id',
    access: 'water.configure',
    summary: 'Change a test method; readings by it get its new error',
    params: idParams,
    body: EditTestMethod,
    response: TestMethod,
    edits: true,
  },
  addLot: {
    method: 'post',
    path: '/api/test-methods/:id/kit-lots',
    access: 'water.log',
    summary: 'Add a kit lot or an instrument of a method',
    params: idParams,
    body: AddKitLot,
    response: KitLot,
    creates: true,
  },
  editLot: {
    method: 'patch',
    path: '/api/kit-lots/:id',
    access: 'water.log',
    summary: 'Change a kit lot, or say that it is used up',
    params: idParams,
    body: EditKitLot,
    response: KitLot,
    edits: true,
  },
  calibrate: {
    method: 'post',
    path: '/api/test-methods/:id/calibrations',
    access: 'water.log',
    summary: 'Check a method against a known solution; its bias corrects later readings',
    params: idParams,
    body: Calibrate,
    response: Calibration,
    creates: true,
  },
  removeCalibration: {
    method: 'delete',
    path: '/api/calibrations/:id',
    access: 'water.log',
    summary: 'Take a check back; readings go back to what was measured',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
