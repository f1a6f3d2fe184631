import { eq, sql } from 'drizzle-orm';
import type { Db } from '../db/client.ts';
import { racks, stockAccounts, stockBalances, tanks } from '../db/schema/index.ts';

/** Living pieces on the racks of a system's tanks. */
export function piecesIn(db: Db, systemId: string): number {
  const row = db
    .select({ pieces: sql<number>`coalesce(sum(${stockBalances.pieces}), 0)` })
    .from(tanks)
    .innerJoin(racks, eq(racks.tankId, tanks.id))
    .innerJoin(stockAccounts, eq(stockAccounts.rackId, racks.id))
    .innerJoin(stockBalances, eq(stockBalances.accountId, stockAccounts.id))
    .where(eq(tanks.systemId, systemId))
    .get();
  return row?.pieces ?? 0;
}

/** Pieces that came to the racks of a system since an instant, less those that left. */
export function cameSince(db: Db, systemId: string, since: number): number {
  const row = db.get<{ pieces: number }>(sql`
    WITH place AS (
      SELECT a.id FROM stock_account AS a JOIN rack AS r ON r.id = a.rack_id JOIN tank AS t ON t.id = r.tank_id
      WHERE t.system_id = ${systemId})
    SELECT coalesce(sum(pieces * ((to_account_id IN place) - (from_account_id IN place))), 0) AS pieces
    FROM stock_movement WHERE at > ${since}`);
  return row.pieces;
}
