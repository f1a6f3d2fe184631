import { useQuery } from '@tanstack/vue-query';
import { computed, type MaybeRefOrGetter, toValue } from 'vue';
import { dosingEndpoints } from '@shared/contracts/dosing.ts';
import { stockSolutionEndpoints } from '@shared/contracts/stock-solutions.ts';
import { callApi } from '@/api/call-api.ts';

const KEY = ['water', 'dosing'] as const;

export function useStockSolutions() {
  return useQuery({
    queryKey: [...KEY, 'solutions'],
    queryFn: ({ signal }) => callApi(stockSolutionEndpoints.list, { signal }),
    select: ({ items }) => items,
  });
}

export function useDosingPumps() {
  return useQuery({
    queryKey: [...KEY, 'pumps'],
    queryFn: ({ signal }) => callApi(dosingEndpoints.pumps, { signal }),
    select: ({ items }) => items,
  });
}

export function useRunningRates() {
  return useQuery({
    queryKey: [...KEY, 'running'],
    queryFn: ({ signal }) => callApi(dosingEndpoints.running, { signal }),
    select: ({ items }) => items,
  });
}

export function useSystemRates(systemId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => [...KEY, 'rates', toValue(systemId)]),
    queryFn: ({ signal }) => callApi(dosingEndpoints.ofSystem, { params: { id: toValue(systemId) }, signal }),
    select: ({ items }) => items,
  });
}
