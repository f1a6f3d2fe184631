import { asc, eq, inArray, or } from 'drizzle-orm';
import type { ReservoirFeed } from '../../shared/contracts/reservoirs.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { type FeedSet, feedsAt } from '../../shared/domain/reservoir-shares.ts';
import type { Db } from '../db/client.ts';
import { reservoirFeeds, reservoirs, systems } from '../db/schema/index.ts';

type Owned = Pick<typeof reservoirs.$inferSelect, 'id' | 'systemId'>;

/** All sets of feeds that reservoirs ever had, oldest first; without any where a reservoir was never shared. */
export function feedSetsOf(db: Db, reservoirIds: readonly string[]): Map<string, FeedSet[]> {
  const rows = db
    .select()
    .from(reservoirFeeds)
    .where(inArray(reservoirFeeds.reservoirId, [...reservoirIds]))
    .orderBy(asc(reservoirFeeds.since))
    .all();
  const byReservoir = [...groupBy(rows, ({ reservoirId }) => reservoirId).entries()];
  return new Map(
    byReservoir.map(([id, own]) => [
      id,
      [...groupBy(own, ({ since }) => since).entries()].map(([since, feeds]) => ({ since, feeds })),
    ]),
  );
}

/** Ids of the systems that a reservoir feeds from now on. */
export function fedSystems(db: Db, { id, systemId }: Owned, now: number): string[] {
  return feedsAt(feedSetsOf(db, [id]).get(id) ?? [], systemId, now).map((feed) => feed.systemId);
}

type FedSystem = ReservoirFeed & { netVolumeL: number };

/** What a reservoir feeds, its own system first. */
export function feedsOf(db: Db, reservoir: Owned, now: number): FedSystem[] {
  return feedsOfAll(db, [reservoir], now).get(reservoir.id) ?? [];
}

/** What each of many reservoirs feeds, its own system first. */
export function feedsOfAll(db: Db, owned: readonly Owned[], now: number): Map<string, FedSystem[]> {
  const sets = feedSetsOf(
    db,
    owned.map(({ id }) => id),
  );
  const { id, code, netVolumeL } = systems;
  const known = db.select({ id, code, netVolumeL }).from(systems).orderBy(asc(code)).all();
  return new Map(
    owned.map((reservoir) => {
      const feeds = feedsAt(sets.get(reservoir.id) ?? [], reservoir.systemId, now);
      const fed = known.flatMap((system) => {
        const share = feeds.find(({ systemId }) => systemId === system.id)?.share;
        return share === undefined
          ? []
          : [{ systemId: system.id, systemCode: system.code, netVolumeL: system.netVolumeL, share }];
      });
      const isOwn = ({ systemId }: FedSystem) => Number(systemId === reservoir.systemId);
      return [reservoir.id, fed.sort((a, b) => isOwn(b) - isOwn(a))];
    }),
  );
}

/** Reservoirs that ever fed a system: its own, and those that it shares or shared. */
export function reservoirsOfSystem(db: Db, systemId: string): (Owned & { volumeL: number })[] {
  const shared = db
    .select({ id: reservoirFeeds.reservoirId })
    .from(reservoirFeeds)
    .where(eq(reservoirFeeds.systemId, systemId));
  return db
    .select({ id: reservoirs.id, systemId: reservoirs.systemId, volumeL: reservoirs.volumeL })
    .from(reservoirs)
    .where(or(eq(reservoirs.systemId, systemId), inArray(reservoirs.id, shared)))
    .all();
}

/** Reservoirs that are online now and feed any of these systems. */
export function onlineFor(db: Db, systemIds: readonly string[], now: number): (typeof reservoirs.$inferSelect)[] {
  const online = db.select().from(reservoirs).where(eq(reservoirs.state, 'online')).all();
  const feeds = feedsOfAll(db, online, now);
  return online.filter(({ id }) => feeds.get(id)?.some(({ systemId }) => systemIds.includes(systemId)));
}
