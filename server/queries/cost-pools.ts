import { sql } from 'drizzle-orm';
import { dayOf, monthBounds, monthOf, startOfDay, type Month } from '../../shared/domain/days.ts';
import type { Db } from '../db/client.ts';

export const COST_PARTS = ['lime', 'vinegar', 'other'] as const;
export type CostPart = (typeof COST_PARTS)[number];

/** A month of the farm as instants: from `start` up to, not including, `end`. */
export interface MonthSpan {
  month: Month;
  start: number;
  end: number;
}

/** What supplies used in a system in a month have cost. What a cut took belongs to its batch and is not in it. */
export interface CostPool {
  month: Month;
  systemId: string;
  part: CostPart;
  costMicro: number;
}

/** Every month from the first movement or use up to now; empty on a farm without any. */
export function farmMonths(db: Db, now: number, timeZone: string): MonthSpan[] {
  const first = db.get<{ at: number | null }>(sql`
    SELECT min(at) AS at FROM (SELECT min(at) AS at FROM stock_movement UNION ALL SELECT min(at) FROM consumption)`);
  if (first?.at === null || first?.at === undefined) return [];
  const spans: MonthSpan[] = [];
  const last = monthOf(dayOf(now, timeZone));
  for (let month = monthOf(dayOf(first.at, timeZone)); month <= last;) {
    const { from, to } = monthBounds(month);
    spans.push({ month, start: startOfDay(from, timeZone), end: startOfDay(to, timeZone) });
    month = monthOf(to);
  }
  return spans;
}

export function costPools(db: Db, months: readonly MonthSpan[]): CostPool[] {
  return db.all<CostPool>(sql`
    WITH span AS (${spanRows(months)})
    SELECT span.month AS month, c.system_id AS systemId,
      CASE WHEN i.kind IN ('lime', 'vinegar') THEN i.kind ELSE 'other' END AS part,
      sum(c.cost_micro) AS costMicro
    FROM span CROSS JOIN system AS s
    JOIN consumption AS c ON c.system_id = s.id AND c.at >= span.start AND c.at < span.end AND c.cause <> 'cut'
    JOIN item AS i ON i.id = c.item_id
    GROUP BY 1, 2, 3
    HAVING sum(c.cost_micro) > 0
    ORDER BY 1, 2, 3`);
}

/**
 * How many movements a month has, the newest of them, and how many were taken back since. Movements are only ever added,
 * so this tells every change.
 */
export function movementMarks(
  db: Db,
  months: readonly MonthSpan[],
): { month: Month; count: number; newest: number; reversed: number }[] {
  return db.all(sql`
    WITH span AS (${spanRows(months)})
    SELECT span.month AS month, count(m.id) AS count, coalesce(max(m.id), 0) AS newest, count(r.id) AS reversed
    FROM span LEFT JOIN stock_movement AS m ON m.at >= span.start AND m.at < span.end
    LEFT JOIN stock_movement AS r ON r.reverses_id = m.id
    GROUP BY 1
    ORDER BY 1`);
}

function spanRows(months: readonly MonthSpan[]) {
  if (months.length === 0) return sql`SELECT NULL AS month, 0 AS start, 0 AS end WHERE 0`;
  const rows = months.map(({ month, start, end }) => sql`SELECT ${month} AS month, ${start} AS start, ${end} AS end`);
  return sql.join(rows, sql` UNION ALL `);
}
