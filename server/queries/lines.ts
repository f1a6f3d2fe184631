import { and, asc, count, eq, gt, isNotNull, isNull, or, sql } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import type { Line, LineWithStock, ListLines, StockSummary } from '../../shared/contracts/stock.ts';
import { addDays, dayOf } from '../../shared/domain/days.ts';
import { isSaleable, paceOf } from '../../shared/domain/line-pace.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { colonies, lines } from '../db/schema/index.ts';
import { addCounts, BATCH_LIVES, batchStock, countGrades, type BatchStock, type LineRow } from './batch-stock.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { farmOf } from './farm.ts';
import { likePattern } from './like-pattern.ts';

/** How far ahead the summary looks for pieces that become saleable. */
const SOON_DAYS = 14;

export function toLine(row: LineRow): Line {
  return { ...row, expected: paceOf(row) };
}

/** @throws {DomainError} `record.not_found` */
export function lineRow(db: Db, id: string): LineRow {
  const row = db.select().from(lines).where(eq(lines.id, id)).get();
  if (!row) throw new DomainError('record.not_found', 'This line is not known. Choose one from the list.');
  return row;
}

/** Lines by code, each with its living stock. */
export function listLines(db: Db, query: ListLines, now: number): Page<LineWithStock> {
  const matches = and(
    query.retired === 'all'
      ? undefined
      : query.retired === 'only'
        ? isNotNull(lines.retiredAt)
        : isNull(lines.retiredAt),
    query.search ? searched(query.search) : undefined,
  );
  const [from] = query.cursor ? readCursor(query.cursor, z.tuple([z.string()])) : [''];
  const rows = db
    .select()
    .from(lines)
    .where(and(matches, gt(lines.code, from)))
    .orderBy(asc(lines.code))
    .limit(query.limit + 1)
    .all();
  const total = db.select({ total: count() }).from(lines).where(matches).get()?.total ?? 0;
  const withStock = stockAdder(
    db,
    rows.map(({ id }) => id),
    now,
  );
  return pageFrom(rows, query.limit, total, { item: withStock, cursor: ({ code }) => [code] });
}

export function showLine(db: Db, id: string, now: number): LineWithStock {
  return stockAdder(db, [id], now)(lineRow(db, id));
}

/** The farm's stock at a glance. */
export function stockSummary(db: Db, now: number): StockSummary {
  const day = dayOf(now, farmOf(db).timeZone);
  const stock = batchStock(db, BATCH_LIVES, day);
  const later = new Map(batchStock(db, BATCH_LIVES, addDays(day, SOON_DAYS)).map((each) => [each.batch.id, each]));
  return {
    counts: addCounts(stock),
    grades: countGrades(stock),
    lines: new Set(stock.map(({ line }) => line.id)).size,
    batches: stock.length,
    saleableSoon: stock
      .filter(({ size }) => !isSaleable(size))
      .reduce((sum, { batch }) => sum + (later.get(batch.id)?.counts.saleable ?? 0), 0),
  };
}

function searched(search: string) {
  const pattern = likePattern(search);
  return or(
    sql`${lines.code} LIKE ${pattern} ESCAPE '\\'`,
    sql`${lines.tradeName} LIKE ${pattern} ESCAPE '\\'`,
    sql`${lines.taxon} LIKE ${pattern} ESCAPE '\\'`,
  );
}

function stockAdder(db: Db, ids: readonly string[], now: number): (row: LineRow) => LineWithStock {
  const day = dayOf(now, farmOf(db).timeZone);
  const some = sql`b.line_id IN (SELECT value FROM json_each(${JSON.stringify(ids)}))`;
  const stock = groupBy(batchStock(db, sql`${some} AND ${BATCH_LIVES}`, day), ({ line }) => line.id);
  const mothers = new Map(
    db
      .select({ lineId: colonies.lineId, total: count() })
      .from(colonies)
      .where(isNull(colonies.retiredAt))
      .groupBy(colonies.lineId)
      .all()
      .map(({ lineId, total }) => [lineId, total]),
  );
  return (row) => {
    const own: BatchStock[] = stock.get(row.id) ?? [];
    return { ...toLine(row), counts: addCounts(own), grades: countGrades(own), colonies: mothers.get(row.id) ?? 0 };
  };
}
