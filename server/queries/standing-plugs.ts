import { sql } from 'drizzle-orm';
import type { Db } from '../db/client.ts';

/** A plug that stands on a rack and may be sold. */
export interface StandingPlug {
  code: string;
  batchId: string;
  rackId: string;
  rackCode: string;
  tankName: string;
  systemCode: string;
  position: string | null;
}

/** Plugs of these batches on racks outside quarantine that nothing withholds, by system, rack and position. */
export function sellablePlugs(db: Db, batchIds: readonly string[]): StandingPlug[] {
  return db.all<StandingPlug>(sql`
    SELECT p.code, p.batch_id AS batchId, r.id AS rackId, r.code AS rackCode, t.name AS tankName,
      s.code AS systemCode, p.position
    FROM plug AS p
    JOIN stock_account AS a ON a.id = p.account_id
    JOIN rack AS r ON r.id = a.rack_id
    JOIN tank AS t ON t.id = r.tank_id
    JOIN system AS s ON s.id = t.system_id
    WHERE p.batch_id IN (SELECT value FROM json_each(${JSON.stringify(batchIds)}))
      AND s.kind <> 'quarantine'
      AND NOT EXISTS (SELECT 1 FROM withhold AS w WHERE w.ended_at IS NULL
        AND (w.plug_code = p.code OR w.batch_id = p.batch_id OR w.rack_id = r.id OR w.system_id = s.id))
    ORDER BY s.code, t.code, r.code, p.position IS NULL, length(p.position), p.position, p.code`);
}
