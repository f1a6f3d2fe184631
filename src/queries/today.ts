import { keepPreviousData, useQuery } from '@tanstack/vue-query';
import { type ComputedRef, computed } from 'vue';
import { todayEndpoints } from '@shared/contracts/today.ts';
import { callApi } from '@/api/call-api.ts';
import { useSessionStore } from '@/stores/session.ts';

const LOOK_AGAIN_MS = 60_000;

/** What needs doing. It follows from the work of others too, so it is looked at again each minute. */
export function useToday() {
  const session = useSessionStore();
  return useQuery({
    // By person: what each may see differs.
    queryKey: computed(() => ['today', session.user?.id ?? null] as const),
    queryFn: ({ signal }) => callApi(todayEndpoints.show, { signal }),
    enabled: computed(() => session.can('today.read')),
    refetchInterval: LOOK_AGAIN_MS,
    placeholderData: keepPreviousData,
  });
}

/** How many things can't wait. */
export function useUrgentCount(): ComputedRef<number> {
  const session = useSessionStore();
  const { data } = useToday();
  return computed(() =>
    session.can('today.read') ? (data.value?.entries.filter(({ group }) => group === 'now').length ?? 0) : 0,
  );
}
