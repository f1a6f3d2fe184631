import { and, eq, isNull } from 'drizzle-orm';
import type { CreateTask, EditTask, Task } from '../../shared/contracts/tasks.ts';
import { addDays, type Day, dayOf } from '../../shared/domain/days.ts';
import { firstDue, nextDue, type Repeat } from '../../shared/domain/repeat-rule.ts';
import { DomainError } from '../../shared/errors.ts';
import { mayUse } from '../../shared/permissions.ts';
import { tasks, users } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { reservoirRow } from '../queries/reservoirs.ts';
import { systemRow } from '../queries/systems.ts';
import { showTask, taskRow } from '../queries/tasks.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';

/**
 * Adds a task. Its first day is the first that its rule allows from `startsOn` on.
 *
 * @param cause id of the record that asks for it, such as a plan or an overfill
 * @throws {DomainError} `record.not_found`; `input.invalid` at `assigneeId`, `parameter` or `repeat`
 */
export function createTask(write: Write, input: CreateTask, cause = ''): Task {
  const { systemId, reservoirId } = input;
  if (systemId !== null) systemRow(write.tx, systemId);
  if (reservoirId !== null) reservoirRow(write.tx, reservoirId);
  if (input.parameter !== null && input.kind !== 'test') throw invalid('parameter', 'Only a test has a parameter.');
  assertAssignee(write, input);
  const taskId = write.newId();
  write.tx
    .insert(tasks)
    .values({
      ...{ id: taskId, ...input, cause, dueOn: firstDay(input.repeat, input.startsOn) },
      ...{ createdAt: write.now, createdBy: write.actor.name },
    })
    .run();
  const after = showTask(write.tx, taskId);
  write.audit({ action: 'task.created', entity: 'task', entityId: taskId, after });
  return after;
}

/**
 * Changes a task. Another rule or another start count from the new start on.
 *
 * @throws {DomainError} `record.not_found`; `edit.stale`; `input.invalid` at `assigneeId` or `repeat`
 */
export function editTask(write: Write, taskId: string, ifMatch: number, edit: EditTask): Task {
  const row = taskRow(write.tx, taskId);
  const before = showTask(write.tx, taskId);
  assertVersion(row, ifMatch, before);
  const chosen = { ...row, ...definedOnly(edit) };
  assertAssignee(write, chosen);
  const isMoved = edit.startsOn !== undefined && edit.startsOn !== row.startsOn;
  write.tx
    .update(tasks)
    .set({
      ...definedOnly(edit),
      ...(isMoved ? { dueOn: firstDay(chosen.repeat, chosen.startsOn) } : {}),
      ...(!isMoved && edit.repeat !== undefined ? { dueOn: dayFrom(chosen, row.dueOn ?? today(write)) } : {}),
      version: row.version + 1,
    })
    .where(eq(tasks.id, taskId))
    .run();
  const after = showTask(write.tx, taskId);
  write.audit({ action: 'task.changed', entity: 'task', entityId: taskId, before, after });
  return after;
}

/** No more of it comes; what was done stays on record. */
export function endTask(write: Write, taskId: string): Task {
  return setEnd(write, taskId, write.now, 'task.ended');
}

export function resumeTask(write: Write, taskId: string): Task {
  return setEnd(write, taskId, null, 'task.resumed');
}

/** Puts an end to the tasks that a record asked for and nobody has settled: where that record is taken back. */
export function endTasksOf(write: Write, cause: string): void {
  const open = write.tx
    .select({ id: tasks.id })
    .from(tasks)
    .where(and(eq(tasks.cause, cause), isNull(tasks.endedAt)))
    .all();
  for (const { id } of open) endTask(write, id);
}

function setEnd(write: Write, taskId: string, endedAt: number | null, action: string): Task {
  const row = taskRow(write.tx, taskId);
  const before = showTask(write.tx, taskId);
  write.tx
    .update(tasks)
    .set({ endedAt, version: row.version + 1 })
    .where(eq(tasks.id, taskId))
    .run();
  const after = showTask(write.tx, taskId);
  write.audit({ action, entity: 'task', entityId: taskId, before, after });
  return after;
}

function firstDay(repeat: Repeat, startsOn: Day): Day {
  const day = firstDue(repeat, startsOn);
  if (day === null) throw invalid('repeat', 'These days are all before the first one.');
  return day;
}

/** The first day of a changed rule that is not before the one that was due. */
function dayFrom({ repeat, startsOn }: { repeat: Repeat; startsOn: Day }, dueOn: Day): Day | null {
  if (repeat === null || repeat.every === 'after_done') return dueOn;
  return nextDue(repeat, startsOn, addDays(dueOn, -1));
}

function today(write: Write): Day {
  return dayOf(write.now, farmOf(write.tx).timeZone);
}

function assertAssignee(
  write: Write,
  { assigneeId, assigneeRole }: Pick<CreateTask, 'assigneeId' | 'assigneeRole'>,
): void {
  if (assigneeRole !== null && !mayUse(assigneeRole, 'water.log')) {
    throw invalid('assigneeRole', 'This role does no work on the water. Choose another.');
  }
  if (assigneeId === null) return;
  if (assigneeRole !== null) throw invalid('assigneeRole', 'Choose a person or a role, not both.');
  const person = write.tx.select().from(users).where(eq(users.id, assigneeId)).get();
  if (!person || person.disabledAt !== null || !mayUse(person.role, 'water.log')) {
    throw invalid('assigneeId', 'Choose someone who works on the water.');
  }
}

function invalid(path: string, message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path, message }] });
}
