import { ref } from 'vue';
import type { Settled, Task } from '@shared/contracts/tasks.ts';
import { readingEndpoints } from '@shared/contracts/readings.ts';
import { callApi } from '@/api/call-api.ts';
import { toApiError } from '@/api/api-error.ts';
import { useTaskActs } from '@/queries/tasks.ts';
import { useAct } from '@/queries/water.ts';
import { useToastStore } from '@/stores/toasts.ts';

/** Settling a task by one press, and taking back what was said of it, its readings too. */
export function useTaskSteps() {
  const acts = useTaskActs();
  const act = useAct();
  const toasts = useToastStore();
  const busyId = ref<string | null>(null);

  async function done({ id, dueOn }: Pick<Task, 'id' | 'dueOn'>): Promise<void> {
    if (dueOn === null || busyId.value !== null) return;
    busyId.value = id;
    try {
      tell(await acts.complete(id, { dueOn }));
    } catch (error) {
      toasts.show(toApiError(error).detail, { tone: 'brick' });
    } finally {
      busyId.value = null;
    }
  }

  function tell({ outcomeId, readingIds, task }: Settled): void {
    const said =
      task.last?.kind === 'skipped' ? 'Skipped this time.' : readingIds.length > 0 ? 'Logged and done.' : 'Done.';
    toasts.show(said, { undo: () => takeBack(outcomeId, readingIds) });
  }

  async function takeBack(outcomeId: string, readingIds: readonly string[]): Promise<void> {
    await acts.undo(outcomeId);
    for (const id of readingIds) await act(callApi(readingEndpoints.remove, { params: { id } }));
  }

  async function end({ id }: Task): Promise<void> {
    try {
      await acts.end(id);
      toasts.show('No more of this task comes.', { undo: () => acts.resume(id) });
    } catch (error) {
      toasts.show(toApiError(error).detail, { tone: 'brick' });
    }
  }

  return { busyId, done, tell, end };
}
