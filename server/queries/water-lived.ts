import { sql } from 'drizzle-orm';
import type { PlugPage } from '../../shared/contracts/stock.ts';
import { PARAMETERS } from '../../shared/domain/units.ts';
import type { Db } from '../db/client.ts';
import type { Stay } from './plug-stays.ts';

interface Sums {
  parameter: string;
  readings: number;
  sum: number;
  squares: number;
}

/** Mean and spread of what was measured in the systems that a plug stood in, while it stood there; canonical units. */
export function waterLived(db: Db, stays: readonly Stay[], now: number): PlugPage['water'] {
  const spans = stays.flatMap(({ systemId, from, to }) =>
    systemId === null ? [] : [{ systemId, from, to: to ?? now + 1 }],
  );
  const rows = db.all<Sums>(sql`
    SELECT r.parameter, count(*) AS readings, sum(r.value) AS sum, sum(r.value * r.value) AS squares
    FROM json_each(${JSON.stringify(spans)}) AS span
    JOIN reading AS r ON r.system_id = json_extract(span.value, '$.systemId')
      AND r.taken_at >= json_extract(span.value, '$.from') AND r.taken_at < json_extract(span.value, '$.to')
    GROUP BY r.parameter`);
  const found = new Map(rows.map((row) => [row.parameter, row]));
  return PARAMETERS.flatMap(({ code }) => {
    const row = found.get(code);
    return row ? [{ parameter: code, mean: row.sum / row.readings, sd: spread(row), readings: row.readings }] : [];
  });
}

function spread({ readings, sum, squares }: Sums): number | null {
  if (readings < 2) return null;
  // Rounding can take the difference a little below zero where all values are equal.
  return Math.sqrt(Math.max(0, (squares - (sum * sum) / readings) / (readings - 1)));
}
