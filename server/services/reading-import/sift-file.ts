import { and, eq, sql } from 'drizzle-orm';
import type { ImportMapping, ImportProblem } from '../../../shared/contracts/reading-imports.ts';
import { DomainError } from '../../../shared/errors.ts';
import type { Db } from '../../db/client.ts';
import { readings, systems } from '../../db/schema/index.ts';
import { farmOf } from '../../queries/farm.ts';
import { assertTimeZone } from '../farm-checks.ts';
import type { CsvTable } from './csv-table.ts';
import { type ImportContext, type ImportRow, type ImportValue, readRow } from './read-rows.ts';
import { ZoneClock } from './zone-clock.ts';

const CLOCK_SLACK_MS = 5 * 60_000;
/** Rows that are looked at without a pause: some 10 ms of work. */
const PIECE_ROWS = 500;

/** What a stretch of rows brings. */
export interface SiftedPiece {
  /** Rows looked at so far. */
  rowsDone: number;
  fresh: ImportValue[];
  /** Values that are stored already or stand twice in the file. */
  duplicates: number;
  badRows: number;
  problems: ImportProblem[];
  twiceTimes: number;
}

/**
 * Goes through a file piece by piece and sorts out what is stored already. Where another value is stored for the same
 * time, the row is refused.
 *
 * @throws {DomainError} `input.invalid` where the mapping is none for this file
 */
export function* siftFile(db: Db, table: CsvTable, mapping: ImportMapping, now: number): Generator<SiftedPiece> {
  assertMapping(table, mapping);
  const context = contextOf(db, mapping, now);
  const known = knownValues(db);
  for (let start = 0; start < table.rows.length; start += PIECE_ROWS) {
    const rows = table.rows.slice(start, start + PIECE_ROWS).map((row) => readRow(table.heads, row, context));
    yield { ...siftRows(rows, known), rowsDone: Math.min(table.rows.length, start + PIECE_ROWS) };
  }
}

function siftRows(rows: readonly ImportRow[], known: KnownValues): Omit<SiftedPiece, 'rowsDone'> {
  const fresh: ImportValue[] = [];
  const problems: ImportProblem[] = [];
  const counts = { duplicates: 0, badRows: 0, twiceTimes: 0 };
  for (const row of rows) {
    const places = row.values.map((value) => ({ value, stored: known.of(value) }));
    const wrong = [...row.problems, ...places.flatMap(({ value, stored }) => conflictOf(value, stored))];
    if (wrong.length > 0) {
      counts.badRows += 1;
      problems.push(...wrong);
      continue;
    }
    if (row.isTwice) counts.twiceTimes += 1;
    for (const { value, stored } of places) {
      if (stored === undefined) fresh.push(value);
      else counts.duplicates += 1;
      known.keep(value);
    }
  }
  return { fresh, problems, ...counts };
}

function conflictOf(value: ImportValue, stored: number | undefined): ImportProblem[] {
  if (stored === undefined || Math.abs(stored - value.value) <= 1e-6 * Math.abs(stored)) return [];
  const message = `Another value of ${value.parameter} is there already for this time.`;
  return [{ line: value.line, column: value.parameter, message }];
}

type Place = Pick<ImportValue, 'systemId' | 'parameter' | 'takenAt'>;
interface KnownValues {
  /** What was measured there already, in the database or earlier in the file. */
  of(place: Place): number | undefined;
  keep(value: ImportValue): void;
}

function knownValues(db: Db): KnownValues {
  const inFile = new Map<string, number>();
  const stored = db
    .select({ value: sql<number>`coalesce(${readings.measured}, ${readings.value})` })
    .from(readings)
    .where(
      and(
        eq(readings.systemId, sql.placeholder('systemId')),
        eq(readings.parameter, sql.placeholder('parameter')),
        eq(readings.takenAt, sql.placeholder('takenAt')),
      ),
    )
    .prepare();
  return {
    of: (place) => inFile.get(keyOf(place)) ?? stored.get({ ...place })?.value,
    keep: (value) => {
      inFile.set(keyOf(value), value.value);
    },
  };
}

function keyOf({ systemId, parameter, takenAt }: Place): string {
  return `${systemId} ${parameter} ${takenAt}`;
}

function contextOf(db: Db, mapping: ImportMapping, now: number): ImportContext {
  const all = db.select({ id: systems.id, code: systems.code, name: systems.name }).from(systems).all();
  const byName = new Map(
    all.flatMap((system) => [system.name, system.code].map((name) => [name.toLowerCase(), system] as const)),
  );
  const byId = new Map(all.map((system) => [system.id, system]));
  return {
    mapping,
    clock: new ZoneClock(mapping.timeZone || farmOf(db).timeZone),
    latest: now + CLOCK_SLACK_MS,
    systemByName: (name) => byName.get(name.toLowerCase()),
    systemById: (id) => byId.get(id),
  };
}

/** @throws {DomainError} `input.invalid` where a mapping belongs to another file, names one meaning twice, or half a one */
export function assertMapping({ heads }: CsvTable, { columns, timeZone }: ImportMapping): void {
  if (timeZone !== '') assertTimeZone(timeZone);
  const roles = columns.map(({ role }) => role).filter((role) => role !== 'ignore');
  const message =
    columns.length !== heads.length
      ? 'The file has other columns than before. Choose it again.'
      : new Set(roles).size < roles.length
        ? 'Two columns have the same meaning. Choose another for one of them.'
        : roles.includes('value') && !roles.includes('parameter')
          ? 'A column of values needs a column that names their parameter.'
          : null;
  if (message) throw new DomainError('input.invalid', message, { fields: [{ path: 'mapping', message }] });
}
