import { keepPreviousData, useInfiniteQuery, useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { auditEndpoints, type AuditFilter } from '@shared/contracts/audit.ts';
import { callApi } from '@/api/call-api.ts';

const auditKeys = {
  list: (filter: AuditFilter) => ['audit', 'list', filter] as const,
  choices: ['audit', 'choices'] as const,
};

export function useAuditLog(filter: MaybeRefOrGetter<AuditFilter>) {
  return useInfiniteQuery({
    queryKey: computed(() => auditKeys.list(toValue(filter))),
    queryFn: ({ pageParam, signal }) =>
      callApi(auditEndpoints.list, {
        query: { ...toValue(filter), ...(pageParam === null ? {} : { cursor: pageParam }) },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });
}

export function useAuditChoices() {
  return useQuery({
    queryKey: auditKeys.choices,
    queryFn: ({ signal }) => callApi(auditEndpoints.choices, { signal }),
  });
}
