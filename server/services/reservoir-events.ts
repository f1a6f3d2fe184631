import { eq } from 'drizzle-orm';
import { standingAfter, type ReservoirStanding } from '../../shared/domain/reservoir-state.ts';
import type { TaskKind } from '../../shared/domain/task-kinds.ts';
import { DomainError } from '../../shared/errors.ts';
import { reservoirEvents, reservoirs } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { eventsInOrder, lastEvent, type ReservoirEventRow, type ReservoirRow } from '../queries/reservoirs.ts';
import { reopenTasks, settleTasks } from './task-settling.ts';

type NewEvent = Omit<typeof reservoirEvents.$inferInsert, 'id' | 'reservoirId' | 'by' | 'levelBeforeL'> & {
  id?: string;
  levelBeforeL?: number;
};

const DONE_WORDS: Record<ReservoirEventRow['kind'], string> = {
  refill: 'refilled',
  level: 'level_read',
  online: 'put_online',
  offline: 'taken_offline',
  topped_up: 'topped_up',
  strength: 'strength_checked',
  sludge_removed: 'sludge_removed',
  spent: 'marked_spent',
  cleaned: 'cleaned',
};

/** Writes one event of a reservoir and brings its row in step. */
export function addEvent(write: Write, reservoir: ReservoirRow, event: NewEvent): ReservoirEventRow {
  if (reservoir.retiredAt !== null) {
    throw new DomainError('rule.refused', `${reservoir.code} is put away. Bring it back first.`);
  }
  assertInOrder(write, reservoir, event.at);
  const row = write.tx
    .insert(reservoirEvents)
    .values({
      levelBeforeL: reservoir.levelL,
      ...event,
      ...{ id: event.id ?? write.newId(), reservoirId: reservoir.id, by: write.actor.name },
    })
    .returning()
    .get();
  // It is the newest event, so what stands follows from the row alone, however long the history.
  stand(write, reservoir, standingAfter([row], reservoir.volumeL, reservoir));
  write.audit({ action: `reservoir.${DONE_WORDS[row.kind]}`, entity: 'reservoir', entityId: reservoir.id, after: row });
  settleTasksOf(write, reservoir, row);
  return row;
}

/** Takes one event away and brings the reservoir back to what held before it. */
export function removeEvent(write: Write, reservoir: ReservoirRow, event: ReservoirEventRow): void {
  write.tx.delete(reservoirEvents).where(eq(reservoirEvents.id, event.id)).run();
  stand(write, reservoir, standingAfter(eventsInOrder(write.tx, reservoir.id), reservoir.volumeL));
  write.audit({ action: 'reservoir.event_undone', entity: 'reservoir', entityId: reservoir.id, before: event });
  reopenTasks(write, event.id);
}

/** Mixes and changeovers are asked for by reservoir or by system, what is done to a vessel by the vessel alone. */
const TASKS_OF: Partial<Record<ReservoirEventRow['kind'], TaskKind>> = {
  refill: 'refill',
  online: 'changeover',
  sludge_removed: 'cleaning',
  cleaned: 'cleaning',
};

function settleTasksOf(
  write: Write,
  { id: reservoirId, systemId }: ReservoirRow,
  { id: cause, kind, at }: ReservoirEventRow,
) {
  const asked = TASKS_OF[kind];
  if (asked === undefined) return;
  settleTasks(write, { kind: asked, reservoirId, at, cause, ...(asked === 'cleaning' ? {} : { systemId }) });
}

/** @throws {DomainError} `input.invalid` at the field for more than the reservoir holds */
export function assertFits(reservoir: ReservoirRow, levelL: number, field: string): void {
  if (levelL <= reservoir.volumeL) return;
  const message = `${reservoir.code} holds ${reservoir.volumeL} L. Enter less.`;
  throw new DomainError('input.invalid', message, { fields: [{ path: field, message }] });
}

function stand(
  write: Write,
  reservoir: ReservoirRow,
  { state, levelL, alkalinityMeqL, readyAt }: ReservoirStanding,
): void {
  write.tx
    .update(reservoirs)
    .set({ state, levelL, alkalinityMeqL, readyAt, version: reservoir.version + 1 })
    .where(eq(reservoirs.id, reservoir.id))
    .run();
}

/** What was drawn is told from one event to the next, so an event can't be slipped in before others. */
function assertInOrder(write: Write, reservoir: ReservoirRow, at: number): void {
  const last = lastEvent(write.tx, reservoir.id);
  if (!last || last.at <= at) return;
  const message = `Something later is logged for ${reservoir.code} already. Take that back first, or choose a later time.`;
  throw new DomainError('rule.refused', message, { fields: [{ path: 'at', message }] });
}
