import { useInfiniteQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { type LogSubject, systemLogEndpoints } from '@shared/contracts/system-log.ts';
import { callApi } from '@/api/call-api.ts';

/** A page of a list that stands beside others. */
const PAGE = 10;

/** @param subject null for everything */
export function useSystemLog(systemId: MaybeRefOrGetter<string>, subject: MaybeRefOrGetter<LogSubject | null>) {
  return useInfiniteQuery({
    queryKey: computed(() => ['water', 'log', toValue(systemId), toValue(subject)] as const),
    queryFn: ({ pageParam, signal }) => {
      const chosen = toValue(subject);
      return callApi(systemLogEndpoints.list, {
        params: { id: toValue(systemId) },
        query: {
          limit: PAGE,
          ...(pageParam === null ? {} : { before: pageParam }),
          ...(chosen ? { subject: chosen } : {}),
        },
        signal,
      });
    },
    initialPageParam: null as number | null,
    getNextPageParam: (page) => page.nextBefore,
  });
}
