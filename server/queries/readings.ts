import { and, asc, count, desc, eq, gte, lt, lte, or, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import type { ListReadings, Reading, ReadingFilter } from '../../shared/contracts/readings.ts';
import { addDays, startOfDay } from '../../shared/domain/days.ts';
import { testErrorOf } from '../../shared/domain/test-error.ts';
import { PARAMETER_CODES, type ParameterCode } from '../../shared/domain/units.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { calibrations, kitLots, readings, systems } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { farmOf } from './farm.ts';

export type ReadingRow = typeof readings.$inferSelect;

/** @throws {DomainError} `record.not_found` */
export function readingRow(db: Db, readingId: string): ReadingRow {
  const row = db.select().from(readings).where(eq(readings.id, readingId)).get();
  if (!row) throw new DomainError('record.not_found', 'This reading is gone. Someone took it back.');
  return row;
}

export function listReadings(db: Db, query: ListReadings): Page<Reading> {
  const wanted = filterOf(db, query);
  const rows = joined(db)
    .where(and(wanted, query.cursor ? olderThan(query.cursor) : undefined))
    .orderBy(desc(readings.takenAt), desc(readings.id))
    .limit(query.limit + 1)
    .all();
  const total = db.select({ total: count() }).from(readings).where(wanted).get()?.total ?? 0;
  return pageFrom(rows, query.limit, total, {
    item: toReading,
    cursor: ({ reading }) => [reading.takenAt, reading.id],
  });
}

/** All that match, oldest first, for an export. */
export function allReadings(db: Db, filter: ReadingFilter): Reading[] {
  return joined(db).where(filterOf(db, filter)).orderBy(asc(readings.takenAt), asc(readings.id)).all().map(toReading);
}

export function showReading(db: Db, readingId: string): Reading {
  const row = joined(db).where(eq(readings.id, readingId)).get();
  if (!row) throw new DomainError('record.not_found', 'This reading is gone. Someone took it back.');
  return toReading(row);
}

export function readingsBetween(
  db: Db,
  systemId: string,
  parameter: ParameterCode,
  from: number,
  to: number,
): { id: string; at: number; value: number; method: string }[] {
  return db
    .select({ id: readings.id, at: readings.takenAt, value: readings.value, method: readings.method })
    .from(readings)
    .where(
      and(
        eq(readings.systemId, systemId),
        eq(readings.parameter, parameter),
        gte(readings.takenAt, from),
        lte(readings.takenAt, to),
      ),
    )
    .orderBy(asc(readings.takenAt))
    .all();
}

/** The value before an instant, where it is not older than a while; null else. */
export function valueBefore(
  db: Db,
  systemId: string,
  parameter: ParameterCode,
  { before, notBefore }: { before: number; notBefore: number },
): number | null {
  const row = db
    .select({ value: readings.value })
    .from(readings)
    .where(
      and(
        eq(readings.systemId, systemId),
        eq(readings.parameter, parameter),
        lt(readings.takenAt, before),
        gte(readings.takenAt, notBefore),
      ),
    )
    .orderBy(desc(readings.takenAt))
    .limit(1)
    .get();
  return row?.value ?? null;
}

/** The newest reading of every parameter that was ever tested. */
export function latestReadings(db: Db, systemId: string): (ReadingRow & { parameter: ParameterCode })[] {
  return PARAMETER_CODES.flatMap((parameter) => {
    const row = db
      .select()
      .from(readings)
      .where(and(eq(readings.systemId, systemId), eq(readings.parameter, parameter)))
      .orderBy(desc(readings.takenAt))
      .limit(1)
      .get();
    return row ? [{ ...row, parameter }] : [];
  });
}

interface ReadingParts {
  reading: ReadingRow;
  systemCode: string;
  systemName: string;
  kitLotCode: string | null;
  bias: number | null;
  biasSd: number | null;
}

function joined(db: Db) {
  return db
    .select({
      ...{ reading: readings, systemCode: systems.code, systemName: systems.name },
      ...{ kitLotCode: kitLots.code, bias: calibrations.bias, biasSd: calibrations.biasSd },
    })
    .from(readings)
    .innerJoin(systems, eq(systems.id, readings.systemId))
    .leftJoin(kitLots, eq(kitLots.id, readings.kitLotId))
    .leftJoin(calibrations, eq(calibrations.id, readings.calibrationId))
    .$dynamic();
}

function toReading({ reading, systemCode, systemName, kitLotCode, bias, biasSd }: ReadingParts): Reading {
  const { id, systemId, value, method, methodId, kitLotId, note, photoId, takenAt, by, importId, version } = reading;
  const { calibrationId } = reading;
  const parameter = parameterOf(reading.parameter);
  return {
    ...{ id, systemId, systemCode, systemName, parameter, value, method, methodId, kitLotId, note, photoId, takenAt },
    ...{ by, importId, version, kitLotCode: kitLotCode ?? '', unit: reading.unit ?? '' },
    measured: reading.measured ?? value,
    sd: reading.sd ?? testErrorOf(parameter, method).sd,
    repeats: reading.repeats ?? [],
    correction: calibrationId === null ? null : { calibrationId, bias: bias ?? 0, biasSd: biasSd ?? 0 },
  };
}

/** The table only ever gets codes of the list; the column's type is plain text. */
function parameterOf(stored: string): ParameterCode {
  const code = PARAMETER_CODES.find((each) => each === stored);
  if (!code) throw new Error(`Reading of an unknown parameter ${stored}.`);
  return code;
}

function filterOf(db: Db, { systemId, parameter, methodId, by, from, to, importId }: ReadingFilter): SQL | undefined {
  const zone = from || to ? farmOf(db).timeZone : '';
  return and(
    systemId ? eq(readings.systemId, systemId) : undefined,
    parameter ? eq(readings.parameter, parameter) : undefined,
    methodId ? eq(readings.methodId, methodId) : undefined,
    by ? eq(readings.by, by) : undefined,
    from ? gte(readings.takenAt, startOfDay(from, zone)) : undefined,
    to ? lt(readings.takenAt, startOfDay(addDays(to, 1), zone)) : undefined,
    importId ? eq(readings.importId, importId) : undefined,
  );
}

function olderThan(cursor: string): SQL | undefined {
  const [takenAt, lastId] = readCursor(cursor, z.tuple([z.number(), z.string()]));
  return or(lt(readings.takenAt, takenAt), and(eq(readings.takenAt, takenAt), lt(readings.id, lastId)));
}
