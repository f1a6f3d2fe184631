import { and, asc, desc, eq, gte, lt, sql } from 'drizzle-orm';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { onlineSpans } from '../../shared/domain/reservoir-state.ts';
import { reservoirUse, type UseInterval } from '../../shared/domain/reservoir-use.ts';
import type { Db } from '../db/client.ts';
import { reservoirEvents, reservoirs } from '../db/schema/index.ts';

const USUAL_DAYS = 60;

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
 */
export function onlineUse(db: Db, reservoirId: string, now: number, days: number = USUAL_DAYS): OnlineUse {
  const events = recentEvents(db, reservoirId, now - days * MS_PER_DAY);
  const spans = onlineSpans(events);
  const use = reservoirUse(
    events.map(({ kind, at, levelBeforeL, levelL, alkalinityMeqL }) =>
      kind === 'refill'
        ? { kind, at, litresBefore: levelBeforeL, litresAfter: levelL, alkalinityMeqL }
        : { kind: 'level', at, litres: levelL },
    ),
    events[0]?.alkalinityMeqL ?? 0,
  );
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

/** Use of all reservoirs of a system. */
export function systemUse(db: Db, systemId: string, now: number, days: number): OnlineUse[] {
  return db
    .select({ id: reservoirs.id })
    .from(reservoirs)
    .where(eq(reservoirs.systemId, systemId))
    .all()
    .map(({ id }) => onlineUse(db, id, now, days));
}

/** Events from an instant on, led by the changeover before them, so that it is known whether the reservoir was online. */
function recentEvents(db: Db, reservoirId: string, from: number) {
  const ofReservoir = eq(reservoirEvents.reservoirId, reservoirId);
  const change = db
    .select({ at: reservoirEvents.at })
    .from(reservoirEvents)
    .where(and(ofReservoir, lt(reservoirEvents.at, from), eq(reservoirEvents.kind, 'online')))
    .orderBy(desc(reservoirEvents.at))
    .limit(1)
    .get();
  return db
    .select()
    .from(reservoirEvents)
    .where(and(ofReservoir, gte(reservoirEvents.at, change?.at ?? from)))
    .orderBy(asc(reservoirEvents.at), asc(sql`rowid`))
    .all();
}
