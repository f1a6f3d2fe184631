import { sql } from 'drizzle-orm';
import { dayOf, daysBetween, type Day } from '../../shared/domain/days.ts';
import { growthCurves, type GrowthCurve } from '../../shared/domain/growth-fit/growth-curves.ts';
import { poolPaces, type ObservedPace, type PooledPaces } from '../../shared/domain/growth-fit/pool-paces.ts';
import { paceOf, type LineGrowth } from '../../shared/domain/line-pace.ts';
import type { Db } from '../db/client.ts';
import { measuredSizes } from './batch-size.ts';
import { farmOf } from './farm.ts';

/** Younger batches have not grown by more than their measuring is off. */
const LEAST_DAYS = 21;
/** Fewer measurings do not tell a bend from chance (from memory). */
const LEAST_MEASURINGS = 8;

/** The pace of each line as its measured batches tell it, drawn toward its genus and the farm. */
export function linePaces(db: Db): PooledPaces {
  const { timeZone } = farmOf(db);
  const rows = db.all<LineGrowth & { id: string; lineId: string; taxon: string; cutOn: Day; cutMm: number }>(sql`
    SELECT b.id, b.line_id AS lineId, l.taxon, b.cut_on AS cutOn, b.start_mm AS cutMm, l.growth_form AS growthForm,
      l.start_mm AS startMm, l.mm_per_week AS mmPerWeek, l.heal_days AS healDays
    FROM batch AS b JOIN line AS l ON l.id = b.line_id JOIN cut AS c ON c.id = b.cut_id
    WHERE c.undone_at IS NULL AND EXISTS (SELECT 1 FROM size_reading AS r WHERE r.batch_id = b.id)`);
  const measured = measuredSizes(
    db,
    rows.map(({ id }) => id),
  );
  const observed = rows.flatMap((row): ObservedPace[] => {
    const size = measured.get(row.id);
    const days = size ? daysBetween(row.cutOn, dayOf(size.at, timeZone)) : 0;
    if (!size || days < LEAST_DAYS) return [];
    const usualMm = (paceOf(row).mmPerWeek * days) / 7;
    return [{ line: row.lineId, genus: genusOf(row.taxon), ratio: (size.mm - row.cutMm) / usualMm }];
  });
  return poolPaces(observed);
}

export function genusOf(taxon: string): string {
  return taxon.split(' ', 1)[0] ?? '';
}

/** The curve that fits a line's measurings best by AICc; null with too few of them. */
export function lineCurve(db: Db, lineId: string): GrowthCurve | null {
  const { timeZone } = farmOf(db);
  const rows = db.all<{ mm: number; at: number; cutOn: Day }>(sql`
    SELECT avg(r.size_mm) AS mm, r.at, b.cut_on AS cutOn
    FROM size_reading AS r JOIN batch AS b ON b.id = r.batch_id
    WHERE b.line_id = ${lineId} AND r.plug_code IS NULL GROUP BY b.id, r.at`);
  if (rows.length < LEAST_MEASURINGS) return null;
  const points = rows.map(({ mm, at, cutOn }) => ({ x: daysBetween(cutOn, dayOf(at, timeZone)), y: mm }));
  return growthCurves(points)[0] ?? null;
}
