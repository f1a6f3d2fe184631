import { randomInt, randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { pino } from 'pino';
import { readConfig } from '../../server/config.ts';
import { openDatabase } from '../../server/db/client.ts';
import { stockAccounts, plugs, users } from '../../server/db/schema/index.ts';
import type { Actor } from '../../server/db/write.ts';
import type { Deps } from '../../server/deps.ts';
import { smtpTransport } from '../../server/outside/mail-transport.ts';
import { stripePayments } from '../../server/outside/payment-service.ts';
import { farmOf } from '../../server/queries/farm.ts';
import { activeListings, stockByGrade } from '../../server/queries/listings.ts';
import { dayOf } from '../../shared/domain/days.ts';

export interface BenchFarm {
  deps: Deps;
  sqlite: Deps['sqlite'];
  now: number;
  /** Codes of some plugs that stand on racks. */
  plugCodes: string[];
  /** What most can be ordered of, and how many orders of one piece that is. */
  offer: { listingId: string; priceMinor: number };
  lasts: number;
  buyer: Actor;
}

/** A farm's database opened without the server, to run the same SQL beside it. */
export function openBenchFarm(file: string): BenchFarm {
  const { db, sqlite } = openDatabase(file);
  const config = readConfig({});
  const now = Date.now();
  const deps: Deps = {
    ...{ db, sqlite, config, clock: { now: () => now }, newId: () => randomUUID(), randomInt: (max) => randomInt(max) },
    ...{ payments: stripePayments(config.stripe), mail: smtpTransport(config.smtpUrl, config.mailFrom) },
    log: pino({ level: 'silent' }),
  };
  const user = db.select().from(users).where(eq(users.role, 'buyer')).get();
  const buyer: Actor = { userId: user?.id ?? null, name: '', role: 'buyer', storeId: user?.storeId ?? null };
  const stockOf = stockByGrade(db, dayOf(now, farmOf(db).timeZone));
  // Orders take from the oldest batch first, and the same SQL run again takes from that one batch.
  const [most] = activeListings(db)
    .map(({ listing }) => ({ listing, lasts: stockOf(listing.lineId, listing.grade).batches[0]?.available ?? 0 }))
    .sort((a, b) => b.lasts - a.lasts);
  const plugCodes = db
    .select({ code: plugs.code })
    .from(plugs)
    .innerJoin(stockAccounts, eq(stockAccounts.id, plugs.accountId))
    .where(eq(stockAccounts.kind, 'rack'))
    .orderBy(plugs.code)
    .limit(20)
    .all()
    .map(({ code }) => code);
  if (!most || plugCodes.length === 0) throw new Error('The demo farm has nothing to look up or to sell.');
  const { id: listingId, priceMinor } = most.listing;
  return { deps, sqlite, now, plugCodes, offer: { listingId, priceMinor }, lasts: most.lasts, buyer };
}
