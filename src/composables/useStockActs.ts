import { useQueryClient } from '@tanstack/vue-query';
import { stockEndpoints } from '@shared/contracts/stock.ts';
import { callApi } from '@/api/call-api.ts';
import { toApiError } from '@/api/api-error.ts';
import { plural } from '@/formatting/plural.ts';
import { useToastStore } from '@/stores/toasts.ts';

/** Runs acts on stock: makes every page fresh after each, and says what was done with a way back. */
export function useStockActs() {
  const client = useQueryClient();
  const toasts = useToastStore();

  async function renewing<T>(act: Promise<T>): Promise<T> {
    const answer = await act;
    // What is done to stock shows in cutting, supplies, orders, costs and Today too.
    void client.invalidateQueries();
    return answer;
  }

  async function undo(groupId: string): Promise<void> {
    await saying(async () => {
      const { pieces } = await renewing(callApi(stockEndpoints.undoAct, { params: { groupId }, body: {} }));
      return `${plural(pieces, 'piece')} put back.`;
    });
  }

  /** After an act: what was done, and Undo. */
  function offerUndo(message: string, groupId: string | null): void {
    toasts.show(message, groupId === null ? {} : { undo: () => undo(groupId) });
  }

  async function release(id: string): Promise<void> {
    await saying(async () => {
      await renewing(callApi(stockEndpoints.release, { params: { id } }));
      return 'Released for sale.';
    });
  }

  async function undoMeasurement(id: string): Promise<void> {
    await saying(async () => {
      await renewing(callApi(stockEndpoints.undoMeasurement, { params: { id } }));
      return 'Measurement taken back.';
    });
  }

  async function saying(act: () => Promise<string>): Promise<void> {
    try {
      toasts.show(await act());
    } catch (error) {
      toasts.show(toApiError(error).detail, { tone: 'brick' });
    }
  }

  return { renewing, undo, offerUndo, release, undoMeasurement };
}
