import { and, asc, desc, eq, isNotNull, isNull, or, sql } from 'drizzle-orm';
import { dayOf, daysBetween, instantAt, MS_PER_HOUR } from '../../shared/domain/days.ts';
import { dueAfter, mayBeDoneEarly } from '../../shared/domain/repeat-rule.ts';
import type { TaskKind } from '../../shared/domain/task-kinds.ts';
import type { ParameterCode } from '../../shared/domain/units.ts';
import { taskOutcomes, tasks } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { showTask, type TaskRow } from '../queries/tasks.ts';

/** Work at a set time counts as done from so long before it. */
const EARLY_MS = MS_PER_HOUR / 2;

export type OutcomeRow = typeof taskOutcomes.$inferSelect;

/** Something that was logged: it may be what a task asked for. */
export interface LoggedWork {
  kind: TaskKind;
  systemId?: string | undefined;
  reservoirId?: string | undefined;
  /** What was tested. */
  parameter?: ParameterCode | undefined;
  /** When it was done; now where left out. */
  at?: number | undefined;
  /** Id of the record, so that taking it back opens the task again. */
  cause?: string | undefined;
}

/** Settles the open tasks that ask for what was logged: call it in the write that logs it. */
export function settleTasks(write: Write, work: LoggedWork): void {
  const { systemId, reservoirId } = work;
  const about = [
    ...(systemId === undefined ? [] : [and(eq(tasks.systemId, systemId), isNull(tasks.reservoirId))]),
    ...(reservoirId === undefined ? [] : [eq(tasks.reservoirId, reservoirId)]),
  ];
  if (about.length === 0) return;
  const open = write.tx
    .select()
    .from(tasks)
    .where(and(or(...about), eq(tasks.kind, work.kind), isNotNull(tasks.dueOn), isNull(tasks.endedAt)))
    .orderBy(asc(tasks.dueOn))
    .all();
  if (open.length === 0) return;
  const at = work.at ?? write.now;
  const { timeZone } = farmOf(write.tx);
  for (const task of open.filter((each) => asksFor(each, work) && isOpenAt(each, at, timeZone))) {
    recordOutcome(write, task, { kind: 'done', at, note: '', cause: work.cause ?? `logged by ${write.actor.name}` });
  }
}

/** Opens the tasks again that a record had settled, where nothing was said of them since: call it where it is taken back. */
export function reopenTasks(write: Write, cause: string): void {
  const settled = write.tx.select().from(taskOutcomes).where(eq(taskOutcomes.cause, cause)).all();
  for (const outcome of settled) {
    if (lastOutcome(write, outcome.taskId)?.id === outcome.id) takeBack(write, outcome);
  }
}

/** Writes what became of a task and moves it on to its next day. */
export function recordOutcome(
  write: Write,
  task: TaskRow,
  { kind, at, note, cause }: Pick<OutcomeRow, 'kind' | 'at' | 'note' | 'cause'>,
): OutcomeRow {
  const { timeZone } = farmOf(write.tx);
  const dueOn = task.dueOn ?? dayOf(at, timeZone);
  const outcome = write.tx
    .insert(taskOutcomes)
    .values({
      ...{ id: write.newId(), taskId: task.id, kind, dueOn, at, note, cause },
      ...{ by: write.actor.name, createdAt: write.now },
    })
    .returning()
    .get();
  const next = dueAfter(task.repeat, task.startsOn, dueOn, dayOf(at, timeZone));
  write.tx
    .update(tasks)
    .set({ dueOn: next, version: task.version + 1 })
    .where(eq(tasks.id, task.id))
    .run();
  write.audit({ action: `task.${kind}`, entity: 'task', entityId: task.id, after: showTask(write.tx, task.id) });
  return outcome;
}

/** The task is due again on the day that the outcome was about. */
export function takeBack(write: Write, { id, taskId, dueOn }: OutcomeRow): void {
  write.tx.delete(taskOutcomes).where(eq(taskOutcomes.id, id)).run();
  write.tx
    .update(tasks)
    .set({ dueOn, version: sql`${tasks.version} + 1` })
    .where(eq(tasks.id, taskId))
    .run();
  write.audit({ action: 'task.reopened', entity: 'task', entityId: taskId, after: showTask(write.tx, taskId) });
}

export function lastOutcome(write: Write, taskId: string): OutcomeRow | undefined {
  return write.tx
    .select()
    .from(taskOutcomes)
    .where(eq(taskOutcomes.taskId, taskId))
    .orderBy(desc(taskOutcomes.createdAt), desc(sql`rowid`))
    .limit(1)
    .get();
}

function asksFor(task: TaskRow, { parameter }: LoggedWork): boolean {
  return task.kind !== 'test' || task.parameter === null || task.parameter === parameter;
}

function isOpenAt({ dueOn, dueMinute, repeat }: TaskRow, at: number, timeZone: string): boolean {
  if (dueOn === null) return false;
  // Single work at a set time, such as a test some hours after an overdose, is not settled by an earlier one.
  if (repeat === null && dueMinute !== null) return at >= instantAt(dueOn, dueMinute, timeZone) - EARLY_MS;
  return daysBetween(dayOf(at, timeZone), dueOn) <= mayBeDoneEarly(repeat);
}
