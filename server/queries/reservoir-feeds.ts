import { asc, eq, inArray, or, sql } from 'drizzle-orm';
import type { ReservoirFeed } from '../../shared/contracts/reservoirs.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { type FeedSet, feedsAt } from '../../shared/domain/reservoir-shares.ts';
import type { Db } from '../db/client.ts';
import { reservoirFeeds, reservoirs, systems } from '../db/schema/index.ts';

type Owned = Pick<typeof reservoirs.$inferSelect, 'id' | 'systemId'>;

/** All sets of feeds that a reservoir ever had, oldest first. */
export function feedSets(db: Db, reservoirId: string): FeedSet[] {
  const rows = db
    .select()
    .from(reservoirFeeds)
    .where(eq(reservoirFeeds.reservoirId, reservoirId))
    .orderBy(asc(reservoirFeeds.since))
    .all();
  return [...groupBy(rows, ({ since }) => since).entries()].map(([since, feeds]) => ({ since, feeds }));
}

/** Ids of the systems that a reservoir feeds from now on. */
export function fedSystems(db: Db, { id, systemId }: Owned, now: number): string[] {
  return feedsAt(feedSets(db, id), systemId, now).map((feed) => feed.systemId);
}

/** What a reservoir feeds, its own system first. */
export function feedsOf(db: Db, { id, systemId }: Owned, now: number): (ReservoirFeed & { netVolumeL: number })[] {
  const feeds = feedsAt(feedSets(db, id), systemId, now);
  const rows = db
    .select({ id: systems.id, code: systems.code, netVolumeL: systems.netVolumeL })
    .from(systems)
    .where(
      inArray(
        systems.id,
        feeds.map((feed) => feed.systemId),
      ),
    )
    .orderBy(sql`${systems.id} <> ${systemId}`, asc(systems.code))
    .all();
  return rows.map((system) => ({
    ...{ systemId: system.id, systemCode: system.code, netVolumeL: system.netVolumeL },
    share: feeds.find((feed) => feed.systemId === system.id)?.share ?? 0,
  }));
}

/** Reservoirs that ever fed a system: its own, and those that it shares or shared. */
export function reservoirsOfSystem(db: Db, systemId: string): Owned[] {
  const shared = db
    .select({ id: reservoirFeeds.reservoirId })
    .from(reservoirFeeds)
    .where(eq(reservoirFeeds.systemId, systemId));
  return db
    .select({ id: reservoirs.id, systemId: reservoirs.systemId })
    .from(reservoirs)
    .where(or(eq(reservoirs.systemId, systemId), inArray(reservoirs.id, shared)))
    .all();
}

/** Reservoirs that are online now and feed any of these systems. */
export function onlineFor(db: Db, systemIds: readonly string[], now: number): (typeof reservoirs.$inferSelect)[] {
  const online = db.select().from(reservoirs).where(eq(reservoirs.state, 'online')).all();
  return online.filter((reservoir) => fedSystems(db, reservoir, now).some((id) => systemIds.includes(id)));
}
