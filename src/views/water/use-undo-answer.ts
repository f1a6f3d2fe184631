import { planEndpoints } from '@shared/contracts/plan.ts';
import { callApi } from '@/api/call-api.ts';
import { useTellOutcome } from '@/composables/useTellOutcome.ts';
import { useAct } from '@/queries/water.ts';

/** Takes the last answer to advice back: its plan, and the work that it asked for. */
export function useUndoAnswer(): (adviceId: string | undefined) => Promise<unknown> {
  const act = useAct();
  const tellOutcome = useTellOutcome();
  return async (adviceId) => {
    if (adviceId === undefined) return;
    await tellOutcome('The answer is taken back.', () =>
      act(callApi(planEndpoints.takeBack, { params: { id: adviceId } })),
    );
  };
}
