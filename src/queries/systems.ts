import { useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { systemEndpoints } from '@shared/contracts/systems.ts';
import { callApi } from '@/api/call-api.ts';

const systemKeys = {
  list: () => ['water', 'systems'] as const,
  one: (systemId: string) => ['water', 'systems', systemId] as const,
};

export function useSystems() {
  return useQuery({
    queryKey: systemKeys.list(),
    queryFn: ({ signal }) => callApi(systemEndpoints.list, { signal }),
    select: ({ items }) => items,
  });
}

/** One system; nothing is fetched while there is no id. */
export function useSystem(systemId: MaybeRefOrGetter<string | undefined>) {
  return useQuery({
    queryKey: computed(() => systemKeys.one(toValue(systemId) ?? '')),
    queryFn: ({ signal }) => callApi(systemEndpoints.show, { params: { id: toValue(systemId) ?? '' }, signal }),
    enabled: computed(() => toValue(systemId) !== undefined),
  });
}
