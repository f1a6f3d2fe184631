import { and, count, desc, eq, lt, or, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import type { TaskOutcome } from '../../shared/contracts/tasks.ts';
import type { Db } from '../db/client.ts';
import { systems, taskOutcomes, tasks } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';

interface OutcomeQuery {
  cursor?: string | undefined;
  limit: number;
  taskId?: string | undefined;
  systemId?: string | undefined;
}

/** What became of tasks, newest first. */
export function listOutcomes(db: Db, { cursor, limit, taskId, systemId }: OutcomeQuery): Page<TaskOutcome> {
  const wanted = and(
    taskId ? eq(taskOutcomes.taskId, taskId) : undefined,
    systemId ? eq(tasks.systemId, systemId) : undefined,
  );
  const rows = db
    .select({ outcome: taskOutcomes, title: tasks.title, systemCode: systems.code, isLast })
    .from(taskOutcomes)
    .innerJoin(tasks, eq(tasks.id, taskOutcomes.taskId))
    .leftJoin(systems, eq(systems.id, tasks.systemId))
    .where(and(wanted, cursor ? olderThan(cursor) : undefined))
    .orderBy(desc(taskOutcomes.createdAt), desc(taskOutcomes.id))
    .limit(limit + 1)
    .all();
  const counted = db
    .select({ total: count() })
    .from(taskOutcomes)
    .innerJoin(tasks, eq(tasks.id, taskOutcomes.taskId))
    .where(wanted)
    .get();
  return pageFrom(rows, limit, counted?.total ?? 0, {
    item: toOutcome,
    cursor: ({ outcome }) => [outcome.createdAt, outcome.id],
  });
}

/** Nothing was said of the task since. */
const isLast = sql<number>`NOT EXISTS (
  SELECT 1 FROM task_outcome AS later
  WHERE later.task_id = ${taskOutcomes.taskId}
    AND (later.created_at > ${taskOutcomes.createdAt}
      OR (later.created_at = ${taskOutcomes.createdAt} AND later.rowid > "task_outcome"."rowid")))`;

function olderThan(cursor: string): SQL | undefined {
  const [createdAt, lastId] = readCursor(cursor, z.tuple([z.number(), z.string()]));
  return or(
    lt(taskOutcomes.createdAt, createdAt),
    and(eq(taskOutcomes.createdAt, createdAt), lt(taskOutcomes.id, lastId)),
  );
}

interface OutcomeWithTask {
  outcome: typeof taskOutcomes.$inferSelect;
  title: string;
  systemCode: string | null;
  isLast: number;
}

function toOutcome({ outcome, title, systemCode, isLast: last }: OutcomeWithTask): TaskOutcome {
  const { id, taskId, kind, dueOn, at, by, note, cause } = outcome;
  return { id, taskId, title, systemCode, kind, dueOn, at, by, note, byItself: cause !== '', isLast: last === 1 };
}
