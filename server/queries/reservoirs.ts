import { and, asc, count, desc, eq, inArray, isNotNull, isNull, lt, or, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import type { Reservoir, ReservoirEvent } from '../../shared/contracts/reservoirs.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { reservoirEvents, reservoirs, systems } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { feedsOfAll, reservoirsOfSystem } from './reservoir-feeds.ts';
import { toReservoirs } from './reservoir-view.ts';

export type ReservoirRow = typeof reservoirs.$inferSelect;
export type ReservoirEventRow = typeof reservoirEvents.$inferSelect;

/** @throws {DomainError} `record.not_found` */
export function reservoirRow(db: Db, reservoirId: string): ReservoirRow {
  const row = db.select().from(reservoirs).where(eq(reservoirs.id, reservoirId)).get();
  if (!row) throw new DomainError('record.not_found', 'There is no such reservoir. Choose one from the list.');
  return row;
}

/** Reservoirs that feed a system, or all; those that were put away only when they are asked for. */
export function listReservoirs(db: Db, now: number, systemId?: string, retired: 'no' | 'only' = 'no'): Reservoir[] {
  const rows = db
    .select({ reservoir: reservoirs, system: systems })
    .from(reservoirs)
    .innerJoin(systems, eq(systems.id, reservoirs.systemId))
    .where(
      and(
        retired === 'only' ? isNotNull(reservoirs.retiredAt) : isNull(reservoirs.retiredAt),
        systemId === undefined ? undefined : inArray(reservoirs.id, feeding(db, systemId, now)),
      ),
    )
    .orderBy(asc(systems.code), asc(reservoirs.code))
    .all();
  return toReservoirs(db, rows, now);
}

function feeding(db: Db, systemId: string, now: number): string[] {
  const owned = reservoirsOfSystem(db, systemId);
  const feeds = feedsOfAll(db, owned, now);
  return owned.flatMap(({ id }) => (feeds.get(id)?.some((feed) => feed.systemId === systemId) ? [id] : []));
}

export function showReservoir(db: Db, reservoirId: string, now: number): Reservoir {
  const row = db
    .select({ reservoir: reservoirs, system: systems })
    .from(reservoirs)
    .innerJoin(systems, eq(systems.id, reservoirs.systemId))
    .where(eq(reservoirs.id, reservoirId))
    .get();
  const [found] = row ? toReservoirs(db, [row], now) : [];
  if (!found) throw new DomainError('record.not_found', 'There is no such reservoir. Choose one from the list.');
  return found;
}

/** The last thing that happened; events of one instant keep the order in which they were written. */
export function lastEvent(db: Db, reservoirId: string): ReservoirEventRow | undefined {
  return db
    .select()
    .from(reservoirEvents)
    .where(eq(reservoirEvents.reservoirId, reservoirId))
    .orderBy(desc(reservoirEvents.at), desc(sql`rowid`))
    .limit(1)
    .get();
}

/** Everything that happened to a reservoir, oldest first. */
export function eventsInOrder(db: Db, reservoirId: string): ReservoirEventRow[] {
  return db
    .select()
    .from(reservoirEvents)
    .where(eq(reservoirEvents.reservoirId, reservoirId))
    .orderBy(asc(reservoirEvents.at), asc(sql`rowid`))
    .all();
}

export function listEvents(
  db: Db,
  reservoirId: string,
  { cursor, limit }: { cursor?: string | undefined; limit: number },
): Page<ReservoirEvent> {
  reservoirRow(db, reservoirId);
  const wanted = eq(reservoirEvents.reservoirId, reservoirId);
  const rows = db
    .select({ event: reservoirEvents, order: sql<number>`rowid` })
    .from(reservoirEvents)
    .where(and(wanted, cursor ? before(cursor) : undefined))
    .orderBy(desc(reservoirEvents.at), desc(sql`rowid`))
    .limit(limit + 1)
    .all();
  const total = db.select({ total: count() }).from(reservoirEvents).where(wanted).get()?.total ?? 0;
  return pageFrom(rows, limit, total, {
    item: ({ event }) => event,
    cursor: ({ event, order }) => [event.at, order],
  });
}

function before(cursor: string): SQL | undefined {
  const [at, order] = readCursor(cursor, z.tuple([z.number(), z.number()]));
  return or(lt(reservoirEvents.at, at), and(eq(reservoirEvents.at, at), lt(sql`rowid`, order)));
}
