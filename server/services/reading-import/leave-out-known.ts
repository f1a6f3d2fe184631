import { and, gte, inArray, lte } from 'drizzle-orm';
import type { ImportProblem } from '../../../shared/contracts/reading-imports.ts';
import type { Db } from '../../db/client.ts';
import { readings } from '../../db/schema/index.ts';
import type { ImportRow, ImportValue } from './read-rows.ts';

export interface Sifted {
  fresh: ImportValue[];
  /** Values that are stored already or stand twice in the file. */
  duplicates: number;
  badRows: number;
  problems: ImportProblem[];
}

/** Sorts out what is stored already. Where another value is stored for the same time, the row is refused. */
export function leaveOutKnown(db: Db, rows: readonly ImportRow[]): Sifted {
  const known = storedValues(db, rows);
  const sifted: Sifted = { fresh: [], duplicates: 0, badRows: 0, problems: [] };
  for (const row of rows) {
    const problems = [...row.problems, ...row.values.flatMap((value) => conflictOf(known, value))];
    if (problems.length > 0) {
      sifted.badRows += 1;
      sifted.problems.push(...problems);
      continue;
    }
    for (const value of row.values) {
      if (known.has(keyOf(value))) sifted.duplicates += 1;
      else sifted.fresh.push(value);
      known.set(keyOf(value), value.value);
    }
  }
  return sifted;
}

function conflictOf(known: ReadonlyMap<string, number>, value: ImportValue): ImportProblem[] {
  const stored = known.get(keyOf(value));
  if (stored === undefined || Math.abs(stored - value.value) <= 1e-6 * Math.abs(stored)) return [];
  const message = `Another value of ${value.parameter} is there already for this time.`;
  return [{ line: value.line, column: value.parameter, message }];
}

function storedValues(db: Db, rows: readonly ImportRow[]): Map<string, number> {
  const known = new Map<string, number>();
  const values = rows.flatMap((row) => row.values);
  const systemIds = [...new Set(values.map(({ systemId }) => systemId))];
  if (systemIds.length === 0) return known;
  const [from, to] = rangeOf(values);
  const stored = db
    .select()
    .from(readings)
    .where(and(inArray(readings.systemId, systemIds), gte(readings.takenAt, from), lte(readings.takenAt, to)))
    .all();
  for (const row of stored) known.set(keyOf(row), row.value);
  return known;
}

function rangeOf(values: readonly ImportValue[]): [number, number] {
  return values.reduce<[number, number]>(
    ([from, to], { takenAt }) => [Math.min(from, takenAt), Math.max(to, takenAt)],
    [Infinity, -Infinity],
  );
}

function keyOf({ systemId, parameter, takenAt }: { systemId: string; parameter: string; takenAt: number }): string {
  return `${systemId} ${parameter} ${takenAt}`;
}
