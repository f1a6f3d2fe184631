import { useInfiniteQuery, useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { type ReadingImport, readingImportEndpoints } from '@shared/contracts/reading-imports.ts';
import { readingEndpoints, type ReadingFilter } from '@shared/contracts/readings.ts';
import { callApi } from '@/api/call-api.ts';

const readingKeys = {
  list: (filter: ReadingFilter) => ['water', 'readings', filter] as const,
  imports: () => ['water', 'reading-imports'] as const,
  import: (importId: string) => ['water', 'reading-imports', importId] as const,
  logSheet: (systemId: string) => ['water', 'log-sheet', systemId] as const,
  people: () => ['water', 'reading-people'] as const,
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
    refetchInterval: ({ state }) => (state.data?.items.some(isUnderWay) ? WATCH_MS : false),
  });
}

const WATCH_MS = 700;

/** An import that may still be under way: looked at again and again until it is over. */
export function useReadingImport(importId: MaybeRefOrGetter<string | null>) {
  return useQuery({
    queryKey: computed(() => readingKeys.import(toValue(importId) ?? '')),
    queryFn: ({ signal }) => callApi(readingImportEndpoints.show, { params: { id: toValue(importId) ?? '' }, signal }),
    enabled: () => toValue(importId) !== null,
    refetchInterval: ({ state }) => (state.data && isUnderWay(state.data) ? WATCH_MS : false),
  });
}

export function isUnderWay({ state }: ReadingImport): boolean {
  return state === 'waiting' || state === 'running';
}

/** What stands beside the fields of the log page; waits while no system is chosen. */
export function useLogSheet(systemId: MaybeRefOrGetter<string | null>) {
  return useQuery({
    queryKey: computed(() => readingKeys.logSheet(toValue(systemId) ?? '')),
    queryFn: ({ signal }) => callApi(readingEndpoints.logSheet, { params: { id: toValue(systemId) ?? '' }, signal }),
    enabled: () => toValue(systemId) !== null,
  });
}

export function useReadingPeople() {
  return useQuery({
    queryKey: readingKeys.people(),
    queryFn: ({ signal }) => callApi(readingEndpoints.people, { signal }),
    select: ({ items }) => items,
  });
}
