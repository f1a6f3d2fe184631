import { eq } from 'drizzle-orm';
import { z } from 'zod';
import { ImportMapping, type ImportPreview, type ReadingImport } from '../../../shared/contracts/reading-imports.ts';
import { ROLES } from '../../../shared/permissions.ts';
import { DomainError } from '../../../shared/errors.ts';
import type { Db } from '../../db/client.ts';
import { readingImportFiles, readingImports, readings } from '../../db/schema/index.ts';
import type { Write } from '../../db/write.ts';
import { readingImport } from '../../queries/reading-imports.ts';
import { breathe } from './breathe.ts';
import { type CsvTable, readCsvTable, readCsvTableInPieces } from './csv-table.ts';
import { guessMapping } from './guess-mapping.ts';
import { assertMapping, type SiftedPiece, siftFile } from './sift-file.ts';
import { storeValues } from './store-values.ts';

interface ImportFile {
  fileName: string;
  content: Buffer;
}

/** What an import that goes on after its answer has to keep. */
export const ImportOrder = z.object({
  mapping: ImportMapping,
  actor: z.object({
    userId: z.string().nullable(),
    name: z.string(),
    role: z.enum([...ROLES, 'system']),
    storeId: z.string().nullable(),
  }),
});

const SAMPLE_ROWS = 5;
const FIRST_VALUES = 20;
const PROBLEMS_SHOWN = 100;
/** A file up to here is imported within the answer: less than half a second's work. */
const AT_ONCE_BYTES = 100_000;

/** What an import would do, and nothing of it: the file comes again with the commit. */
export async function previewImport(
  db: Db,
  file: ImportFile,
  { mapping, systemId, now }: { mapping?: ImportMapping | undefined; systemId?: string | undefined; now: number },
): Promise<ImportPreview> {
  const table = await readCsvTableInPieces(file.content);
  const used = mapping ?? guessMapping(table, systemId ?? null);
  const preview: ImportPreview = {
    ...{ fileName: file.fileName, heads: table.heads, mapping: used, rows: table.rows.length },
    sample: table.rows.slice(0, SAMPLE_ROWS).map(({ cells }) => cells),
    ...{ readings: 0, duplicates: 0, badRows: 0, twiceTimes: 0, problems: [], first: [] },
  };
  for await (const piece of inPieces(siftFile(db, table, used, now))) {
    preview.readings += piece.fresh.length;
    preview.duplicates += piece.duplicates;
    preview.badRows += piece.badRows;
    preview.twiceTimes += piece.twiceTimes;
    preview.problems.push(...piece.problems.slice(0, PROBLEMS_SHOWN - preview.problems.length));
    preview.first.push(...piece.fresh.slice(0, FIRST_VALUES - preview.first.length));
  }
  return preview;
}

/** A row that would be left out, with all that is wrong with it. */
export interface BadRow {
  line: number;
  reasons: string;
  cells: string[];
}

/** Every row that would be left out, to be mended and sent again. */
export async function badRowsOf(
  db: Db,
  file: ImportFile,
  { mapping, now }: { mapping: ImportMapping; now: number },
): Promise<{ heads: string[]; rows: BadRow[] }> {
  const table = await readCsvTableInPieces(file.content);
  const reasons = new Map<number, string[]>();
  for await (const { problems } of inPieces(siftFile(db, table, mapping, now))) {
    for (const { line, column, message } of problems) {
      reasons.set(line, [...(reasons.get(line) ?? []), column === '' ? message : `${column}: ${message}`]);
    }
  }
  const rows = table.rows.flatMap(({ line, cells }) => {
    const found = reasons.get(line);
    return found ? [{ line, reasons: found.join(' '), cells }] : [];
  });
  return { heads: table.heads, rows };
}

/**
 * Imports the good rows of a file: a small one at once, a large one by a job that goes on after the answer.
 * @throws {DomainError} `input.invalid`; `rule.refused` where a small file brings nothing
 */
export function startImport(write: Write, file: ImportFile, mapping: ImportMapping): ReadingImport {
  const id = write.newId();
  const isSmall = file.content.length <= AT_ONCE_BYTES;
  write.tx
    .insert(readingImports)
    .values({
      ...{ id, fileName: file.fileName.slice(0, 200), readings: 0, at: write.now, by: write.actor.name },
      state: 'waiting',
    })
    .run();
  if (isSmall) importAtOnce(write, id, readCsvTable(file.content), mapping);
  else {
    // What can be told from its beginning is told at once.
    assertMapping(readCsvTable(file.content.subarray(0, AT_ONCE_BYTES)), mapping);
    const { userId, name, role, storeId } = write.actor;
    const order: z.infer<typeof ImportOrder> = { mapping, actor: { userId, name, role, storeId } };
    write.tx.insert(readingImportFiles).values({ importId: id, content: file.content, mapping: order }).run();
  }
  return readingImport(write.tx, id);
}

function importAtOnce(write: Write, importId: string, table: CsvTable, mapping: ImportMapping): void {
  write.tx.update(readingImports).set({ rows: table.rows.length }).where(eq(readingImports.id, importId)).run();
  for (const piece of siftFile(write.tx, table, mapping, write.now)) storePiece(write, importId, piece);
  finishImport(write, importId);
}

/** Stores a piece and counts it. @returns false where the import was taken back meanwhile */
export function storePiece(write: Write, importId: string, piece: SiftedPiece): boolean {
  const row = write.tx.select().from(readingImports).where(eq(readingImports.id, importId)).get();
  if (!row) return false;
  const stored = storeValues(write, importId, piece.fresh);
  write.tx
    .update(readingImports)
    .set({
      rowsDone: piece.rowsDone,
      readings: row.readings + stored,
      duplicates: row.duplicates + piece.duplicates + piece.fresh.length - stored,
      badRows: row.badRows + piece.badRows,
    })
    .where(eq(readingImports.id, importId))
    .run();
  return true;
}

/** @throws {DomainError} `rule.refused` where the file brought nothing */
export function finishImport(write: Write, importId: string): void {
  if (readingImport(write.tx, importId).readings === 0) {
    throw new DomainError('rule.refused', 'This file brings no new reading. Look at the preview for the reasons.');
  }
  write.tx.update(readingImports).set({ state: 'finished' }).where(eq(readingImports.id, importId)).run();
  write.tx.delete(readingImportFiles).where(eq(readingImportFiles.importId, importId)).run();
  const after = readingImport(write.tx, importId);
  write.audit({ action: 'reading_import.committed', entity: 'reading_import', entityId: importId, after });
}

/** Takes a whole import back: every reading that it brought and that is still there. One under way is stopped. */
export function undoImport(write: Write, importId: string): void {
  const before = readingImport(write.tx, importId);
  write.tx.delete(readings).where(eq(readings.importId, importId)).run();
  write.tx.delete(readingImportFiles).where(eq(readingImportFiles.importId, importId)).run();
  write.tx.delete(readingImports).where(eq(readingImports.id, importId)).run();
  write.audit({ action: 'reading_import.undone', entity: 'reading_import', entityId: importId, before });
}

/** The pieces of long work, with a pause after each. */
export async function* inPieces<T>(pieces: Iterable<T>): AsyncGenerator<T> {
  for (const piece of pieces) {
    yield piece;
    await breathe();
  }
}
