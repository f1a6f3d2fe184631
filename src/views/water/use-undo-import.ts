import { readingImportEndpoints } from '@shared/contracts/reading-imports.ts';
import { toApiError } from '@/api/api-error.ts';
import { callApi } from '@/api/call-api.ts';
import { useAct } from '@/queries/water.ts';
import { useToastStore } from '@/stores/toasts.ts';

/** Takes a whole import back, or says why it can't. */
export function useUndoImport(): (importId: string) => Promise<void> {
  const act = useAct();
  const toasts = useToastStore();
  return async (importId) => {
    try {
      await act(callApi(readingImportEndpoints.undo, { params: { id: importId } }));
      toasts.show('The import is taken back.');
    } catch (error) {
      toasts.show(toApiError(error).detail, { tone: 'brick' });
    }
  };
}
