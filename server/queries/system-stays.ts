import { sql } from 'drizzle-orm';
import { staysOf, type Stay } from '../../shared/domain/costing.ts';
import { dayOf, startOfDay, type Day } from '../../shared/domain/days.ts';
import type { Db } from '../db/client.ts';

interface RackChange {
  batchId: string;
  systemId: string;
  at: number;
  pieces: number;
}

/**
 * How many pieces of each batch stood in which system from when to when, from the ledger's movements on and off racks.
 * A rack counts for the system that it stands in now, also for the days before it was carried there.
 *
 * @param until first day that is not counted any more
 */
export function systemStays(db: Db, until: Day, timeZone: string): Stay[] {
  const changes = rackChanges(db, startOfDay(until, timeZone));
  return staysOf(
    changes.map(({ at, ...change }) => ({ ...change, day: dayOf(at, timeZone) })),
    until,
  );
}

/** What was taken back never was: neither the mistaken movement nor its reversal counts. */
function rackChanges(db: Db, before: number): RackChange[] {
  return db.all<RackChange>(sql`
    WITH place AS (
      SELECT a.id AS account_id, t.system_id
      FROM stock_account AS a JOIN rack AS r ON r.id = a.rack_id JOIN tank AS t ON t.id = r.tank_id),
    standing AS (
      SELECT m.batch_id, m.from_account_id, m.to_account_id, m.at, m.pieces FROM stock_movement AS m
      WHERE m.at < ${before} AND m.reverses_id IS NULL
        AND NOT EXISTS (SELECT 1 FROM stock_movement AS r WHERE r.reverses_id = m.id))
    SELECT batch_id AS batchId, system_id AS systemId, at, sum(pieces) AS pieces
    FROM (
      SELECT batch_id, system_id, at, pieces
      FROM standing JOIN place ON place.account_id = standing.to_account_id
      UNION ALL
      SELECT batch_id, system_id, at, -pieces
      FROM standing JOIN place ON place.account_id = standing.from_account_id)
    GROUP BY batch_id, system_id, at
    HAVING sum(pieces) <> 0`);
}
