import { sql, type SQL } from 'drizzle-orm';
import type { Db } from '../db/client.ts';

/** Where the pieces of a batch are. Every figure counts plugs, because each piece has one. */
export interface BatchPieces {
  batchId: string;
  onRacks: number;
  bench: number;
  picked: number;
  /** On racks outside quarantine and not withheld by plug, batch, rack or system. */
  sellable: number;
  /** On racks and withheld in any of those ways. */
  withheld: number;
  /** Promised to orders and not picked yet. */
  held: number;
}

/**
 * Counts the pieces of batches that a condition on `b` (the batch) chooses. Batches of cuts that were taken back have
 * none. Reads balances, not movements, so it does not slow down as the ledger grows.
 */
export function batchPieces(db: Db, chosen: SQL = sql`1 = 1`): BatchPieces[] {
  return db.all<BatchPieces>(sql`
    WITH chosen AS (SELECT b.id, b.pieces, c.undone_at FROM batch AS b JOIN cut AS c ON c.id = b.cut_id WHERE ${chosen}),
    blocked_rack AS (
      SELECT r.id, s.kind = 'quarantine' AS quarantine,
        (EXISTS (SELECT 1 FROM withhold AS w WHERE w.ended_at IS NULL AND w.rack_id = r.id)
          OR EXISTS (SELECT 1 FROM withhold AS w WHERE w.ended_at IS NULL AND w.system_id = s.id)) AS withheld
      FROM rack AS r JOIN tank AS t ON t.id = r.tank_id JOIN system AS s ON s.id = t.system_id),
    blocked_batch AS (SELECT DISTINCT batch_id AS id FROM withhold WHERE ended_at IS NULL AND batch_id IS NOT NULL),
    place AS (
      SELECT bal.batch_id, a.kind, bal.pieces,
        coalesce(r.quarantine, 0) AS quarantine,
        coalesce(r.withheld, 0) OR bb.id IS NOT NULL AS withheld
      FROM chosen JOIN stock_balance AS bal ON bal.batch_id = chosen.id
      JOIN stock_account AS a ON a.id = bal.account_id
      LEFT JOIN blocked_rack AS r ON r.id = a.rack_id
      LEFT JOIN blocked_batch AS bb ON bb.id = bal.batch_id),
    -- Plugs withheld one by one, on places that are not withheld as a whole: those are counted already.
    single AS (
      SELECT p.batch_id, count(*) AS pieces, sum(r.quarantine = 0) AS sellable
      FROM plug AS p JOIN stock_account AS a ON a.id = p.account_id AND a.kind = 'rack'
      JOIN blocked_rack AS r ON r.id = a.rack_id
      WHERE p.code IN (SELECT plug_code FROM withhold WHERE ended_at IS NULL AND plug_code IS NOT NULL)
        AND NOT r.withheld AND p.batch_id NOT IN (SELECT id FROM blocked_batch)
      GROUP BY p.batch_id),
    promised AS (SELECT batch_id, sum(pieces) AS pieces FROM hold WHERE pieces > 0 GROUP BY batch_id)
    SELECT chosen.id AS batchId,
      coalesce(sum(place.pieces) FILTER (WHERE place.kind = 'rack'), 0) AS onRacks,
      CASE WHEN chosen.undone_at IS NULL
        THEN chosen.pieces + coalesce(sum(place.pieces) FILTER (WHERE place.kind = 'cut'), 0) ELSE 0 END AS bench,
      coalesce(sum(place.pieces) FILTER (WHERE place.kind = 'order'), 0) AS picked,
      coalesce(sum(place.pieces) FILTER (WHERE place.kind = 'rack' AND NOT place.withheld AND NOT place.quarantine), 0)
        - coalesce(max(single.sellable), 0) AS sellable,
      coalesce(sum(place.pieces) FILTER (WHERE place.kind = 'rack' AND place.withheld), 0)
        + coalesce(max(single.pieces), 0) AS withheld,
      coalesce(max(promised.pieces), 0) AS held
    FROM chosen
    LEFT JOIN place ON place.batch_id = chosen.id
    LEFT JOIN single ON single.batch_id = chosen.id
    LEFT JOIN promised ON promised.batch_id = chosen.id
    GROUP BY chosen.id`);
}
