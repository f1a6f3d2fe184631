import { useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { timelineEndpoints } from '@shared/contracts/timeline.ts';
import type { ParameterCode } from '@shared/domain/units.ts';
import { callApi } from '@/api/call-api.ts';

/** What is asked for: a stretch of time, up to now when `to` is left out, and the parameters that are shown. */
export interface TimelineWish {
  from: number;
  to?: number;
  parameters: readonly ParameterCode[];
}

export function timelineQuery({ parameters, ...span }: TimelineWish) {
  return { ...span, parameters: parameters.join(',') };
}

/** Waits while nothing is wished for. */
export function useTimeline(systemId: MaybeRefOrGetter<string>, wish: MaybeRefOrGetter<TimelineWish | null>) {
  return useQuery({
    queryKey: computed(() => ['water', 'timeline', toValue(systemId), toValue(wish)] as const),
    queryFn: ({ signal }) =>
      callApi(timelineEndpoints.show, {
        params: { id: toValue(systemId) },
        query: timelineQuery(toValue(wish) ?? { from: 0, parameters: [] }),
        signal,
      }),
    enabled: () => toValue(wish) !== null,
    // Another stretch of the same system may be shown meanwhile, another system may not.
    placeholderData: (shown) => (shown?.systemId === toValue(systemId) ? shown : undefined),
  });
}
