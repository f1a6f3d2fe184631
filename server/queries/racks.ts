import { and, asc, eq, isNotNull, isNull, sql, type SQL } from 'drizzle-orm';
import type { z } from 'zod';
import type { Rack, RackPage, RackPlug, rackEndpoints } from '../../shared/contracts/stock.ts';
import { dayOf, daysBetween, type Day } from '../../shared/domain/days.ts';
import { isSaleable, outlook, paceOf } from '../../shared/domain/line-pace.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { batches, colonies, lines, plugs, racks, stockAccounts, systems, tanks } from '../db/schema/index.ts';
import { measuredSizes, sizeBasis } from './batch-size.ts';
import type { LineRow } from './batch-stock.ts';
import { toLineRef } from './colonies.ts';
import { farmOf } from './farm.ts';
import { rackPlace, rackPlaces, toRackRef, type RackPlace } from './places.ts';
import { measuredPlugSizes } from './plug-size.ts';
import { openWithholds, toReason } from './withholds.ts';

type ListRacks = z.output<(typeof rackEndpoints)['listRacks']['query']>;

const SOON_DAYS = 14;

export function listRacks(db: Db, { systemId, tankId, code, retired }: ListRacks): Rack[] {
  const counted = rackCounts(db);
  return rackPlaces(db)
    .where(
      and(
        systemId ? eq(systems.id, systemId) : undefined,
        tankId ? eq(tanks.id, tankId) : undefined,
        code ? eq(racks.code, code) : undefined,
        retired === 'all' ? undefined : retired === 'only' ? isNotNull(racks.retiredAt) : isNull(racks.retiredAt),
      ),
    )
    .all()
    .map((place) => toRack(place, counted));
}

/** @throws {DomainError} `record.not_found` */
export function showRack(db: Db, id: string): Rack {
  return toRack(rackPlace(db, id), rackCounts(db, id));
}

/** Tanks with their systems, for choosing where a rack stands. */
export function listTanks(db: Db) {
  return db
    .select({
      tankId: tanks.id,
      tankCode: tanks.code,
      tankName: tanks.name,
      systemId: systems.id,
      systemCode: systems.code,
      systemName: systems.name,
      systemKind: systems.kind,
      racks: sql<number>`(SELECT count(*) FROM rack AS r WHERE r.tank_id = ${tanks.id} AND r.retired_at IS NULL)`,
    })
    .from(tanks)
    .innerJoin(systems, eq(systems.id, tanks.systemId))
    .where(isNull(systems.retiredAt))
    .orderBy(asc(systems.code), asc(tanks.code))
    .all();
}

/** A rack with every plug on it, as its map draws them. */
export function rackPage(db: Db, id: string, now: number): RackPage {
  const place = rackPlace(db, id);
  const today = dayOf(now, farmOf(db).timeZone);
  const standing = plugsOnRack(db, id);
  const places = toRackPlugs(db, place, standing, today);
  // What is withheld or in quarantine is not for sale, however large.
  const sellable = places.filter(({ withheld }) => !withheld && place.system.kind !== 'quarantine');
  const readyWithin = (days: number) =>
    sellable.filter(({ daysToGrade }) => daysToGrade !== null && daysToGrade <= days).length;
  const saleable = readyWithin(0);
  return {
    ...showRack(db, id),
    places,
    lines: linesOn(standing),
    mothers: mothersOn(db, id),
    withholds: openWithholds(db, { rackId: id, systemId: place.system.id }).map(toReason),
    saleable,
    saleableIn14Days: readyWithin(SOON_DAYS) - saleable,
  };
}

interface Standing {
  plug: typeof plugs.$inferSelect;
  batch: typeof batches.$inferSelect;
  line: LineRow;
  withheld: number;
}

