import type { ReservoirChange } from '@shared/contracts/reservoirs.ts';
import { useAct } from '@/queries/water.ts';
import { useToastStore } from '@/stores/toasts.ts';
import { useUndoEvent } from '@/views/water/use-undo-event.ts';

/** Does something to a reservoir and says so, with Undo for a while. */
export function useReservoirAct(): (
  sent: Promise<ReservoirChange>,
  said: (change: ReservoirChange) => string,
) => Promise<void> {
  const act = useAct();
  const toasts = useToastStore();
  const undoEvent = useUndoEvent();
  return async (sent, said) => {
    const change = await act(sent);
    toasts.show(said(change), { undo: () => undoEvent(change.event) });
  };
}
