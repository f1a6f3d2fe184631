import { reservoirEndpoints, type ReservoirEvent } from '@shared/contracts/reservoirs.ts';
import { callApi } from '@/api/call-api.ts';
import { toApiError } from '@/api/api-error.ts';
import { useAct } from '@/queries/water.ts';
import { useToastStore } from '@/stores/toasts.ts';

const WORDS: Record<ReservoirEvent['kind'], string> = {
  refill: 'The mix is taken back; its lime and vinegar are in store again.',
  level: 'The level is taken back.',
  online: 'The changeover is taken back.',
  offline: 'The changeover is taken back.',
};

/** Takes back the last event of a reservoir, or says why it can't. */
export function useUndoEvent(): (event: Pick<ReservoirEvent, 'id' | 'reservoirId' | 'kind'>) => Promise<void> {
  const act = useAct();
  const toasts = useToastStore();
  return async ({ id, reservoirId, kind }) => {
    try {
      await act(callApi(reservoirEndpoints.undo, { params: { id: reservoirId }, body: { eventId: id } }));
      toasts.show(WORDS[kind]);
    } catch (error) {
      toasts.show(toApiError(error).detail, { tone: 'brick' });
    }
  };
}
