import { DONE } from '../../shared/contracts/common.ts';
import { readingImportEndpoints } from '../../shared/contracts/reading-imports.ts';
import type { Api } from '../http/api.ts';
import { listReadingImports } from '../queries/reading-imports.ts';
import { commitImport, previewImport, undoImport } from '../services/reading-import/import-service.ts';

export function readingImportRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(readingImportEndpoints.list, (db) => ({ items: listReadingImports(db) }));
  api.read(readingImportEndpoints.preview, (db, { body, upload }) =>
    previewImport(db, upload, { ...body, now: clock.now() }),
  );
  api.write(readingImportEndpoints.commit, (write, { body, upload }) => commitImport(write, upload, body.mapping));
  api.write(readingImportEndpoints.undo, (write, { params }) => {
    undoImport(write, params.id);
    return DONE;
  });
}
