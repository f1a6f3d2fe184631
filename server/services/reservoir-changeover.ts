import type { ChangeOver } from '../../shared/contracts/reservoir-acts.ts';
import type { ReservoirChange } from '../../shared/contracts/reservoirs.ts';
import { usableLitres } from '../../shared/domain/reservoir-vessel.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Write } from '../db/write.ts';
import { fedSystems, onlineFor, reservoirsOfSystem } from '../queries/reservoir-feeds.ts';
import { lastEvent, reservoirRow, type ReservoirRow, showReservoir } from '../queries/reservoirs.ts';
import { actTime } from './act-time.ts';
import { addEvent, assertFits, removeEvent } from './reservoir-events.ts';
import { returnSupply } from './supply-return.ts';

/**
 * Puts a reservoir online for the systems that it feeds; whatever was online for any of them comes off at the same
 * instant, so that each system has one at most.
 */
export function changeOver(write: Write, reservoirId: string, input: ChangeOver): ReservoirChange {
  const { formerLevelL, note } = input;
  const next = reservoirRow(write.tx, reservoirId);
  if (next.state === 'online') throw new DomainError('rule.refused', `${next.code} is online already.`);
  const intakeMm = input.intakeMm ?? next.intakeMm;
  assertDrawable(next, intakeMm);
  const at = actTime(write, input.at);
  for (const former of onlineFor(write.tx, fedSystems(write.tx, next, at), at)) {
    // The person was asked for the level of the reservoir that stands beside it.
    const levelL = (former.systemId === next.systemId ? formerLevelL : undefined) ?? former.levelL;
    assertFits(former, levelL, 'formerLevelL');
    addEvent(write, former, { kind: 'offline', at, levelL, alkalinityMeqL: former.alkalinityMeqL, note });
  }
  const { levelL, alkalinityMeqL } = next;
  const covered = input.covered ?? next.covered;
  const event = addEvent(write, next, { kind: 'online', at, levelL, alkalinityMeqL, intakeMm, covered, note });
  return { reservoir: showReservoir(write.tx, reservoirId, write.now), event };
}

/**
 * Takes back the last event of a reservoir. A refill gives its lime and vinegar back; a changeover puts what was online
 * before back online, where nothing was logged for it since.
 */
export function undoLastEvent(write: Write, reservoirId: string, eventId: string): void {
  const reservoir = reservoirRow(write.tx, reservoirId);
  const event = lastEvent(write.tx, reservoirId);
  if (event?.id !== eventId) {
    throw new DomainError('rule.refused', 'Something was logged after this. Take the last event back first.');
  }
  if (event.kind === 'refill') {
    returnSupply(write, 'refill', event.id, 'Log the level that stands in the reservoir now instead.');
  }
  removeEvent(write, reservoir, event);
  assertOneOnline(write, reservoirId, event.kind === 'offline');
  if (event.kind === 'online') bringFormersBack(write, reservoir, event.at);
}

/** Taking a stop back must not leave two online for one system. */
function assertOneOnline(write: Write, reservoirId: string, ofChangeOver: boolean): void {
  const reservoir = reservoirRow(write.tx, reservoirId);
  if (reservoir.state !== 'online') return;
  const others = onlineFor(write.tx, fedSystems(write.tx, reservoir, write.now), write.now);
  if (!others.some(({ id }) => id !== reservoirId)) return;
  const instead = ofChangeOver ? 'Take its changeover back instead.' : 'Take it off first.';
  throw new DomainError('rule.refused', `Another reservoir is online now. ${instead}`);
}

function bringFormersBack(write: Write, reservoir: ReservoirRow, at: number): void {
  const beside = fedSystems(write.tx, reservoir, at).flatMap((systemId) => reservoirsOfSystem(write.tx, systemId));
  for (const id of new Set(beside.map((each) => each.id))) {
    if (id === reservoir.id) continue;
    const event = lastEvent(write.tx, id);
    if (event?.kind === 'offline' && event.at === at) removeEvent(write, reservoirRow(write.tx, id), event);
  }
}

function assertDrawable(next: ReservoirRow, intakeMm: number | null): void {
  if (next.levelL === 0) throw new DomainError('rule.refused', `${next.code} is empty. Mix limewater in it first.`);
  if (usableLitres({ ...next, intakeMm }, next.levelL) > 0) return;
  const message = `Nothing in ${next.code} stands above the intake. Mix limewater in it first, or lower the intake.`;
  throw new DomainError('rule.refused', message, { fields: [{ path: 'intakeMm', message }] });
}
