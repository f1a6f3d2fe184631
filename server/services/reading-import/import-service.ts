import { eq, sql } from 'drizzle-orm';
import type { ImportMapping, ImportPreview, ReadingImport } from '../../../shared/contracts/reading-imports.ts';
import { DomainError } from '../../../shared/errors.ts';
import type { Db } from '../../db/client.ts';
import { readingImports, readings, systems } from '../../db/schema/index.ts';
import type { Write } from '../../db/write.ts';
import { farmOf } from '../../queries/farm.ts';
import { type CsvTable, readCsvTable } from './csv-table.ts';
import { guessMapping } from './guess-mapping.ts';
import { leaveOutKnown, type Sifted } from './leave-out-known.ts';
import { type ImportValue, readRows } from './read-rows.ts';

interface ImportFile {
  fileName: string;
  content: Buffer;
}

const SAMPLE_ROWS = 5;
const FIRST_VALUES = 20;
const PROBLEMS_SHOWN = 100;
const CLOCK_SLACK_MS = 5 * 60_000;

/** What an import would do, and nothing of it: the file comes again with the commit. */
export function previewImport(
  db: Db,
  file: ImportFile,
  { mapping, systemId, now }: { mapping?: ImportMapping | undefined; systemId?: string | undefined; now: number },
): ImportPreview {
  const table = readCsvTable(file.content);
  const used = mapping ?? guessMapping(table, systemId ?? null);
  const sifted = sift(db, table, used, now);
  return {
    ...{ fileName: file.fileName, heads: table.heads, mapping: used, rows: table.rows.length },
    sample: table.rows.slice(0, SAMPLE_ROWS).map(({ cells }) => cells),
    ...{ readings: sifted.fresh.length, duplicates: sifted.duplicates, badRows: sifted.badRows },
    problems: sifted.problems.slice(0, PROBLEMS_SHOWN),
    first: sifted.fresh.slice(0, FIRST_VALUES),
  };
}

/** Stores all good rows of a file as one import. */
export function commitImport(write: Write, file: ImportFile, mapping: ImportMapping): ReadingImport {
  const { fresh } = sift(write.tx, readCsvTable(file.content), mapping, write.now);
  if (fresh.length === 0) {
    throw new DomainError('rule.refused', 'This file brings no new reading. Look at the preview for the reasons.');
  }
  const row = write.tx
    .insert(readingImports)
    .values({
      ...{ id: write.newId(), fileName: file.fileName.slice(0, 200), readings: fresh.length },
      ...{ at: write.now, by: write.actor.name },
    })
    .returning()
    .get();
  storeValues(write, row.id, fresh);
  write.audit({ action: 'reading_import.committed', entity: 'reading_import', entityId: row.id, after: row });
  return row;
}

/** Takes a whole import back: every reading that it brought and that is still there. */
export function undoImport(write: Write, importId: string): void {
  const before = write.tx.select().from(readingImports).where(eq(readingImports.id, importId)).get();
  if (!before) throw new DomainError('record.not_found', 'This import is gone. Someone took it back.');
  write.tx.delete(readings).where(eq(readings.importId, importId)).run();
  write.tx.delete(readingImports).where(eq(readingImports.id, importId)).run();
  write.audit({ action: 'reading_import.undone', entity: 'reading_import', entityId: importId, before });
}

function sift(db: Db, table: CsvTable, mapping: ImportMapping, now: number): Sifted {
  assertMapping(table, mapping);
  const all = db.select({ id: systems.id, code: systems.code, name: systems.name }).from(systems).all();
  const byName = new Map(
    all.flatMap((system) => [system.name, system.code].map((name) => [name.toLowerCase(), system] as const)),
  );
  const rows = readRows(table, {
    mapping,
    timeZone: farmOf(db).timeZone,
    latest: now + CLOCK_SLACK_MS,
    systemByName: (name) => byName.get(name.toLowerCase()),
    systemById: (id) => all.find((system) => system.id === id),
  });
  return leaveOutKnown(db, rows);
}

/** One statement, prepared once: an import can bring hundreds of thousands of values. */
function storeValues(write: Write, importId: string, values: readonly ImportValue[]): void {
  const given = (name: keyof ImportValue | 'id') => sql.placeholder(name);
  const insert = write.tx
    .insert(readings)
    .values({
      ...{ id: given('id'), systemId: given('systemId'), parameter: given('parameter'), value: given('value') },
      ...{ method: given('method'), note: given('note'), takenAt: given('takenAt') },
      ...{ importId, by: write.actor.name, createdAt: write.now },
    })
    .prepare();
  for (const value of values) insert.run({ id: write.newId(), ...value });
}

/** @throws {DomainError} `input.invalid` where a mapping belongs to another file, or names one meaning twice */
function assertMapping({ heads }: CsvTable, { columns }: ImportMapping): void {
  const roles = columns.map(({ role }) => role).filter((role) => role !== 'ignore');
  const message =
    columns.length !== heads.length
      ? 'The file has other columns than before. Choose it again.'
      : new Set(roles).size < roles.length
        ? 'Two columns have the same meaning. Choose another for one of them.'
        : null;
  if (message) throw new DomainError('input.invalid', message, { fields: [{ path: 'mapping', message }] });
}
