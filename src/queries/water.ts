import { useQuery, useQueryClient } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { additionEndpoints } from '@shared/contracts/additions.ts';
import { waterOverviewEndpoints } from '@shared/contracts/water-overview.ts';
import type { DemandParameter } from '@shared/contracts/demand.ts';
import { planEndpoints } from '@shared/contracts/plan.ts';
import { waterEndpoints } from '@shared/contracts/water.ts';
import { callApi } from '@/api/call-api.ts';

/** All keys of the water start alike, so that one call makes the whole of it fresh. */
export const waterKeys = {
  all: ['water'] as const,
  overview: () => ['water', 'overview'] as const,
  glance: (systemId: string) => ['water', 'glance', systemId] as const,
  demand: (systemId: string, days: number, parameter: DemandParameter) =>
    ['water', 'demand', systemId, days, parameter] as const,
  additions: (systemId: string) => ['water', 'additions', systemId] as const,
  items: () => ['water', 'items'] as const,
};

export function useWaterOverview() {
  return useQuery({
    queryKey: waterKeys.overview(),
    queryFn: ({ signal }) => callApi(waterOverviewEndpoints.show, { signal }),
  });
}

/** What the dosing of every system should be: worked out apart, so that the page of all systems need not wait for it. */
export function useAllPlans() {
  return useQuery({
    queryKey: ['water', 'plans'],
    queryFn: ({ signal }) => callApi(planEndpoints.list, { signal }),
    select: ({ items }) => new Map(items.map((plan) => [plan.systemId, plan])),
  });
}

export function useSystemGlance(systemId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => waterKeys.glance(toValue(systemId))),
    queryFn: ({ signal }) => callApi(waterEndpoints.glance, { params: { id: toValue(systemId) }, signal }),
  });
}

/** Waits while the system is not known yet. */
export function useSystemDemand(
  systemId: MaybeRefOrGetter<string | undefined>,
  days: MaybeRefOrGetter<number>,
  parameter: DemandParameter = 'alkalinity',
) {
  return useQuery({
    queryKey: computed(() => waterKeys.demand(toValue(systemId) ?? '', toValue(days), parameter)),
    queryFn: ({ signal }) =>
      callApi(waterEndpoints.demand, {
        params: { id: toValue(systemId) ?? '' },
        query: { days: toValue(days), parameter },
        signal,
      }),
    enabled: () => toValue(systemId) !== undefined,
    // Another period of the same system may be shown meanwhile, another system may not.
    placeholderData: (shown) => (shown?.systemId === toValue(systemId) ? shown : undefined),
  });
}

export function useAdditions(systemId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => waterKeys.additions(toValue(systemId))),
    queryFn: ({ signal }) => callApi(additionEndpoints.list, { params: { id: toValue(systemId) }, signal }),
    select: ({ items }) => items,
  });
}

export function useWaterItems() {
  return useQuery({
    queryKey: waterKeys.items(),
    queryFn: ({ signal }) => callApi(waterEndpoints.items, { signal }),
    select: ({ items }) => items,
  });
}

/**
 * Runs an act and makes every page fresh after it: what is done to the water shows in supplies, costs and Today too.
 */
export function useAct(): <T>(act: Promise<T>) => Promise<T> {
  const client = useQueryClient();
  return async (act) => {
    const answer = await act;
    void client.invalidateQueries();
    return answer;
  };
}
