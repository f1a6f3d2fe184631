import { sql } from 'drizzle-orm';
import type { Day } from '../../shared/domain/days.ts';
import type { GradeCode } from '../../shared/domain/growth.ts';
import type { Db } from '../db/client.ts';
import { batchIn, batchStock } from './batch-stock.ts';

/** What of a batch can be promised to stores on a day. */
export interface AvailableBatch {
  batchId: string;
  batchCode: string;
  lineId: string;
  cutOn: Day;
  /** Likely size of its pieces on the day, mm. */
  sizeMm: number;
  grade: GradeCode;
  /** Day from which it is healed and large enough for the smallest grade that is sold. */
  readyOn: Day;
  /** Pieces fit for sale, promised ones among them. */
  saleable: number;
  /** Promised to orders and not picked yet. */
  held: number;
  /** Can still be promised: saleable minus held, never below zero. */
  available: number;
}

/**
 * Batches with saleable pieces on a day: on racks outside quarantine, healed, of a grade that stores take by the size
 * expected on that day, and not withheld by plug, batch, rack or system. For a day to come, today's pieces are graded
 * as they will have grown; losses until then are not foreseen. Oldest cut first.
 */
export function availableByBatch(
  db: Db,
  { lineId, batchIds, day }: { lineId?: string; batchIds?: readonly string[]; day: Day },
): AvailableBatch[] {
  const chosen = lineId ? sql`b.line_id = ${lineId}` : batchIds ? batchIn(batchIds) : ON_RACKS;
  return batchStock(db, chosen, day)
    .filter(({ counts }) => counts.saleable > 0)
    .map(({ batch, size, counts, available }) => ({
      batchId: batch.id,
      batchCode: batch.code,
      lineId: batch.lineId,
      cutOn: batch.cutOn,
      sizeMm: size.mm,
      grade: size.grade,
      readyOn: size.saleableOn ?? day,
      saleable: counts.saleable,
      held: counts.held,
      available,
    }));
}

const ON_RACKS = sql`b.id IN (
  SELECT bal.batch_id FROM stock_balance AS bal JOIN stock_account AS a ON a.id = bal.account_id
  WHERE a.kind = 'rack' AND bal.pieces > 0)`;
