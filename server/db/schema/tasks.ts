import { sql } from 'drizzle-orm';
import { check, index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { TASK_KINDS } from '../../../shared/domain/task-kinds.ts';
import type { RepeatRule } from '../../../shared/domain/repeat-rule.ts';
import { ROLES } from '../../../shared/permissions.ts';
import { day, id, instant, version } from './columns.ts';
import { users } from './people.ts';
import { reservoirs } from './reservoirs.ts';
import { systems } from './water.ts';

/** Work that comes due once or again and again. `dueOn` is the next time; null once nothing more comes. */
export const tasks = sqliteTable(
  'task',
  {
    id: id(),
    kind: text('kind', { enum: TASK_KINDS }).notNull(),
    title: text('title').notNull(),
    systemId: text('system_id').references(() => systems.id),
    reservoirId: text('reservoir_id').references(() => reservoirs.id),
    /** What a test task tests. */
    parameter: text('parameter'),
    repeat: text('repeat', { mode: 'json' }).$type<RepeatRule>(),
    startsOn: day('starts_on').notNull(),
    dueOn: day('due_on'),
    /** Minutes after midnight on the farm's clock; null: any time of the day. */
    dueMinute: integer('due_minute'),
    /** One person, or one role; neither: anyone. */
    assigneeId: text('assignee_id').references(() => users.id),
    assigneeRole: text('assignee_role', { enum: ROLES }),
    note: text('note').notNull().default(''),
    /** The record that asked for it, such as an overfill; empty for what a person wrote down. */
    cause: text('cause').notNull().default(''),
    createdAt: instant('created_at').notNull(),
    createdBy: text('created_by').notNull(),
    /** Put an end to by a person. */
    endedAt: instant('ended_at'),
    version: version(),
  },
  (table) => [
    index('task_due')
      .on(table.dueOn, table.id)
      .where(sql`ended_at IS NULL AND due_on IS NOT NULL`),
    index('task_system').on(table.systemId, table.kind),
    index('task_reservoir').on(table.reservoirId),
    index('task_cause').on(table.cause),
    check('task_minute', sql`${table.dueMinute} IS NULL OR ${table.dueMinute} BETWEEN 0 AND 1439`),
    check('task_for_one', sql`${table.assigneeId} IS NULL OR ${table.assigneeRole} IS NULL`),
  ],
);

/** What became of a task each time it was due. The last one can be taken back. */
export const taskOutcomes = sqliteTable(
  'task_outcome',
  {
    id: id(),
    taskId: text('task_id')
      .notNull()
      .references(() => tasks.id),
    kind: text('kind', { enum: ['done', 'skipped'] }).notNull(),
    dueOn: day('due_on').notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    note: text('note').notNull().default(''),
    /** The record that settled it, such as a reading; empty where a person said so. */
    cause: text('cause').notNull().default(''),
    createdAt: instant('created_at').notNull(),
  },
  (table) => [
    index('task_outcome_task').on(table.taskId, table.createdAt),
    index('task_outcome_cause').on(table.cause),
  ],
);

/** A person's calendar address. Only the hash of its secret is kept. */
export const calendarFeeds = sqliteTable('calendar_feed', {
  userId: text('user_id')
    .primaryKey()
    .references(() => users.id),
  tokenHash: text('token_hash').notNull().unique(),
  createdAt: instant('created_at').notNull(),
});
