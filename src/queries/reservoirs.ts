import { useInfiniteQuery, useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { evaporationEndpoints } from '@shared/contracts/evaporation.ts';
import { limewaterHabitsEndpoints } from '@shared/contracts/limewater-habits.ts';
import { reservoirEndpoints } from '@shared/contracts/reservoirs.ts';
import { callApi } from '@/api/call-api.ts';

const EVENTS_AT_ONCE = 15;

const reservoirKeys = {
  list: (systemId: string | undefined, retired: 'no' | 'only') =>
    ['water', 'reservoirs', systemId ?? 'all', retired] as const,
  one: (reservoirId: string) => ['water', 'reservoir', reservoirId] as const,
  evaporation: (systemId: string) => ['water', 'evaporation', systemId] as const,
  habits: ['water', 'limewater-habits'] as const,
  events: (reservoirId: string) => ['water', 'reservoir', reservoirId, 'events'] as const,
};

/** Reservoirs that feed one system, or all; or those that were put away. */
export function useReservoirs(
  systemId: MaybeRefOrGetter<string | undefined> = undefined,
  retired: 'no' | 'only' = 'no',
) {
  return useQuery({
    queryKey: computed(() => reservoirKeys.list(toValue(systemId), retired)),
    queryFn: ({ signal }) => {
      const only = toValue(systemId);
      const query = { retired, ...(only === undefined ? {} : { systemId: only }) };
      return callApi(reservoirEndpoints.list, { query, signal });
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

/** What a system loses to the air, and how it was told. */
export function useEvaporation(systemId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => reservoirKeys.evaporation(toValue(systemId))),
    queryFn: ({ signal }) => callApi(evaporationEndpoints.show, { params: { id: toValue(systemId) }, signal }),
  });
}

/** The farm's own spoon and its reading of fresh limewater. */
export function useLimewaterHabits() {
  return useQuery({
    queryKey: reservoirKeys.habits,
    queryFn: ({ signal }) => callApi(limewaterHabitsEndpoints.show, { signal }),
  });
}
