import { sql } from 'drizzle-orm';
import type { Db } from '../db/client.ts';
import type { MeasuredSize } from './batch-size.ts';

/** The newest measured size of each of these plugs; plugs never measured themselves are missing. */
export function measuredPlugSizes(db: Db, codes: readonly string[]): Map<string, MeasuredSize> {
  const rows = db.all<{ code: string; mm: number; at: number }>(sql`
    SELECT plug_code AS code, avg(size_mm) AS mm, at FROM size_reading AS s
    WHERE plug_code IN (SELECT value FROM json_each(${JSON.stringify(codes)}))
      AND at = (SELECT max(at) FROM size_reading WHERE plug_code = s.plug_code)
    GROUP BY plug_code, at`);
  return new Map(rows.map(({ code, mm, at }) => [code, { mm, at }]));
}
