import { and, eq, inArray, max, min } from 'drizzle-orm';
import type { Reservoir } from '../../shared/contracts/reservoirs.ts';
import { careOf, sludgeDueAt } from '../../shared/domain/reservoir-care.ts';
import { stateAt } from '../../shared/domain/reservoir-state.ts';
import { emptyAt, litresPerDay } from '../../shared/domain/reservoir-use.ts';
import { litresBelowIntake, usableLitres } from '../../shared/domain/reservoir-vessel.ts';
import type { Db } from '../db/client.ts';
import type { reservoirs, systems } from '../db/schema/index.ts';
import { reservoirEvents } from '../db/schema/index.ts';
import { feedsOfAll } from './reservoir-feeds.ts';
import { onlineUse, recentEventsOf } from './reservoir-use.ts';

type ReservoirRow = typeof reservoirs.$inferSelect;

export interface OwnedReservoir {
  reservoir: ReservoirRow;
  system: typeof systems.$inferSelect;
}

/**
 * Reservoirs as people see them: what stands in each, what may be drawn, how long it lasts and what it wants. Read for
 * all at once, since a farm looks at all of them.
 */
export function toReservoirs(db: Db, rows: readonly OwnedReservoir[], now: number): Reservoir[] {
  const ids = rows.map(({ reservoir }) => reservoir.id);
  const owned = rows.map(({ reservoir }) => reservoir);
  const [events, feeds] = [recentEventsOf(db, ids, now), feedsOfAll(db, owned, now)];
  const [lastAt, sludge] = [lastEventsAt(db, ids), sludgeSince(db, ids)];
  return rows.map((row) => {
    const { id } = row.reservoir;
    const known = { events: events.get(id) ?? [], feeds: feeds.get(id) ?? [] };
    return toReservoir(row, { ...known, lastAt: lastAt.get(id) ?? null, sludgeSince: sludge.get(id) ?? null }, now);
  });
}

interface Known {
  events: readonly (typeof reservoirEvents.$inferSelect)[];
  feeds: (Reservoir['feeds'][number] & { netVolumeL: number })[];
  lastAt: number | null;
  sludgeSince: number | null;
}

function toReservoir({ reservoir, system }: OwnedReservoir, known: Known, now: number): Reservoir {
  const { createdAt: _, state: __, ...fields } = reservoir;
  const { events, feeds, lastAt } = known;
  const perDay = litresPerDay(onlineUse(events).intervals, now);
  const vessel = { ...reservoir, ...setUpAtLastChangeOver(events) };
  const usableL = usableLitres(vessel, reservoir.levelL);
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
    sludgeDueAt: sludgeDueAt(known.sludgeSince, reservoir.sludgeWeeks),
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

function lastEventsAt(db: Db, ids: readonly string[]): Map<string, number> {
  return instants(
    db
      .select({ id: reservoirEvents.reservoirId, at: max(reservoirEvents.at) })
      .from(reservoirEvents)
      .where(inArray(reservoirEvents.reservoirId, [...ids]))
      .groupBy(reservoirEvents.reservoirId)
      .all(),
  );
}

/** Sludge gathers from its last removal on, or from the first mix. */
function sludgeSince(db: Db, ids: readonly string[]): Map<string, number> {
  const { reservoirId, kind, at } = reservoirEvents;
  const ofThese = inArray(reservoirId, [...ids]);
  const mixed = db
    .select({ id: reservoirId, at: min(at) })
    .from(reservoirEvents)
    .where(and(ofThese, eq(kind, 'refill')))
    .groupBy(reservoirId)
    .all();
  const removed = db
    .select({ id: reservoirId, at: max(at) })
    .from(reservoirEvents)
    .where(and(ofThese, inArray(kind, ['sludge_removed', 'cleaned'])))
    .groupBy(reservoirId)
    .all();
  return new Map([...instants(mixed), ...instants(removed)]);
}

function instants(rows: readonly { id: string; at: number | null }[]): Map<string, number> {
  return new Map(rows.flatMap(({ id, at }) => (at === null ? [] : [[id, at] as const])));
}
