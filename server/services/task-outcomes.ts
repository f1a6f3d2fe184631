import { eq } from 'drizzle-orm';
import type { CompleteTask, Settled, SkipTask } from '../../shared/contracts/tasks.ts';
import type { Day } from '../../shared/domain/days.ts';
import { DomainError } from '../../shared/errors.ts';
import { taskOutcomes } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { showTask, taskRow, type TaskRow } from '../queries/tasks.ts';
import { logReadings } from './reading-service.ts';
import { lastOutcome, type OutcomeRow, recordOutcome, takeBack } from './task-settling.ts';

/**
 * Says that a task is done. Readings that come with it are logged in the same transaction.
 *
 * @throws {DomainError} `record.not_found`; `rule.refused` where it was settled meanwhile; what logging readings throws
 */
export function completeTask(write: Write, taskId: string, { dueOn, note, readings }: CompleteTask): Settled {
  const task = openTask(write, taskId, dueOn);
  if (readings && readings.systemId !== task.systemId) {
    const message = 'These readings are of another system than the task.';
    throw new DomainError('input.invalid', message, { fields: [{ path: 'readings.systemId', message }] });
  }
  const logged = readings ? logReadings(write, readings) : [];
  const [first] = logged;
  const at = first?.takenAt ?? write.now;
  // The reading settles what it fits by itself; where it is of another time or kind, the person's word does.
  const outcome =
    settledBy(
      write,
      taskId,
      logged.map(({ id }) => id),
    ) ?? recordOutcome(write, taskRow(write.tx, taskId), { kind: 'done', at, note, cause: first?.id ?? '' });
  if (note !== outcome.note) {
    write.tx.update(taskOutcomes).set({ note }).where(eq(taskOutcomes.id, outcome.id)).run();
  }
  return { task: showTask(write.tx, taskId), outcomeId: outcome.id, readingIds: logged.map(({ id }) => id) };
}

/** Leaves a task out this time, and says why. */
export function skipTask(write: Write, taskId: string, { dueOn, reason }: SkipTask): Settled {
  const task = openTask(write, taskId, dueOn);
  const outcome = recordOutcome(write, task, { kind: 'skipped', at: write.now, note: reason, cause: '' });
  return { task: showTask(write.tx, taskId), outcomeId: outcome.id, readingIds: [] };
}

/**
 * Takes back what was said of a task last; it is due again as it was.
 *
 * @throws {DomainError} `record.not_found`; `rule.refused` where more was said since
 */
export function undoOutcome(write: Write, outcomeId: string): void {
  const outcome = write.tx.select().from(taskOutcomes).where(eq(taskOutcomes.id, outcomeId)).get();
  if (!outcome) throw new DomainError('record.not_found', 'This was taken back already.');
  if (lastOutcome(write, outcome.taskId)?.id !== outcomeId) {
    throw new DomainError('rule.refused', 'The task was settled again since. Take the last one back first.');
  }
  takeBack(write, outcome);
}

function openTask(write: Write, taskId: string, dueOn: Day): TaskRow {
  const task = taskRow(write.tx, taskId);
  if (task.endedAt !== null || task.dueOn === null) {
    throw new DomainError('rule.refused', 'This task has come to its end. Nothing more is to be done.');
  }
  if (task.dueOn !== dueOn) {
    throw new DomainError('rule.refused', 'Someone settled this task since you opened the list. Look at it again.');
  }
  return task;
}

function settledBy(write: Write, taskId: string, causes: readonly string[]): OutcomeRow | undefined {
  const last = lastOutcome(write, taskId);
  return last && causes.includes(last.cause) ? last : undefined;
}
