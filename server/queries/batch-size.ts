import { sql } from 'drizzle-orm';
import { dayOf, type Day } from '../../shared/domain/days.ts';
import type { SizeBasis } from '../../shared/domain/growth.ts';
import { paceOf, type LineGrowth } from '../../shared/domain/line-pace.ts';
import type { Db } from '../db/client.ts';

/** Sizes within half a day of the newest are one measuring, and their mean is the batch's size. */
const ONE_MEASURING_MS = 12 * 3_600_000;

export interface MeasuredSize {
  mm: number;
  at: number;
}

/** Mean size of each batch at its newest measuring; batches without one are missing. */
export function measuredSizes(db: Db, batchIds?: readonly string[]): Map<string, MeasuredSize> {
  const some = batchIds ? sql`WHERE batch_id IN (SELECT value FROM json_each(${JSON.stringify(batchIds)}))` : sql``;
  const rows = db.all<{ batchId: string; mm: number; at: number }>(sql`
    SELECT s.batch_id AS batchId, avg(s.size_mm) AS mm, newest.at AS at
    FROM (SELECT batch_id, max(at) AS at FROM size_reading ${some} GROUP BY batch_id) AS newest
    JOIN size_reading AS s ON s.batch_id = newest.batch_id AND s.at > newest.at - ${ONE_MEASURING_MS}
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
