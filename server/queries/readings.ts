import { and, asc, count, desc, eq, gte, lt, lte, or, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import type { ListReadings, Reading, ReadingFilter } from '../../shared/contracts/readings.ts';
import { PARAMETER_CODES, type ParameterCode } from '../../shared/domain/units.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { readings, systems } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';

export type ReadingRow = typeof readings.$inferSelect;

/** @throws {DomainError} `record.not_found` */
export function readingRow(db: Db, readingId: string): ReadingRow {
  const row = db.select().from(readings).where(eq(readings.id, readingId)).get();
  if (!row) throw new DomainError('record.not_found', 'This reading is gone. Someone took it back.');
  return row;
}

export function listReadings(db: Db, query: ListReadings): Page<Reading> {
  const wanted = filterOf(query);
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
  return joined(db).where(filterOf(filter)).orderBy(asc(readings.takenAt), asc(readings.id)).all().map(toReading);
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

interface ReadingWithSystem {
  reading: ReadingRow;
  systemCode: string;
  systemName: string;
}

function joined(db: Db) {
  return db
    .select({ reading: readings, systemCode: systems.code, systemName: systems.name })
    .from(readings)
    .innerJoin(systems, eq(systems.id, readings.systemId))
    .$dynamic();
}

function toReading({ reading, systemCode, systemName }: ReadingWithSystem): Reading {
  const { id, systemId, value, method, note, takenAt, by, importId, version } = reading;
  const parameter = parameterOf(reading.parameter);
  return { id, systemId, systemCode, systemName, parameter, value, method, note, takenAt, by, importId, version };
}

/** The table only ever gets codes of the list; the column's type is plain text. */
function parameterOf(stored: string): ParameterCode {
  const code = PARAMETER_CODES.find((each) => each === stored);
  if (!code) throw new Error(`Reading of an unknown parameter ${stored}.`);
  return code;
}

function filterOf({ systemId, parameter, importId }: ReadingFilter): SQL | undefined {
  return and(
    systemId ? eq(readings.systemId, systemId) : undefined,
    parameter ? eq(readings.parameter, parameter) : undefined,
    importId ? eq(readings.importId, importId) : undefined,
  );
}

function olderThan(cursor: string): SQL | undefined {
  const [takenAt, lastId] = readCursor(cursor, z.tuple([z.number(), z.string()]));
  return or(lt(readings.takenAt, takenAt), and(eq(readings.takenAt, takenAt), lt(readings.id, lastId)));
}
