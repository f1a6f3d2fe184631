import { z } from 'zod';
import { TASK_KINDS } from '../domain/task-kinds.ts';
import { ROLES } from '../permissions.ts';
import {
  calendarDay,
  done,
  id,
  idParams,
  instant,
  listQuery,
  noteText,
  nothing,
  pageOf,
  shortText,
  version,
} from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { LogReadings } from './readings.ts';
import { parameterCode } from './systems.ts';

/** Work is planned for years, not for ages; days far off are slips of the pen. */
const workDay = calendarDay.refine(
  (day) => day >= '2000-01-01' && day <= '2199-12-31',
  'Choose a day of this century.',
);
const weekday = z.int('Choose a weekday.').min(1).max(7);
const interval = z.int('Enter a whole number.').min(1, 'At least 1.').max(120, 'At most 120.');

export const RepeatRule = z.discriminatedUnion('every', [
  z.strictObject({ every: z.literal('days'), interval }),
  z.strictObject({
    every: z.literal('weeks'),
    interval,
    weekdays: z.array(weekday).min(1, 'Choose one weekday at least.').max(7),
  }),
  z.strictObject({ every: z.literal('months'), interval, monthDay: z.int('Choose a day.').min(1).max(31) }),
  z.strictObject({
    every: z.literal('months_on'),
    interval,
    week: z.union(
      [1, 2, 3, 4, -1].map((week) => z.literal(week)),
      'Choose which week.',
    ),
    weekday,
  }),
  z.strictObject({ every: z.literal('dates'), dates: z.array(workDay).min(1, 'Enter one day at least.').max(60) }),
  z.strictObject({ every: z.literal('after_done'), days: interval }),
]);

export const Task = z.object({
  id,
  kind: z.enum(TASK_KINDS),
  title: z.string(),
  systemId: id.nullable(),
  systemCode: z.string().nullable(),
  systemName: z.string().nullable(),
  reservoirId: id.nullable(),
  reservoirCode: z.string().nullable(),
  /** What a test task tests; null: anything. */
  parameter: parameterCode.nullable(),
  repeat: RepeatRule.nullable(),
  startsOn: calendarDay,
  /** Null once nothing more comes. */
  dueOn: calendarDay.nullable(),
  /** Minutes after midnight on the farm's clock; null: any time of the day. */
  dueMinute: z.int().nullable(),
  /** When it is late: at its time, or at the end of its day. */
  lateFrom: instant.nullable(),
  assigneeId: id.nullable(),
  assigneeName: z.string().nullable(),
  assigneeRole: z.enum(ROLES).nullable(),
  note: z.string(),
  last: z.object({ kind: z.enum(['done', 'skipped']), at: instant, by: z.string() }).nullable(),
  ended: z.boolean(),
  version,
});
export type Task = z.infer<typeof Task>;

export const TaskOutcome = z.object({
  id,
  taskId: id,
  title: z.string(),
  systemCode: z.string().nullable(),
  kind: z.enum(['done', 'skipped']),
  dueOn: calendarDay,
  at: instant,
  by: z.string(),
  note: z.string(),
  /** Settled by what was logged, not by someone who said so. */
  byItself: z.boolean(),
  /** The last one of its task, so that it can be taken back. */
  isLast: z.boolean(),
});
export type TaskOutcome = z.infer<typeof TaskOutcome>;

export const CreateTask = z.strictObject({
  kind: z.enum(TASK_KINDS, 'Choose a kind.'),
  title: shortText,
  systemId: id.nullable().default(null),
  reservoirId: id.nullable().default(null),
  parameter: parameterCode.nullable().default(null),
  repeat: RepeatRule.nullable().default(null),
  startsOn: workDay,
  dueMinute: z.int().min(0).max(1439).nullable().default(null),
  /** One person or one role; neither: anyone. */
  assigneeId: id.nullable().default(null),
  assigneeRole: z.enum(ROLES).nullable().default(null),
  note: noteText.default(''),
});
export type CreateTask = z.infer<typeof CreateTask>;

