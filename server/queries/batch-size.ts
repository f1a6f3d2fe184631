import { sql } from 'drizzle-orm';
import { dayOf, type Day } from '../../shared/domain/days.ts';
import type { SizeBasis } from '../../shared/domain/growth.ts';
import { paceOf, type LineGrowth } from '../../shared/domain/line-pace.ts';
import type { Db } from '../db/client.ts';

/** Sizes taken within half a day are one measuring, and their mean is the batch's size. */
const ONE_MEASURING_MS = 12 * 3_600_000;
/** Named plugs speak for their batch from this many in one measuring on; fewer speak for themselves. */
const LEAST_PLUGS = 3;

export interface MeasuredSize {
  mm: number;
  at: number;
}

/** Mean size of each batch at its newest measuring: a sample of it, or three of its plugs or more. Others are missing. */
export function measuredSizes(db: Db, batchIds?: readonly string[]): Map<string, MeasuredSize> {
  const some = batchIds ? sql`AND r.batch_id IN (SELECT value FROM json_each(${JSON.stringify(batchIds)}))` : sql``;
  const rows = db.all<{ batchId: string; mm: number; at: number }>(sql`
    SELECT s.batch_id AS batchId, avg(s.size_mm) AS mm, newest.at AS at
    FROM (
      SELECT r.batch_id, max(r.at) AS at FROM size_reading AS r
      WHERE (r.plug_code IS NULL OR (
        SELECT count(*) FROM size_reading AS near
        WHERE near.batch_id = r.batch_id AND near.at > r.at - ${ONE_MEASURING_MS} AND near.at <= r.at) >= ${LEAST_PLUGS})
        ${some}
      GROUP BY r.batch_id) AS newest
    JOIN size_reading AS s
      ON s.batch_id = newest.batch_id AND s.at > newest.at - ${ONE_MEASURING_MS} AND s.at <= newest.at
    GROUP BY s.batch_id`);
  return new Map(rows.map(({ batchId, mm, at }) => [batchId, { mm, at }]));
}

/** What is known of the size of a batch (or of one plug of it): start, the line's pace and the newest measuring. */
export function sizeBasis(
  batch: { startMm: number; cutOn: Day },
  line: LineGrowth,
  measured: MeasuredSize | undefined,
  timeZone: string,
): SizeBasis {
  return {
    startMm: batch.startMm,
    mmPerWeek: paceOf(line).mmPerWeek,
    cutDay: batch.cutOn,
    ...(measured ? { measured: { day: dayOf(measured.at, timeZone), mm: measured.mm } } : {}),
  };
}
