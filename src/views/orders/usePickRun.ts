import { ref } from 'vue';
import type { PickDone } from '@shared/contracts/orders.ts';
import { type ApiError, toApiError } from '@/api/api-error.ts';
import { newKey } from '@/api/new-key.ts';
import { useScanSignal } from '@/composables/useScanSignal.ts';
import { useOrderActs } from '@/queries/orders.ts';

/** What came of the last scan. */
export type PickResult =
  { kind: 'picked'; done: PickDone } | { kind: 'refused'; text: string; error: ApiError } | { kind: 'undone' };

/** Scans for one order, one after the other in the order they were made, however fast they come. */
export function usePickRun(orderId: () => string) {
  const acts = useOrderActs();
  const { signal } = useScanSignal();
  const result = ref<PickResult | null>(null);
  const busy = ref(0);
  let queue: Promise<void> = Promise.resolve();

  function scan(text: string): void {
    inTurn(async () => {
      result.value = await pick(text);
      signal(result.value.kind === 'picked' ? 'done' : 'refused');
    });
  }

  async function pick(text: string): Promise<PickResult> {
    const key = newKey();
    try {
      return { kind: 'picked', done: await acts.pick(orderId(), text, key) };
    } catch (thrown) {
      return { kind: 'refused', text, error: toApiError(thrown) };
    }
  }

  function undo(pickId: string): void {
    inTurn(async () => {
      try {
        await acts.undoPick(orderId(), pickId);
        result.value = { kind: 'undone' };
      } catch (thrown) {
        result.value = { kind: 'refused', text: '', error: toApiError(thrown) };
      }
    });
  }

  function inTurn(act: () => Promise<void>): void {
    busy.value += 1;
    queue = queue.then(act).finally(() => {
      busy.value -= 1;
    });
  }

  return { result, busy, scan, undo };
}
