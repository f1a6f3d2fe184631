import { and, asc, eq, gte, inArray, lt, max, or, sql } from 'drizzle-orm';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { onlineSpans, type ReservoirEventKind } from '../../shared/domain/reservoir-state.ts';
import { type FeedSet, feedsAt, partOfSystem } from '../../shared/domain/reservoir-shares.ts';
import { reservoirUse, type ReservoirEvent, type UseInterval } from '../../shared/domain/reservoir-use.ts';
import type { Db } from '../db/client.ts';
import { reservoirEvents } from '../db/schema/index.ts';
import { feedSetsOf, reservoirsOfSystem } from './reservoir-feeds.ts';

const USUAL_DAYS = 60;

type EventRow = typeof reservoirEvents.$inferSelect;

export interface OnlineUse {
  /** What a system got between two looks at the level. */
  intervals: UseInterval[];
  /** Since when the reservoir feeds its system; null while it doesn't. */
  onlineSince: number | null;
  /** The last look at its level. */
  lastAt: number | null;
  levelL: number;
  alkalinityMeqL: number;
}

/**
 * What was drawn from a reservoir while it was online. What left it at other times (cleaning, a drained rest) fed no
 * system and is not counted.
 *
 * @param events of the reservoir in order, as `recentEvents` gives them
 */
export function onlineUse(events: readonly EventRow[]): OnlineUse {
  const spans = onlineSpans(events);
  const use = reservoirUse(events.map(toLookOrChange), events[0]?.alkalinityMeqL ?? 0);
  const open = spans.at(-1);
  return {
    intervals: use.intervals.filter((each) =>
      spans.some(({ from, to }) => each.from >= from && (to === null || each.to <= to)),
    ),
    onlineSince: open?.to === null ? open.from : null,
    lastAt: events.at(-1)?.at ?? null,
    levelL: use.level?.litres ?? 0,
    alkalinityMeqL: use.alkalinityMeqL,
  };
}

/** What a system got from all reservoirs that feed it, by its share of each. */
export function systemUse(db: Db, systemId: string, now: number, days: number): OnlineUse[] {
  const feeding = reservoirsOfSystem(db, systemId);
  const ids = feeding.map(({ id }) => id);
  const [events, sets] = [recentEventsOf(db, ids, now, days), feedSetsOf(db, ids)];
  return feeding.map(({ id, systemId: ownSystemId }) =>
    partOfUse(onlineUse(events.get(id) ?? []), sets.get(id) ?? [], { ownSystemId, systemId, now }),
  );
}

function partOfUse(
  use: OnlineUse,
  sets: readonly FeedSet[],
  { ownSystemId, systemId, now }: { ownSystemId: string; systemId: string; now: number },
): OnlineUse {
  if (sets.length === 0) return use;
  const share = feedsAt(sets, ownSystemId, now).find((feed) => feed.systemId === systemId)?.share ?? 0;
  return {
    ...use,
    intervals: partOfSystem(use.intervals, sets, { ownSystemId, systemId }),
    onlineSince: share > 0 ? use.onlineSince : null,
    levelL: use.levelL * share,
  };
}

/** Events of the last days, led by the changeover before them, so that it is known whether the reservoir was online. */
export function recentEvents(db: Db, reservoirId: string, now: number, days: number = USUAL_DAYS): EventRow[] {
  return recentEventsOf(db, [reservoirId], now, days).get(reservoirId) ?? [];
}

/** The same for many reservoirs at once. */
export function recentEventsOf(
  db: Db,
  reservoirIds: readonly string[],
  now: number,
  days: number = USUAL_DAYS,
): Map<string, EventRow[]> {
  const from = now - days * MS_PER_DAY;
  const { reservoirId, at, kind } = reservoirEvents;
  const ofThese = inArray(reservoirId, [...reservoirIds]);
  const leads = db
    .select({ reservoirId, at: max(at) })
    .from(reservoirEvents)
    .where(and(ofThese, eq(kind, 'online'), lt(at, from)))
    .groupBy(reservoirId)
    .all();
  const led = or(...leads.map((lead) => and(eq(reservoirId, lead.reservoirId), gte(at, lead.at ?? from))));
  const rows = db
    .select()
    .from(reservoirEvents)
    .where(or(and(ofThese, gte(at, from)), led))
    .orderBy(asc(at), asc(sql`rowid`))
    .all();
  return groupBy(rows, (row) => row.reservoirId);
}

/** Events that change what stands in a reservoir, or its strength, other than by use. */
const CHANGES: ReadonlySet<ReservoirEventKind> = new Set([
  ...(['refill', 'topped_up', 'strength', 'sludge_removed', 'cleaned'] as const),
]);

function toLookOrChange({ kind, at, levelBeforeL, levelL, alkalinityMeqL }: EventRow): ReservoirEvent {
  return CHANGES.has(kind)
    ? { kind: 'change', at, litresBefore: levelBeforeL, litresAfter: levelL, alkalinityMeqL }
    : { kind: 'level', at, litres: levelL };
}
