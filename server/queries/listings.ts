import { and, asc, count, eq, or, sql } from 'drizzle-orm';
import { z } from 'zod';
import type { ListQuery, Page } from '../../shared/contracts/common.ts';
import type { Listing } from '../../shared/contracts/listings.ts';
import type { Day } from '../../shared/domain/days.ts';
import { gradeByCode, type GradeCode } from '../../shared/domain/growth.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { lines, listings } from '../db/schema/index.ts';
import { availableByBatch, type AvailableBatch } from './availability.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { likePattern } from './like-pattern.ts';

export type ListingRow = typeof listings.$inferSelect;
export type LineRow = typeof lines.$inferSelect;

/** What there is of one line in one grade, over all of its batches. */
export interface GradeStock {
  saleable: number;
  held: number;
  free: number;
  batches: AvailableBatch[];
}

const EMPTY: GradeStock = { saleable: 0, held: 0, free: 0, batches: [] };

/** @throws {DomainError} `record.not_found` */
export function listingRow(db: Db, id: string): { listing: ListingRow; line: LineRow } {
  const row = withLines(db).where(eq(listings.id, id)).get();
  if (!row) throw new DomainError('record.not_found', 'This offer is not known.');
  return row;
}

/** Offers that stores can see, by line and grade. */
export function activeListings(db: Db): { listing: ListingRow; line: LineRow }[] {
  return withLines(db).where(eq(listings.active, true)).orderBy(asc(lines.code), asc(listings.id)).all();
}

/** Stock by line and grade on a day. The returned look-up gives zeros for what there is none of. */
export function stockByGrade(db: Db, day: Day, lineId?: string): (lineId: string, grade: string) => GradeStock {
  const stock = new Map<string, GradeStock>();
  for (const batch of availableByBatch(db, { day, ...(lineId === undefined ? {} : { lineId }) })) {
    const key = `${batch.lineId} ${batch.grade}`;
    const { saleable, held, free, batches } = stock.get(key) ?? EMPTY;
    stock.set(key, {
      saleable: saleable + batch.saleable,
      held: held + batch.held,
      free: free + batch.available,
      batches: [...batches, batch],
    });
  }
  return (line, grade) => stock.get(`${line} ${grade}`) ?? EMPTY;
}

/** Offers by line, the switched-off ones too. `search` looks into code and trade name. */
export function listListings(db: Db, { cursor, limit, search }: ListQuery, day: Day): Page<Listing> {
  const pattern = search ? likePattern(search) : null;
  const matches = pattern
    ? or(sql`${lines.code} LIKE ${pattern} ESCAPE '\\'`, sql`${lines.tradeName} LIKE ${pattern} ESCAPE '\\'`)
    : undefined;
  const [code, id] = cursor ? readCursor(cursor, z.tuple([z.string(), z.string()])) : [null, ''];
  const after = code === null ? undefined : sql`(${lines.code}, ${listings.id}) > (${code}, ${id})`;
  const rows = withLines(db)
    .where(and(matches, after))
    .orderBy(asc(lines.code), asc(listings.id))
    .limit(limit + 1)
    .all();
  const total =
    db.select({ all: count() }).from(listings).innerJoin(lines, eq(lines.id, listings.lineId)).where(matches).get()
      ?.all ?? 0;
  const stockOf = stockByGrade(db, day);
  return pageFrom(rows, limit, total, {
    item: (row) => toListing(row, stockOf(row.line.id, row.listing.grade)),
    cursor: ({ line, listing }) => [line.code, listing.id],
  });
}

export function showListing(db: Db, id: string, day: Day): Listing {
  const row = listingRow(db, id);
  return toListing(row, stockByGrade(db, day, row.line.id)(row.line.id, row.listing.grade));
}

/** Grades are stored as text; only codes of the list are ever written. */
export function gradeCode(text: string): GradeCode {
  return gradeByCode(text as GradeCode).code;
}

function toListing({ listing, line }: { listing: ListingRow; line: LineRow }, stock: GradeStock): Listing {
  return {
    id: listing.id,
    lineId: line.id,
    lineCode: line.code,
    tradeName: line.tradeName,
    taxon: line.taxon,
    grade: gradeCode(listing.grade),
    priceMinor: listing.priceMinor,
    active: listing.active,
    saleable: stock.saleable,
    held: stock.held,
    free: stock.free,
    version: listing.version,
  };
}

function withLines(db: Db) {
  return db.select({ listing: listings, line: lines }).from(listings).innerJoin(lines, eq(lines.id, listings.lineId));
}
