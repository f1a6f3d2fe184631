import { and, eq } from 'drizzle-orm';
import type {
  ChangeOver,
  ChangeOverResult,
  CreateReservoir,
  EditReservoir,
  LogLevel,
  Reservoir,
  ReservoirEvent,
} from '../../shared/contracts/reservoirs.ts';
import { DomainError } from '../../shared/errors.ts';
import { reservoirs } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { lastEvent, reservoirRow, type ReservoirRow, showReservoir } from '../queries/reservoirs.ts';
import { systemRow } from '../queries/systems.ts';
import { actTime } from './act-time.ts';
import { assertVersion } from './edit-check.ts';
import { addEvent, assertFits, removeEvent } from './reservoir-events.ts';
import { returnSupply } from './supply-return.ts';

export function createReservoir(write: Write, input: CreateReservoir): Reservoir {
  systemRow(write.tx, input.systemId);
  const reservoirId = write.newId();
  write.tx
    .insert(reservoirs)
    .values({ id: reservoirId, ...input, createdAt: write.now })
    .run();
  const after = showReservoir(write.tx, reservoirId, write.now);
  write.audit({ action: 'reservoir.created', entity: 'reservoir', entityId: reservoirId, after });
  return after;
}

export function editReservoir(write: Write, reservoirId: string, ifMatch: number, edit: EditReservoir): Reservoir {
  const row = reservoirRow(write.tx, reservoirId);
  const before = showReservoir(write.tx, reservoirId, write.now);
  assertVersion(row, ifMatch, before);
  assertFits({ ...row, volumeL: edit.volumeL ?? row.volumeL }, row.levelL, 'volumeL');
  write.tx
    .update(reservoirs)
    .set({ ...edit, version: row.version + 1 })
    .where(eq(reservoirs.id, reservoirId))
    .run();
  const after = showReservoir(write.tx, reservoirId, write.now);
  write.audit({ action: 'reservoir.changed', entity: 'reservoir', entityId: reservoirId, before, after });
  return after;
}

export function logLevel(write: Write, reservoirId: string, { at, levelL, note }: LogLevel): ReservoirEvent {
  const reservoir = reservoirRow(write.tx, reservoirId);
  assertFits(reservoir, levelL, 'levelL');
  const { alkalinityMeqL } = reservoir;
  return addEvent(write, reservoir, { kind: 'level', at: actTime(write, at), levelL, alkalinityMeqL, note });
}

/** Puts a reservoir online for its system; the one that was online comes off at the same instant. */
export function changeOver(
  write: Write,
  reservoirId: string,
  { at, formerLevelL, note }: ChangeOver,
): ChangeOverResult {
  const next = reservoirRow(write.tx, reservoirId);
  if (next.state === 'online') throw new DomainError('rule.refused', `${next.code} is online already.`);
  if (next.levelL === 0) {
    throw new DomainError('rule.refused', `${next.code} is empty. Mix limewater in it first.`);
  }
  const instant = actTime(write, at);
  const former = onlineOf(write, next.systemId);
  if (former) {
    const levelL = formerLevelL ?? former.levelL;
    assertFits(former, levelL, 'formerLevelL');
    addEvent(write, former, { kind: 'offline', at: instant, levelL, alkalinityMeqL: former.alkalinityMeqL, note });
  }
  const { levelL, alkalinityMeqL } = next;
  const event = addEvent(write, next, { kind: 'online', at: instant, levelL, alkalinityMeqL, note });
  return { reservoir: showReservoir(write.tx, reservoirId, write.now), event };
}

/**
 * Takes back the last event of a reservoir. A refill gives its lime and vinegar back; a changeover puts the reservoir
 * that was online before back online, where nothing was logged for it since.
 */
export function undoLastEvent(write: Write, reservoirId: string, eventId: string): void {
  const reservoir = reservoirRow(write.tx, reservoirId);
  const event = lastEvent(write.tx, reservoirId);
  if (event?.id !== eventId) {
    throw new DomainError('rule.refused', 'Something was logged after this. Take the last event back first.');
  }
  if (event.kind === 'offline' && onlineOf(write, reservoir.systemId)) {
    throw new DomainError('rule.refused', 'Another reservoir is online now. Take its changeover back instead.');
  }
  if (event.kind === 'refill') {
    returnSupply(write, 'refill', event.id, 'Log the level that stands in the reservoir now instead.');
  }
  removeEvent(write, reservoir, event);
  if (event.kind === 'online') bringFormerBack(write, reservoir, event.at);
}

function bringFormerBack(write: Write, { id, systemId }: ReservoirRow, at: number): void {
  const others = write.tx.select().from(reservoirs).where(eq(reservoirs.systemId, systemId)).all();
  for (const other of others.filter((each) => each.id !== id)) {
    const event = lastEvent(write.tx, other.id);
    if (event?.kind === 'offline' && event.at === at) removeEvent(write, other, event);
  }
}

function onlineOf(write: Write, systemId: string): ReservoirRow | undefined {
  return write.tx
    .select()
    .from(reservoirs)
    .where(and(eq(reservoirs.systemId, systemId), eq(reservoirs.state, 'online')))
    .get();
}
