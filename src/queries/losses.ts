import { keepPreviousData, useQuery } from '@tanstack/vue-query';
import { computed, type MaybeRefOrGetter, toValue } from 'vue';
import { stockEndpoints, type SurvivalBy } from '@shared/contracts/stock.ts';
import { callApi } from '@/api/call-api.ts';
import { stockKeys } from '@/queries/stock.ts';

export function useSurvival(by: MaybeRefOrGetter<SurvivalBy>) {
  return useQuery({
    queryKey: computed(() => [...stockKeys.all, 'survival', toValue(by)]),
    queryFn: ({ signal }) => callApi(stockEndpoints.survival, { query: { by: toValue(by) }, signal }),
    placeholderData: keepPreviousData,
  });
}

export function useLossPatterns() {
  return useQuery({
    queryKey: [...stockKeys.all, 'loss-patterns'],
    queryFn: ({ signal }) => callApi(stockEndpoints.lossPatterns, { signal }),
  });
}