export const EditTask = z.strictObject({
  title: shortText.optional(),
  repeat: RepeatRule.nullable().optional(),
  startsOn: workDay.optional(),
  dueMinute: z.int().min(0).max(1439).nullable().optional(),
  assigneeId: id.nullable().optional(),
  assigneeRole: z.enum(ROLES).nullable().optional(),
  note: noteText.optional(),
});
export type EditTask = z.infer<typeof EditTask>;

export const ListTasks = z.strictObject({
  ...listQuery.pick({ cursor: true, limit: true }).shape,
  /** Mine: given to me, to my role or to anyone. */
  whose: z.enum(['mine', 'all']).default('all'),
  systemId: id.optional(),
});
export type ListTasks = z.infer<typeof ListTasks>;

/** `dueOn` is the day that the person saw, so that the same work is not settled twice. */
export const CompleteTask = z.strictObject({
  dueOn: workDay,
  note: noteText.default(''),
  /** What was measured; logged in the same step. */
  readings: LogReadings.optional(),
});
export type CompleteTask = z.infer<typeof CompleteTask>;
export const SkipTask = z.strictObject({ dueOn: workDay, reason: shortText });
export type SkipTask = z.infer<typeof SkipTask>;

export const Settled = z.object({ task: Task, outcomeId: id, readingIds: z.array(id) });
export type Settled = z.infer<typeof Settled>;

export const taskEndpoints = {
  list: {
    method: 'get',
    path: '/api/tasks',
    access: 'water.read',
    summary: 'Tasks by the day they are due',
    query: ListTasks,
    response: z.object({ ...pageOf(Task).shape, today: calendarDay, overdue: z.int(), dueToday: z.int() }),
  },
  people: {
    method: 'get',
    path: '/api/task-people',
    access: 'water.read',
    summary: 'People that tasks can be given to',
    query: nothing,
    response: z.object({ items: z.array(z.object({ id, name: z.string(), role: z.enum(ROLES) })) }),
  },
  show: {
    method: 'get',
    path: '/api/tasks/:id',
    access: 'water.read',
    summary: 'One task',
    params: idParams,
    response: Task,
  },
  create: {
    method: 'post',
    path: '/api/tasks',
    access: 'water.log',
    summary: 'Add a task',
    body: CreateTask,
    response: Task,
    creates: true,
  },
  edit: {
    method: 'patch',
    path: '/api/tasks/:id',
    access: 'water.log',
    summary: 'Change a task',
    params: idParams,
    body: EditTask,
    response: Task,
    edits: true,
  },
  end: {
    method: 'post',
    path: '/api/tasks/:id/end',
    access: 'water.log',
    summary: 'Put an end to a task',
    params: idParams,
    response: Task,
  },
  resume: {
    method: 'post',
    path: '/api/tasks/:id/resume',
    access: 'water.log',
    summary: 'Take a task up again after its end',
    params: idParams,
    response: Task,
  },
  complete: {
    method: 'post',
    path: '/api/tasks/:id/completions',
    access: 'water.log',
    summary: 'Say that a task is done, with readings where it is a test',
    params: idParams,
    body: CompleteTask,
    response: Settled,
    creates: true,
  },
  skip: {
    method: 'post',
    path: '/api/tasks/:id/skips',
    access: 'water.log',
    summary: 'Skip a task this time',
    params: idParams,
    body: SkipTask,
    response: Settled,
    creates: true,
  },
  outcomes: {
    method: 'get',
    path: '/api/task-outcomes',
    access: 'water.read',
    summary: 'What was done and skipped, newest first',
    query: z.strictObject({
      ...listQuery.pick({ cursor: true, limit: true }).shape,
      taskId: id.optional(),
      systemId: id.optional(),
    }),
    response: pageOf(TaskOutcome),
  },
  undo: {
    method: 'delete',
    path: '/api/task-outcomes/:id',
    access: 'water.log',
    summary: 'Take back what was said of a task last',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
