import { and, count, desc, eq, sql } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import type { Cut, cutEndpoints } from '../../shared/contracts/stock.ts';
import { dayOf } from '../../shared/domain/days.ts';
import type { Db } from '../db/client.ts';
import { batches, colonies, cuts, lines } from '../db/schema/index.ts';
import { batchIn, batchStock } from './batch-stock.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { farmOf } from './farm.ts';

type ListCuts = z.output<(typeof cutEndpoints)['listCuts']['query']>;

/** Cuts, newest first, those taken back among them. */
export function listCuts(db: Db, query: ListCuts, now: number): Page<Cut> {
  const matches = and(
    query.colonyId ? eq(cuts.colonyId, query.colonyId) : undefined,
    query.lineId ? eq(batches.lineId, query.lineId) : undefined,
  );
  const after = query.cursor ? readCursor(query.cursor, z.tuple([z.string(), z.string()])) : null;
  const rows = db
    .select({ cut: cuts, batch: batches, colonyCode: colonies.code, lineCode: lines.code })
    .from(cuts)
    .innerJoin(batches, eq(batches.cutId, cuts.id))
    .innerJoin(colonies, eq(colonies.id, cuts.colonyId))
    .innerJoin(lines, eq(lines.id, batches.lineId))
    .where(and(matches, after ? sql`(${cuts.cutOn}, ${batches.code}) < (${after[0]}, ${after[1]})` : undefined))
    .orderBy(desc(cuts.cutOn), desc(batches.code))
    .limit(query.limit + 1)
    .all();
  const total =
    db.select({ total: count() }).from(cuts).innerJoin(batches, eq(batches.cutId, cuts.id)).where(matches).get()
      ?.total ?? 0;
  const today = dayOf(now, farmOf(db).timeZone);
  const stock = new Map(
    batchStock(db, batchIn(rows.map(({ batch }) => batch.id)), today).map((each) => [each.batch.id, each.counts.alive]),
  );
  return pageFrom(rows, query.limit, total, {
    item: ({ cut, batch, colonyCode, lineCode }) => ({
      id: cut.id,
      colonyId: cut.colonyId,
      colonyCode,
      lineCode,
      cutOn: cut.cutOn,
      pieces: cut.pieces,
      failedPieces: cut.failedPieces,
      minutes: cut.minutes,
      tool: cut.tool,
      by: cut.by,
      note: cut.note,
      batchId: batch.id,
      batchCode: batch.code,
      alive: stock.get(batch.id) ?? 0,
      undoneAt: cut.undoneAt,
    }),
    cursor: ({ cut, batch }) => [cut.cutOn, batch.code],
  });
}
