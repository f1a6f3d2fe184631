import { useInfiniteQuery, useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { readingImportEndpoints } from '@shared/contracts/reading-imports.ts';
import { readingEndpoints, type ReadingFilter } from '@shared/contracts/readings.ts';
import { callApi } from '@/api/call-api.ts';

const readingKeys = {
  list: (filter: ReadingFilter) => ['water', 'readings', filter] as const,
  imports: () => ['water', 'reading-imports'] as const,
};

export function useReadings(filter: MaybeRefOrGetter<ReadingFilter>) {
  return useInfiniteQuery({
    queryKey: computed(() => readingKeys.list(toValue(filter))),
    queryFn: ({ pageParam, signal }) =>
      callApi(readingEndpoints.list, {
        query: { ...toValue(filter), ...(pageParam === null ? {} : { cursor: pageParam }) },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });
}

export function useReadingImports() {
  return useQuery({
    queryKey: readingKeys.imports(),
    queryFn: ({ signal }) => callApi(readingImportEndpoints.list, { signal }),
    select: ({ items }) => items,
  });
}
