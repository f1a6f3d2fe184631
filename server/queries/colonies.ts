import { and, asc, count, desc, eq, isNull, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import type { Colony, CuttingChoice, ListColonies } from '../../shared/contracts/stock.ts';
import { dayOf, MS_PER_DAY, type Day } from '../../shared/domain/days.ts';
import { isRested, nextCutFrom } from '../../shared/domain/line-pace.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { colonies, cuts, lines, racks, systems, tanks } from '../db/schema/index.ts';
import { addCounts, BATCH_LIVES, batchStock, type LineRow } from './batch-stock.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { farmOf } from './farm.ts';
import { likePattern } from './like-pattern.ts';
import { toRackRef, type RackPlace } from './places.ts';

/** How far back "taken by stores" looks. */
const TAKEN_DAYS = 28;

interface ColonyPlace extends RackPlace {
  colony: typeof colonies.$inferSelect;
  line: LineRow;
  cuts: number;
}

/** What a contract shows of a line beside something else. */
export function toLineRef({ id, code, tradeName, taxon, growthForm }: LineRow) {
  return { id, code, tradeName, taxon, growthForm };
}

/** Mothers by code. */
export function listColonies(db: Db, query: ListColonies, now: number): Page<Colony> {
  const matches = and(
    query.lineId ? eq(colonies.lineId, query.lineId) : undefined,
    query.rackId ? eq(colonies.rackId, query.rackId) : undefined,
    query.retired === 'all'
      ? undefined
      : sql`(${colonies.retiredAt} IS NOT NULL) = ${query.retired === 'only' ? 1 : 0}`,
    query.search
      ? sql`(${colonies.code} LIKE ${likePattern(query.search)} ESCAPE '\\' OR ${lines.tradeName} LIKE ${likePattern(query.search)} ESCAPE '\\')`
      : undefined,
  );
  const after = query.cursor ? readCursor(query.cursor, z.tuple([z.string()])) : null;
  const rows = colonyPlaces(db, and(matches, after ? sql`${colonies.code} > ${after[0]}` : undefined))
    .limit(query.limit + 1)
    .all();
  const total =
    db.select({ total: count() }).from(colonies).innerJoin(lines, eq(lines.id, colonies.lineId)).where(matches).get()
      ?.total ?? 0;
  const today = dayOf(now, farmOf(db).timeZone);
  return pageFrom(rows, query.limit, total, {
    item: (row) => toColony(row, today),
    cursor: ({ colony }) => [colony.code],
  });
}

/** @throws {DomainError} `record.not_found` */
export function showColony(db: Db, id: string, now: number): Colony {
  const row = colonyPlaces(db, eq(colonies.id, id)).get();
  if (!row) throw new DomainError('record.not_found', 'This mother is not known. Choose one from the list.');
  return toColony(row, dayOf(now, farmOf(db).timeZone));
}

/** Mothers in use, those that are rested and whose line is wanted most first. */
export function cuttingChoices(db: Db, now: number): CuttingChoice[] {
  const today = dayOf(now, farmOf(db).timeZone);
  const stock = groupBy(batchStock(db, BATCH_LIVES, today), ({ line }) => line.id);
  const taken = takenByLine(db, now - TAKEN_DAYS * MS_PER_DAY);
  return colonyPlaces(db, isNull(colonies.retiredAt))
    .all()
    .map((row) => {
      const { alive, saleable, held } = addCounts(stock.get(row.line.id) ?? []);
      const takenIn28Days = taken.get(row.line.id) ?? 0;
      const demand = held + takenIn28Days;
      return {
        colony: toColony(row, today),
        lineAlive: alive,
        lineSaleable: saleable,
        lineHeld: held,
        takenIn28Days,
        want: alive + demand === 0 ? null : demand / Math.max(1, alive),
      };
    })
    .sort(byRestAndWant);
}

function byRestAndWant(a: CuttingChoice, b: CuttingChoice): number {
  return (
    Number(mayCut(b)) - Number(mayCut(a)) ||
    (b.want ?? 0) - (a.want ?? 0) ||
    a.lineAlive - b.lineAlive ||
    (a.colony.nextCutFrom ?? '').localeCompare(b.colony.nextCutFrom ?? '')
  );
}

function mayCut({ colony }: CuttingChoice): boolean {
  return colony.rested && colony.health !== 'poor';
}

function takenByLine(db: Db, since: number): Map<string, number> {
  const rows = db.all<{ lineId: string; pieces: number }>(sql`
    SELECT b.line_id AS lineId, sum(m.pieces) AS pieces
    FROM stock_movement AS m JOIN batch AS b ON b.id = m.batch_id
    WHERE m.at > ${since} AND m.kind = 'pick'
      AND NOT EXISTS (SELECT 1 FROM stock_movement AS undo WHERE undo.reverses_id = m.id)
    GROUP BY b.line_id`);
  return new Map(rows.map(({ lineId, pieces }) => [lineId, pieces]));
}

function colonyPlaces(db: Db, matches: SQL | undefined) {
  return db
    .select({
      colony: colonies,
      line: lines,
      rack: racks,
      tank: tanks,
      system: systems,
      cuts: sql<number>`(SELECT count(*) FROM ${cuts} WHERE ${cuts.colonyId} = ${colonies.id} AND ${cuts.undoneAt} IS NULL)`,
    })
    .from(colonies)
    .innerJoin(lines, eq(lines.id, colonies.lineId))
    .innerJoin(racks, eq(racks.id, colonies.rackId))
    .innerJoin(tanks, eq(tanks.id, racks.tankId))
    .innerJoin(systems, eq(systems.id, tanks.systemId))
    .where(matches)
    .orderBy(asc(colonies.code), desc(colonies.createdAt));
}

function toColony({ colony, line, cuts: cutCount, ...place }: ColonyPlace, today: Day): Colony {
  return {
    id: colony.id,
    code: colony.code,
    sizeMm: colony.sizeMm,
    health: colony.health,
    restDays: colony.restDays,
    lastCutOn: colony.lastCutOn,
    acquiredOn: colony.acquiredOn,
    acquiredFrom: colony.acquiredFrom,
    createdAt: colony.createdAt,
    retiredAt: colony.retiredAt,
    version: colony.version,
    line: toLineRef(line),
    rack: toRackRef(place),
    nextCutFrom: nextCutFrom(colony.lastCutOn, colony.restDays),
    rested: isRested(colony.lastCutOn, colony.restDays, today),
    cuts: cutCount,
  };
}
