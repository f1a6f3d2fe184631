import { eq } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import { readingImportFiles, readingImports, readings } from '../db/schema/index.ts';
import { type Actor, inWrite, SYSTEM, type Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { nextReadingImport } from '../queries/reading-imports.ts';
import { readCsvTableInPieces } from '../services/reading-import/csv-table.ts';
import { finishImport, ImportOrder, inPieces, storePiece } from '../services/reading-import/import-service.ts';
import { siftFile } from '../services/reading-import/sift-file.ts';

/**
 * Does the imports that are too large for one answer, in pieces so that nobody waits. One that was broken off by a stop
 * of the server begins anew; one that fails leaves nothing.
 */
export async function importReadings(deps: Deps): Promise<void> {
  for (let next = nextReadingImport(deps.db); next; next = nextReadingImport(deps.db)) await importOne(deps, next.id);
}

async function importOne(deps: Deps, importId: string): Promise<void> {
  try {
    await importFile(deps, importId);
  } catch (error) {
    if (!(error instanceof DomainError)) deps.log.error({ err: error, importId }, 'import failed');
    const failure = error instanceof DomainError ? error.message : 'The import broke off. Nothing of it was stored.';
    inWrite(deps, SYSTEM, (write) => {
      clear(write, importId);
      write.tx.delete(readingImportFiles).where(eq(readingImportFiles.importId, importId)).run();
      write.tx
        .update(readingImports)
        .set({ state: 'failed', failure, readings: 0 })
        .where(eq(readingImports.id, importId))
        .run();
      write.audit({
        action: 'reading_import.failed',
        entity: 'reading_import',
        entityId: importId,
        after: { failure },
      });
    });
  }
}

async function importFile(deps: Deps, importId: string): Promise<void> {
  const file = deps.db.select().from(readingImportFiles).where(eq(readingImportFiles.importId, importId)).get();
  if (!file) throw new DomainError('rule.refused', 'The file is gone. Import it again.');
  const { mapping, actor } = ImportOrder.parse(file.mapping);
  const table = await readCsvTableInPieces(file.content);
  const now = deps.clock.now();
  begin(deps, actor, importId, table.rows.length);
  for await (const piece of inPieces(siftFile(deps.db, table, mapping, now))) {
    if (!inWrite(deps, actor, (write) => storePiece(write, importId, piece))) return;
  }
  inWrite(deps, actor, (write) => {
    finishImport(write, importId);
  });
}

function begin(deps: Deps, actor: Actor, importId: string, rows: number): void {
  inWrite(deps, actor, (write) => {
    clear(write, importId);
    write.tx.update(readingImports).set({ state: 'running', rows }).where(eq(readingImports.id, importId)).run();
  });
}

/** Nothing stays of an earlier try. */
function clear(write: Write, importId: string): void {
  write.tx.delete(readings).where(eq(readings.importId, importId)).run();
  write.tx
    .update(readingImports)
    .set({ rowsDone: 0, readings: 0, duplicates: 0, badRows: 0 })
    .where(eq(readingImports.id, importId))
    .run();
}
