import { useInfiniteQuery, useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { type AskOverfill, overfillEndpoints } from '@shared/contracts/overfills.ts';
import { planEndpoints } from '@shared/contracts/plan.ts';
import { waterRuleEndpoints } from '@shared/contracts/water-rules.ts';
import { callApi } from '@/api/call-api.ts';

const ANSWERS_AT_ONCE = 10;

const planKeys = {
  one: (systemId: string) => ['water', 'plan', systemId] as const,
  answers: (systemId: string) => ['water', 'plan', systemId, 'answers'] as const,
  overfill: (systemId: string, ask: AskOverfill) => ['water', 'overfill', systemId, ask] as const,
  rules: () => ['water', 'rules'] as const,
};

/** Advice on the dosing of a system, and the plan that runs. */
export function useSystemPlan(systemId: MaybeRefOrGetter<string | undefined>) {
  return useQuery({
    queryKey: computed(() => planKeys.one(toValue(systemId) ?? '')),
    queryFn: ({ signal }) => callApi(planEndpoints.show, { params: { id: toValue(systemId) ?? '' }, signal }),
    enabled: computed(() => toValue(systemId) !== undefined),
  });
}

/** Advice that was answered, newest first. */
export function useAnsweredAdvice(systemId: MaybeRefOrGetter<string>) {
  return useInfiniteQuery({
    queryKey: computed(() => planKeys.answers(toValue(systemId))),
    queryFn: ({ pageParam, signal }) =>
      callApi(planEndpoints.history, {
        params: { id: toValue(systemId) },
        query: { limit: ANSWERS_AT_ONCE, ...(pageParam === null ? {} : { cursor: pageParam }) },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });
}

/** What happens if the top-off control of a system sticks. */
export function useSystemOverfill(systemId: MaybeRefOrGetter<string>, ask: MaybeRefOrGetter<AskOverfill> = {}) {
  return useQuery({
    queryKey: computed(() => planKeys.overfill(toValue(systemId), toValue(ask))),
    queryFn: ({ signal }) =>
      callApi(overfillEndpoints.ask, { params: { id: toValue(systemId) }, query: toValue(ask), signal }),
    // While another time of running is worked out, the one before may stay.
    placeholderData: (shown) => (shown?.systemId === toValue(systemId) ? shown : undefined),
  });
}

export function useWaterRules() {
  return useQuery({
    queryKey: planKeys.rules(),
    queryFn: ({ signal }) => callApi(waterRuleEndpoints.show, { signal }),
  });
}
