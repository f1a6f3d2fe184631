import { keepPreviousData, useInfiniteQuery, useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { readingImportEndpoints } from '@shared/contracts/reading-imports.ts';
import { readingEndpoints, type ReadingFilter, type SeriesDays } from '@shared/contracts/readings.ts';
import type { ParameterCode } from '@shared/domain/units.ts';
import { callApi } from '@/api/call-api.ts';

const readingKeys = {
  list: (filter: ReadingFilter) => ['water', 'readings', filter] as const,
  series: (systemId: string, parameter: ParameterCode, days: number) =>
    ['water', 'series', systemId, parameter, days] as const,
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

export function useReadingSeries(
  systemId: MaybeRefOrGetter<string>,
  parameter: MaybeRefOrGetter<ParameterCode>,
  days: MaybeRefOrGetter<SeriesDays>,
) {
  return useQuery({
    queryKey: computed(() => readingKeys.series(toValue(systemId), toValue(parameter), toValue(days))),
    queryFn: ({ signal }) =>
      callApi(readingEndpoints.series, {
        params: { id: toValue(systemId) },
        query: { parameter: toValue(parameter), days: toValue(days) },
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}

export function useReadingImports() {
  return useQuery({
    queryKey: readingKeys.imports(),
    queryFn: ({ signal }) => callApi(readingImportEndpoints.list, { signal }),
    select: ({ items }) => items,
  });
}
