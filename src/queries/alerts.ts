import { keepPreviousData, useInfiniteQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { alertEndpoints } from '@shared/contracts/alerts.ts';
import { callApi } from '@/api/call-api.ts';
import { useAct } from '@/queries/water.ts';

const ALERTS_AT_ONCE = 30;

export function useAlerts(state: MaybeRefOrGetter<'open' | 'closed'>) {
  return useInfiniteQuery({
    queryKey: computed(() => ['alerts', toValue(state)] as const),
    queryFn: ({ pageParam, signal }) =>
      callApi(alertEndpoints.list, {
        query: { state: toValue(state), limit: ALERTS_AT_ONCE, ...(pageParam === null ? {} : { cursor: pageParam }) },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });
}

/** Saying that one knows of an alert, and taking that back. */
export function useAlertActs() {
  const act = useAct();
  return {
    acknowledge: (id: string) => act(callApi(alertEndpoints.acknowledge, { params: { id } })),
    unacknowledge: (id: string) => act(callApi(alertEndpoints.unacknowledge, { params: { id } })),
  };
}
