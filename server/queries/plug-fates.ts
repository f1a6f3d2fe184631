import { sql, type SQL } from 'drizzle-orm';
import { dayOf, daysBetween, type Day } from '../../shared/domain/days.ts';
import type { Db } from '../db/client.ts';

/** What became of a plug: followed from its cut until it was lost or culled, left alive, or today. */
export interface PlugFate {
  lineId: string;
  /** Who cut it. */
  cutter: string;
  cutOn: Day;
  /** Where it stands or stood last; null: never placed. */
  systemId: string | null;
  /** Days since the cut. */
  day: number;
  lost: boolean;
  /** Why it was lost, as recorded; null where it was not. */
  cause: string | null;
}

interface FateRow extends Pick<PlugFate, 'lineId' | 'cutter' | 'cutOn' | 'systemId'> {
  kind: string | null;
  detail: string | null;
  at: number | null;
}

const LOST = ['lost', 'culled'];
const LEFT = [...LOST, 'sold', 'recut', 'given'];

/** The plugs that a condition on `b` (the batch) and `c` (its cut) chooses; those of cuts that were taken back are left out. */
export function plugFates(db: Db, chosen: SQL, today: Day, timeZone: string): PlugFate[] {
  const rows = db.all<FateRow>(sql`
    SELECT b.line_id AS lineId, c.by AS cutter, b.cut_on AS cutOn, a.kind, a.detail, m.at,
      coalesce(here.system_id, before.system_id) AS systemId
    FROM batch AS b JOIN cut AS c ON c.id = b.cut_id JOIN plug AS p ON p.batch_id = b.id
    LEFT JOIN stock_account AS a ON a.id = p.account_id
    LEFT JOIN stock_movement AS m ON m.id = (SELECT max(id) FROM stock_movement WHERE plug_code = p.code)
    LEFT JOIN stock_account AS f ON f.id = (
      SELECT o.from_account_id FROM stock_movement AS o JOIN stock_account AS r ON r.id = o.from_account_id
      WHERE o.plug_code = p.code AND r.kind = 'rack' ORDER BY o.id DESC LIMIT 1)
    LEFT JOIN rack AS hr ON hr.id = a.rack_id LEFT JOIN tank AS here ON here.id = hr.tank_id
    LEFT JOIN rack AS fr ON fr.id = f.rack_id LEFT JOIN tank AS before ON before.id = fr.tank_id
    WHERE c.undone_at IS NULL AND ${chosen}`);
  return rows.map(({ kind, detail, at, ...of }) => {
    const lost = kind !== null && LOST.includes(kind);
    const left = kind !== null && LEFT.includes(kind) && at !== null;
    const day = Math.max(0, daysBetween(of.cutOn, left ? dayOf(at, timeZone) : today));
    return { ...of, day, lost, cause: lost ? (detail ?? '') : null };
  });
}
