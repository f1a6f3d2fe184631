import { reservoirEndpoints, type ReservoirEvent } from '@shared/contracts/reservoirs.ts';
import { callApi } from '@/api/call-api.ts';
import { useAct } from '@/queries/water.ts';

/** Takes back the last event of a reservoir. */
export function useUndoEvent(): (event: Pick<ReservoirEvent, 'id' | 'reservoirId'>) => Promise<void> {
  const act = useAct();
  return async ({ id, reservoirId }) => {
    await act(callApi(reservoirEndpoints.undo, { params: { id: reservoirId }, body: { eventId: id } }));
  };
}
