import { eq, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import type { Batch, ListBatches } from '../../shared/contracts/stock.ts';
import { dayOf, daysBetween, type Day } from '../../shared/domain/days.ts';
import { isSaleable } from '../../shared/domain/line-pace.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { batches, plugs, racks, stockAccounts } from '../db/schema/index.ts';
import { BATCH_LIVES, batchIn, batchStock, type BatchStock } from './batch-stock.ts';
import { toLineRef } from './colonies.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { farmOf } from './farm.ts';
import { likePattern } from './like-pattern.ts';

interface Candidate {
  id: string;
  code: string;
  cutOn: Day;
}

/** Batches, newest cut first. */
export function listBatches(db: Db, query: ListBatches, now: number): Page<Batch> {
  const today = dayOf(now, farmOf(db).timeZone);
  const matching = inState(db, candidates(db, query), query.state, today);
  const after = query.cursor ? readCursor(query.cursor, z.tuple([z.string(), z.string()])) : null;
  const rows = (after ? matching.filter((each) => isAfter(each, after)) : matching).slice(0, query.limit + 1);
  const ids = rows.map(({ id }) => id);
  const stock = new Map(batchStock(db, batchIn(ids), today).map((each) => [each.batch.id, toBatch(each, today)]));
  return pageFrom(rows, query.limit, matching.length, {
    item: ({ id }) => stock.get(id) ?? missing(),
    cursor: ({ cutOn, code }) => [cutOn, code],
  });
}

/** @throws {DomainError} `record.not_found` */
export function stockOfBatch(db: Db, id: string, day: Day): BatchStock {
  const [stock] = batchStock(db, sql`b.id = ${id}`, day);
  return stock ?? missing();
}

export function toBatch({ batch, line, cut, colonyCode, size, counts, available }: BatchStock, today: Day): Batch {
  return {
    id: batch.id,
    code: batch.code,
    line: toLineRef(line),
    cutId: cut.id,
    colonyId: cut.colonyId,
    colonyCode,
    cutOn: batch.cutOn,
    ageDays: daysBetween(batch.cutOn, today),
    pieces: batch.pieces,
    startMm: batch.startMm,
    size,
    counts,
    available,
    undoneAt: cut.undoneAt,
  };
}

/** Every plug of a batch with where it is: 'rack', 'bench', 'order' or how it left. @throws {DomainError} `record.not_found` */
export function listBatchPlugs(db: Db, batchId: string) {
  const rows = db
    .select({
      code: plugs.code,
      number: plugs.number,
      state: sql<string>`CASE WHEN ${stockAccounts.kind} IS NULL OR ${stockAccounts.kind} = 'cut' THEN 'bench' ELSE ${stockAccounts.kind} END`,
      rackCode: racks.code,
      position: plugs.position,
    })
    .from(plugs)
    .innerJoin(batches, eq(batches.id, plugs.batchId))
    .leftJoin(stockAccounts, eq(stockAccounts.id, plugs.accountId))
    .leftJoin(racks, eq(racks.id, stockAccounts.rackId))
    .where(eq(plugs.batchId, batchId))
    .orderBy(plugs.number)
    .all();
  // A batch has as many plugs as pieces, so never none.
  return rows.length > 0 ? rows : missing();
}

function candidates(db: Db, query: ListBatches): Candidate[] {
  const conditions: SQL[] = [
    ...(query.lineId ? [sql`b.line_id = ${query.lineId}`] : []),
    ...(query.colonyId ? [sql`c.colony_id = ${query.colonyId}`] : []),
    ...(query.systemId ? [standsIn(query.systemId)] : []),
    ...(query.search ? [sql`b.code LIKE ${likePattern(query.search)} ESCAPE '\\'`] : []),
    ...(query.state === 'all' ? [] : [sql`c.undone_at IS NULL`]),
    ...(query.state === 'all' ? [] : [query.state === 'finished' ? sql`NOT ${BATCH_LIVES}` : BATCH_LIVES]),
  ];
  const where = conditions.length > 0 ? sql`WHERE ${sql.join(conditions, sql` AND `)}` : sql``;
  return db.all<Candidate>(sql`
    SELECT b.id, b.code, b.cut_on AS cutOn FROM batch AS b JOIN cut AS c ON c.id = b.cut_id ${where}
    ORDER BY b.cut_on DESC, b.code DESC`);
}

function standsIn(systemId: string): SQL {
  return sql`EXISTS (SELECT 1 FROM stock_balance AS bal JOIN stock_account AS a ON a.id = bal.account_id
    JOIN rack AS r ON r.id = a.rack_id JOIN tank AS t ON t.id = r.tank_id
    WHERE bal.batch_id = b.id AND bal.pieces > 0 AND t.system_id = ${systemId})`;
}

/** Whether pieces are saleable follows from growth, which the database does not know. */
function inState(db: Db, found: Candidate[], state: ListBatches['state'], today: Day): Candidate[] {
  if (state !== 'saleable' && state !== 'growing' && state !== 'withheld') return found;
  const stock = batchStock(db, batchIn(found.map(({ id }) => id)), today);
  const wanted = new Set(stock.filter((each) => isInState(each, state)).map(({ batch }) => batch.id));
  return found.filter(({ id }) => wanted.has(id));
}

function isInState({ counts, size }: BatchStock, state: 'saleable' | 'growing' | 'withheld'): boolean {
  if (state === 'saleable') return counts.saleable > 0;
  return state === 'withheld' ? counts.withheld > 0 : !isSaleable(size);
}

/** In the list's order: newest cut first, then by code backwards. */
function isAfter({ cutOn, code }: Candidate, [lastDay, lastCode]: [string, string]): boolean {
  return cutOn < lastDay || (cutOn === lastDay && code < lastCode);
}

function missing(): never {
  throw new DomainError('record.not_found', 'This batch is not known. Choose one from the list.');
}
