import { and, asc, count, desc, eq, gt, isNotNull, isNull, lt, lte, or, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { ListTasks, Task } from '../../shared/contracts/tasks.ts';
import { addDays, type Day, dayOf, instantAt, startOfDay } from '../../shared/domain/days.ts';
import { PARAMETER_CODES } from '../../shared/domain/units.ts';
import { DomainError } from '../../shared/errors.ts';
import { mayUse, type Role, ROLES } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';
import { reservoirs, systems, taskOutcomes, tasks, users } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { farmOf } from './farm.ts';

export type TaskRow = typeof tasks.$inferSelect;

/** Whose tasks: those of a person are given to them, to their role or to anyone. */
export interface TaskReader {
  userId: string;
  role: Role;
}

/** @throws {DomainError} `record.not_found` */
export function taskRow(db: Db, taskId: string): TaskRow {
  const row = db.select().from(tasks).where(eq(tasks.id, taskId)).get();
  if (!row) throw new DomainError('record.not_found', 'There is no such task. Choose one from the list.');
  return row;
}

export function showTask(db: Db, taskId: string): Task {
  const row = joined(db).where(eq(tasks.id, taskId)).get();
  if (!row) throw new DomainError('record.not_found', 'There is no such task. Choose one from the list.');
  return toTask(db, row, farmOf(db).timeZone);
}

/** Tasks that come due, the first ones first, and how many press. */
export function listTasks(db: Db, query: ListTasks, reader: TaskReader, now: number) {
  const { timeZone } = farmOf(db);
  const today = dayOf(now, timeZone);
  const wanted = and(
    isOpen,
    query.whose === 'mine' ? isFor(reader) : undefined,
    query.systemId ? eq(tasks.systemId, query.systemId) : undefined,
  );
  const rows = joined(db)
    .where(and(wanted, query.cursor ? laterThan(query.cursor) : undefined))
    .orderBy(asc(tasks.dueOn), asc(tasks.id))
    .limit(query.limit + 1)
    .all();
  const countOf = (also?: SQL) => db.select({ total: count() }).from(tasks).where(and(wanted, also)).get()?.total ?? 0;
  const page = pageFrom(rows, query.limit, countOf(), {
    item: (row) => toTask(db, row, timeZone),
    cursor: ({ task }) => [task.dueOn ?? '', task.id],
  });
  return { ...page, today, overdue: countOf(lt(tasks.dueOn, today)), dueToday: countOf(eq(tasks.dueOn, today)) };
}

/** Open tasks that are due up to a day, the first ones first. */
export function tasksDueBy(db: Db, day: Day, most: number, reader?: TaskReader): Task[] {
  const { timeZone } = farmOf(db);
  return joined(db)
    .where(and(isOpen, lte(tasks.dueOn, day), reader ? isFor(reader) : undefined))
    .orderBy(asc(tasks.dueOn), asc(systems.code), asc(tasks.title), asc(tasks.id))
    .limit(most)
    .all()
    .map((row) => toTask(db, row, timeZone));
}

/** People that a task can be given to, by name. */
export function taskPeople(db: Db): { id: string; name: string; role: Role }[] {
  const roles = ROLES.filter((role) => mayUse(role, 'water.log'));
  return db
    .select({ id: users.id, name: users.name, role: users.role })
    .from(users)
    .where(and(isNull(users.disabledAt), or(...roles.map((role) => eq(users.role, role)))))
    .orderBy(asc(users.name))
    .all();
}

const isOpen = and(isNull(tasks.endedAt), isNotNull(tasks.dueOn));

function isFor({ userId, role }: TaskReader): SQL | undefined {
  return or(
    eq(tasks.assigneeId, userId),
    eq(tasks.assigneeRole, role),
    and(isNull(tasks.assigneeId), isNull(tasks.assigneeRole)),
  );
}

function laterThan(cursor: string): SQL | undefined {
  const [dueOn, lastId] = readCursor(cursor, z.tuple([z.string(), z.string()]));
  return or(gt(tasks.dueOn, dueOn), and(eq(tasks.dueOn, dueOn), gt(tasks.id, lastId)));
}

type Joined = ReturnType<ReturnType<typeof joined>['all']>[number];

function joined(db: Db) {
  return db
    .select({
      task: tasks,
      system: { code: systems.code, name: systems.name },
      reservoirCode: reservoirs.code,
      assigneeName: users.name,
    })
    .from(tasks)
    .leftJoin(systems, eq(systems.id, tasks.systemId))
    .leftJoin(reservoirs, eq(reservoirs.id, tasks.reservoirId))
    .leftJoin(users, eq(users.id, tasks.assigneeId))
    .$dynamic();
}

function toTask(db: Db, { task, system, reservoirCode, assigneeName }: Joined, timeZone: string): Task {
  const { id, kind, title, systemId, reservoirId, repeat, startsOn, dueOn, dueMinute, note, version } = task;
  return {
    ...{ id, kind, title, systemId, reservoirId, reservoirCode, repeat, startsOn, dueOn, dueMinute, note, version },
    ...{ assigneeId: task.assigneeId, assigneeName, assigneeRole: task.assigneeRole },
    systemCode: system?.code ?? null,
    systemName: system?.name ?? null,
    parameter: PARAMETER_CODES.find((code) => code === task.parameter) ?? null,
    lateFrom: dueOn === null ? null : lateFrom(dueOn, dueMinute, timeZone),
    last: lastOf(db, id),
    ended: task.endedAt !== null,
  };
}

function lateFrom(dueOn: Day, dueMinute: number | null, timeZone: string): number {
  return dueMinute === null ? startOfDay(addDays(dueOn, 1), timeZone) : instantAt(dueOn, dueMinute, timeZone);
}

function lastOf(db: Db, taskId: string): Task['last'] {
  const { kind, at, by } = taskOutcomes;
  return (
    db
      .select({ kind, at, by })
      .from(taskOutcomes)
      .where(eq(taskOutcomes.taskId, taskId))
      .orderBy(desc(taskOutcomes.createdAt), desc(sql`rowid`))
      .limit(1)
      .get() ?? null
  );
}
