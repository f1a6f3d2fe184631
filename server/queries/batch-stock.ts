import { eq, sql, type SQL } from 'drizzle-orm';
import type { GradeCount, StockCounts } from '../../shared/contracts/stock.ts';
import type { Day } from '../../shared/domain/days.ts';
import { GRADES } from '../../shared/domain/growth.ts';
import { isSaleable, outlook, paceOf, type Outlook } from '../../shared/domain/line-pace.ts';
import type { Db } from '../db/client.ts';
import { batches, colonies, cuts, lines } from '../db/schema/index.ts';
import { batchPieces, type BatchPieces } from './batch-pieces.ts';
import { measuredSizes, sizeBasis } from './batch-size.ts';
import { farmOf } from './farm.ts';

export type LineRow = typeof lines.$inferSelect;
export type BatchRow = typeof batches.$inferSelect;

/** A batch with where its pieces are and how large they likely are on a day. */
export interface BatchStock {
  batch: BatchRow;
  line: LineRow;
  cut: typeof cuts.$inferSelect;
  colonyCode: string;
  pieces: BatchPieces;
  size: Outlook;
  counts: StockCounts;
  available: number;
}

/** Stock of the batches that a condition on `b` (the batch) chooses, oldest cut first. */
export function batchStock(db: Db, chosen: SQL, day: Day): BatchStock[] {
  const pieces = batchPieces(db, chosen);
  const ids = pieces.map(({ batchId }) => batchId);
  const rows = batchRows(db, ids);
  const measured = measuredSizes(db, ids);
  const { timeZone } = farmOf(db);
  return pieces
    .flatMap((each) => {
      const row = rows.get(each.batchId);
      if (!row) return [];
      const basis = sizeBasis(row.batch, row.line, measured.get(each.batchId), timeZone);
      return withCounts(row, each, outlook(basis, paceOf(row.line).healDays, day));
    })
    .sort((a, b) => a.batch.cutOn.localeCompare(b.batch.cutOn) || a.batch.code.localeCompare(b.batch.code));
}

/** A condition on `b`: the batch is one of these. */
export function batchIn(ids: readonly string[]): SQL {
  return sql`b.id IN (SELECT value FROM json_each(${JSON.stringify(ids)}))`;
}

/** A condition on `b`: some of its pieces are on racks, on the bench or picked. */
export const BATCH_LIVES = sql`(EXISTS (
    SELECT 1 FROM stock_balance AS bal JOIN stock_account AS a ON a.id = bal.account_id
    WHERE bal.batch_id = b.id AND bal.pieces > 0 AND a.kind IN ('rack', 'order'))
  OR (c.undone_at IS NULL AND b.pieces + coalesce((
    SELECT bal.pieces FROM stock_balance AS bal JOIN stock_account AS a ON a.id = bal.account_id
    WHERE bal.batch_id = b.id AND a.kind = 'cut'), 0) > 0))`;

/** The sum over batches. */
export function addCounts(stock: readonly BatchStock[]): StockCounts {
  const sum = (of: (counts: StockCounts) => number) => stock.reduce((total, { counts }) => total + of(counts), 0);
  return {
    alive: sum(({ alive }) => alive),
    onRacks: sum(({ onRacks }) => onRacks),
    bench: sum(({ bench }) => bench),
    saleable: sum(({ saleable }) => saleable),
    held: sum(({ held }) => held),
    withheld: sum(({ withheld }) => withheld),
  };
}

/** Living and saleable pieces by grade, in the order of the grades; grades without pieces are left out. */
export function countGrades(stock: readonly BatchStock[]): GradeCount[] {
  return GRADES.map(({ code }) => {
    const { alive, saleable } = addCounts(stock.filter(({ size }) => size.grade === code));
    return { grade: code, alive, saleable };
  }).filter(({ alive }) => alive > 0);
}

function batchRows(db: Db, ids: readonly string[]) {
  const rows = db
    .select({ batch: batches, line: lines, cut: cuts, colonyCode: colonies.code })
    .from(batches)
    .innerJoin(lines, eq(lines.id, batches.lineId))
    .innerJoin(cuts, eq(cuts.id, batches.cutId))
    .innerJoin(colonies, eq(colonies.id, cuts.colonyId))
    .where(sql`${batches.id} IN (SELECT value FROM json_each(${JSON.stringify(ids)}))`)
    .all();
  return new Map(rows.map((row) => [row.batch.id, row]));
}

function withCounts(
  row: Pick<BatchStock, 'batch' | 'line' | 'cut' | 'colonyCode'>,
  pieces: BatchPieces,
  size: Outlook,
): BatchStock {
  const { onRacks, bench, picked, sellable, withheld, held } = pieces;
  const saleable = isSaleable(size) ? sellable : 0;
  return {
    ...row,
    pieces,
    size,
    counts: { alive: onRacks + bench + picked, onRacks, bench, saleable, held, withheld },
    available: Math.max(0, saleable - held),
  };
}
