import { useInfiniteQuery, useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { reservoirEndpoints } from '@shared/contracts/reservoirs.ts';
import { callApi } from '@/api/call-api.ts';

const EVENTS_AT_ONCE = 15;

const reservoirKeys = {
  list: (systemId: string | undefined) => ['water', 'reservoirs', systemId ?? 'all'] as const,
  one: (reservoirId: string) => ['water', 'reservoir', reservoirId] as const,
  events: (reservoirId: string) => ['water', 'reservoir', reservoirId, 'events'] as const,
};

/** Reservoirs of one system, or of all. */
export function useReservoirs(systemId: MaybeRefOrGetter<string | undefined> = undefined) {
  return useQuery({
    queryKey: computed(() => reservoirKeys.list(toValue(systemId))),
    queryFn: ({ signal }) => {
      const only = toValue(systemId);
      return callApi(reservoirEndpoints.list, { query: only === undefined ? {} : { systemId: only }, signal });
    },
    select: ({ items }) => items,
  });
}

export function useReservoir(reservoirId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => reservoirKeys.one(toValue(reservoirId))),
    queryFn: ({ signal }) => callApi(reservoirEndpoints.show, { params: { id: toValue(reservoirId) }, signal }),
  });
}

export function useReservoirEvents(reservoirId: MaybeRefOrGetter<string>) {
  return useInfiniteQuery({
    queryKey: computed(() => reservoirKeys.events(toValue(reservoirId))),
    queryFn: ({ pageParam, signal }) =>
      callApi(reservoirEndpoints.events, {
        params: { id: toValue(reservoirId) },
        query: { limit: EVENTS_AT_ONCE, ...(pageParam === null ? {} : { cursor: pageParam }) },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });
}