function plugsOnRack(db: Db, rackId: string): Standing[] {
  return db
    .select({
      plug: plugs,
      batch: batches,
      line: lines,
      withheld: sql<number>`EXISTS (SELECT 1 FROM withhold AS w WHERE w.ended_at IS NULL
        AND (w.plug_code = ${plugs.code} OR w.batch_id = ${batches.id}))`,
    })
    .from(stockAccounts)
    .innerJoin(plugs, eq(plugs.accountId, stockAccounts.id))
    .innerJoin(batches, eq(batches.id, plugs.batchId))
    .innerJoin(lines, eq(lines.id, batches.lineId))
    .where(eq(stockAccounts.rackId, rackId))
    .orderBy(asc(plugs.position), asc(plugs.code))
    .all();
}

function toRackPlugs(db: Db, place: RackPlace, standing: readonly Standing[], today: Day): RackPlug[] {
  const { timeZone } = farmOf(db);
  const ofBatch = measuredSizes(db, [...new Set(standing.map(({ batch }) => batch.id))]);
  const ofPlug = measuredPlugSizes(
    db,
    standing.map(({ plug }) => plug.code),
  );
  const wholeRack = openWithholds(db, { rackId: place.rack.id, systemId: place.system.id }).length > 0;
  return standing.map(({ plug, batch, line, withheld }) => {
    const measured = ofPlug.get(plug.code) ?? ofBatch.get(batch.id);
    const size = outlook(sizeBasis(batch, line, measured, timeZone), paceOf(line).healDays, today);
    const days = size.saleableOn === null ? null : Math.max(0, daysBetween(today, size.saleableOn));
    return {
      code: plug.code,
      position: plug.position,
      batchId: batch.id,
      batchCode: batch.code,
      lineId: line.id,
      lineCode: line.code,
      number: plug.number,
      cutOn: batch.cutOn,
      sizeMm: size.mm,
      grade: size.grade,
      daysToGrade: isSaleable(size) ? 0 : days,
      withheld: wholeRack || withheld === 1,
    };
  });
}

function linesOn(standing: readonly Standing[]): RackPage['lines'] {
  return [...groupBy(standing, ({ line }) => line.id).values()]
    .map((group) => {
      const [first] = group;
      if (!first) throw new DomainError('server.failed', 'A group of plugs is empty.');
      const oldestCutOn = group.reduce((day, { batch }) => (batch.cutOn < day ? batch.cutOn : day), first.batch.cutOn);
      return { ...toLineRef(first.line), plugs: group.length, oldestCutOn };
    })
    .sort((a, b) => b.plugs - a.plugs || a.code.localeCompare(b.code));
}

function mothersOn(db: Db, rackId: string): RackPage['mothers'] {
  return db
    .select({ id: colonies.id, code: colonies.code, lineCode: lines.code })
    .from(colonies)
    .innerJoin(lines, eq(lines.id, colonies.lineId))
    .where(and(eq(colonies.rackId, rackId), isNull(colonies.retiredAt)))
    .orderBy(asc(colonies.code))
    .all();
}

interface RackCount {
  plugs: number;
  colonies: number;
}

function rackCounts(db: Db, id?: string): Map<string, RackCount> {
  const one: SQL = id === undefined ? sql`` : sql`WHERE r.id = ${id}`;
  const rows = db.all<RackCount & { id: string }>(sql`
    SELECT r.id,
      coalesce((SELECT sum(bal.pieces) FROM stock_account AS a JOIN stock_balance AS bal ON bal.account_id = a.id
        WHERE a.rack_id = r.id), 0) AS plugs,
      (SELECT count(*) FROM colony AS c WHERE c.rack_id = r.id AND c.retired_at IS NULL) AS colonies
    FROM rack AS r ${one}`);
  return new Map(rows.map(({ id: rackId, ...counts }) => [rackId, counts]));
}

function toRack(place: RackPlace, counted: ReadonlyMap<string, RackCount>): Rack {
  const { rows, columns, createdAt, retiredAt, version } = place.rack;
  const { plugs: plugCount = 0, colonies: colonyCount = 0 } = counted.get(place.rack.id) ?? {};
  return { ...toRackRef(place), rows, columns, plugs: plugCount, colonies: colonyCount, createdAt, retiredAt, version };
}
