import { readingImportEndpoints } from '@shared/contracts/reading-imports.ts';
import { callApi } from '@/api/call-api.ts';
import { useAct } from '@/queries/water.ts';

/** Takes a whole import back. */
export function useUndoImport(): (importId: string) => Promise<void> {
  const act = useAct();
  return async (importId) => {
    await act(callApi(readingImportEndpoints.undo, { params: { id: importId } }));
  };
}
