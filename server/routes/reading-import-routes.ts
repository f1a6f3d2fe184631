import { DONE } from '../../shared/contracts/common.ts';
import { readingImportEndpoints } from '../../shared/contracts/reading-imports.ts';
import type { Api } from '../http/api.ts';
import { csvFile } from '../http/csv-file.ts';
import { listReadingImports, readingImport } from '../queries/reading-imports.ts';
import {
  type BadRow,
  badRowsOf,
  previewImport,
  startImport,
  undoImport,
} from '../services/reading-import/import-service.ts';

export function readingImportRoutes(api: Api): void {
  const { clock, db } = api.deps;
  api.read(readingImportEndpoints.list, (from) => ({ items: listReadingImports(from) }));
  api.read(readingImportEndpoints.show, (from, { params }) => readingImport(from, params.id));
  api.act(readingImportEndpoints.preview, ({ body, upload }) =>
    previewImport(db, upload, { ...body, now: clock.now() }),
  );
  api.act(readingImportEndpoints.problems, async ({ body, upload }) => {
    const { heads, rows } = await badRowsOf(db, upload, { mapping: body.mapping, now: clock.now() });
    return csvFile('rows-left-out.csv', badRowColumns(heads), rows);
  });
  api.write(readingImportEndpoints.commit, (write, { body, upload }) => startImport(write, upload, body.mapping));
  api.write(readingImportEndpoints.undo, (write, { params }) => {
    undoImport(write, params.id);
    return DONE;
  });
}

/** The file's own columns come first, so that it can be mended and imported as it is. */
function badRowColumns(heads: readonly string[]) {
  const own = heads.map(
    (head, index) => [head || `Column ${index + 1}`, (row: BadRow) => row.cells[index] ?? ''] as const,
  );
  return {
    ...Object.fromEntries(own),
    'Line before': ({ line }: BadRow) => line,
    'Left out because': ({ reasons }: BadRow) => reasons,
  };
}
