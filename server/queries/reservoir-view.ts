import { and, eq, inArray, max, min } from 'drizzle-orm';
import type { Reservoir } from '../../shared/contracts/reservoirs.ts';
import { careOf, sludgeDueAt } from '../../shared/domain/reservoir-care.ts';
import { stateAt } from '../../shared/domain/reservoir-state.ts';
import { emptyAt, litresPerDay } from '../../shared/domain/reservoir-use.ts';
import { litresBelowIntake, usableLitres } from '../../shared/domain/reservoir-vessel.ts';
import type { Db } from '../db/client.ts';
import type { reservoirs, systems } from '../db/schema/index.ts';
import { reservoirEvents } from '../db/schema/index.ts';
import { feedsOf } from './reservoir-feeds.ts';
import { onlineUse, recentEvents } from './reservoir-use.ts';

type ReservoirRow = typeof reservoirs.$inferSelect;

/** A reservoir as people see it: what stands in it, what may be drawn, how long it lasts and what it wants. */
export function toReservoir(
  db: Db,
  { reservoir, system }: { reservoir: ReservoirRow; system: typeof systems.$inferSelect },
  now: number,
): Reservoir {
  const { createdAt: _, state: __, ...fields } = reservoir;
  const events = recentEvents(db, reservoir.id, now);
  const lastAt = lastEventAt(db, reservoir.id, events);
  const perDay = litresPerDay(onlineUse(events).intervals, now);
  const vessel = { ...reservoir, ...setUpAtLastChangeOver(events) };
  const usableL = usableLitres(vessel, reservoir.levelL);
  const feeds = feedsOf(db, reservoir, now);
  const isOnline = reservoir.state === 'online' && lastAt !== null;
  const smallestL = Math.min(...feeds.map(({ netVolumeL }) => netVolumeL));
  const { onlineSince, replaceAt, lastCheck, strengthLow } = careOf(events, reservoir.replaceDays);
  return {
    ...fields,
    ...{ systemCode: system.code, systemName: system.name, feeds },
    ...{ intakeMm: vessel.intakeMm, covered: vessel.covered, usableL, belowIntakeL: litresBelowIntake(vessel) },
    state: stateAt(reservoir, now),
    levelAt: lastAt,
    litresPerDay: perDay,
    emptyAt: isOnline && perDay !== null ? emptyAt(usableL, perDay, lastAt) : null,
    wholeDoseMeqL: (reservoir.levelL * reservoir.alkalinityMeqL) / smallestL,
    ...{ onlineSince: isOnline ? onlineSince : null, dueAt: isOnline ? replaceAt : null, lastCheck, strengthLow },
    sludgeDueAt: sludgeDueAt(sludgeSince(db, reservoir.id), reservoir.sludgeWeeks),
  };
}

/** The intake and the cover as they were set when it last went online; as the vessel has them where that is not told. */
function setUpAtLastChangeOver(
  events: readonly (typeof reservoirEvents.$inferSelect)[],
): Partial<Pick<ReservoirRow, 'intakeMm' | 'covered'>> {
  const online = events.findLast(({ kind }) => kind === 'online');
  return {
    ...(online && online.intakeMm !== null ? { intakeMm: online.intakeMm } : {}),
    ...(online && online.covered !== null ? { covered: online.covered } : {}),
  };
}

function lastEventAt(db: Db, reservoirId: string, recent: readonly { at: number }[]): number | null {
  const last = recent.at(-1);
  if (last) return last.at;
  const older = db
    .select({ at: max(reservoirEvents.at) })
    .from(reservoirEvents)
    .where(eq(reservoirEvents.reservoirId, reservoirId))
    .get();
  return older?.at ?? null;
}

/** Sludge gathers from its last removal on, or from the first mix. */
function sludgeSince(db: Db, reservoirId: string): number | null {
  const ofReservoir = eq(reservoirEvents.reservoirId, reservoirId);
  const removed = db
    .select({ at: max(reservoirEvents.at) })
    .from(reservoirEvents)
    .where(and(ofReservoir, inArray(reservoirEvents.kind, ['sludge_removed', 'cleaned'])))
    .get();
  if (removed?.at) return removed.at;
  const mixed = db
    .select({ at: min(reservoirEvents.at) })
    .from(reservoirEvents)
    .where(and(ofReservoir, eq(reservoirEvents.kind, 'refill')))
    .get();
  return mixed?.at ?? null;
}
