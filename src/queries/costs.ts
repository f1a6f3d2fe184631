import { useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { costEndpoints } from '@shared/contracts/costs.ts';
import { callApi } from '@/api/call-api.ts';

const costKeys = {
  overview: ['costs', 'overview'] as const,
  batch: (id: string) => ['costs', 'batch', id] as const,
};

/** Cost of a living frag by line, and of each system by month. */
export function useCostOverview() {
  return useQuery({
    queryKey: costKeys.overview,
    queryFn: ({ signal }) => callApi(costEndpoints.overview, { signal }),
  });
}

/** What a batch has cost so far; for `BatchCostPanel`. Waits while it may not be read. */
export function useBatchCost(id: MaybeRefOrGetter<string>, enabled: MaybeRefOrGetter<boolean> = true) {
  return useQuery({
    queryKey: computed(() => costKeys.batch(toValue(id))),
    queryFn: ({ signal }) => callApi(costEndpoints.batch, { params: { id: toValue(id) }, signal }),
    enabled: computed(() => toValue(enabled)),
  });
}
