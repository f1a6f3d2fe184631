import { keepPreviousData, useInfiniteQuery, useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import type { z } from 'zod';
import { type ListBatches, type ListColonies, type ListLines, stockEndpoints } from '@shared/contracts/stock.ts';
import { callApi } from '@/api/call-api.ts';

type ListRacks = z.input<(typeof stockEndpoints)['listRacks']['query']>;

/** All keys of the stock start alike, so that one call makes the whole of it fresh. */
export const stockKeys = {
  all: ['stock'] as const,
  summary: () => ['stock', 'summary'] as const,
  lines: (query: Partial<ListLines>) => ['stock', 'lines', query] as const,
  line: (id: string) => ['stock', 'line', id] as const,
  colonies: (query: Partial<ListColonies>) => ['stock', 'colonies', query] as const,
  colony: (id: string) => ['stock', 'colony', id] as const,
  cutting: () => ['stock', 'cutting'] as const,
  cuts: (colonyId: string) => ['stock', 'cuts', colonyId] as const,
  racks: (query: ListRacks) => ['stock', 'racks', query] as const,
  rack: (id: string) => ['stock', 'rack', id] as const,
  tanks: () => ['stock', 'tanks'] as const,
  batches: (query: Partial<ListBatches>) => ['stock', 'batches', query] as const,
  batch: (id: string) => ['stock', 'batch', id] as const,
  batchPlugs: (id: string) => ['stock', 'batch-plugs', id] as const,
  plug: (code: string) => ['stock', 'plug', code] as const,
  withholds: () => ['stock', 'withholds'] as const,
};

export function useStockSummary() {
  return useQuery({
    queryKey: stockKeys.summary(),
    queryFn: ({ signal }) => callApi(stockEndpoints.summary, { signal }),
  });
}

/** Lines by code, some at a time. */
export function useLines(query: MaybeRefOrGetter<Partial<ListLines>> = {}) {
  return useInfiniteQuery({
    queryKey: computed(() => stockKeys.lines(toValue(query))),
    queryFn: ({ signal, pageParam }) =>
      callApi(stockEndpoints.listLines, { query: { ...toValue(query), ...at(pageParam) }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });
}

export function useLine(id: MaybeRefOrGetter<string>, options: { enabled?: MaybeRefOrGetter<boolean> } = {}) {
  return useQuery({
    queryKey: computed(() => stockKeys.line(toValue(id))),
    queryFn: ({ signal }) => callApi(stockEndpoints.showLine, { params: { id: toValue(id) }, signal }),
    enabled: computed(() => toValue(options.enabled) ?? true),
  });
}

/** The first 200 mothers that match. */
export function useColonies(query: MaybeRefOrGetter<Partial<ListColonies>>) {
  return useQuery({
    queryKey: computed(() => stockKeys.colonies(toValue(query))),
    queryFn: ({ signal }) => callApi(stockEndpoints.listColonies, { query: { limit: 200, ...toValue(query) }, signal }),
    select: ({ items }) => items,
  });
}

export function useColony(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => stockKeys.colony(toValue(id))),
    queryFn: ({ signal }) => callApi(stockEndpoints.showColony, { params: { id: toValue(id) }, signal }),
  });
}

export function useCuttingChoices() {
  return useQuery({
    queryKey: stockKeys.cutting(),
    queryFn: ({ signal }) => callApi(stockEndpoints.cuttingChoices, { signal }),
    select: ({ items }) => items,
  });
}

export function useCutsOf(colonyId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => stockKeys.cuts(toValue(colonyId))),
    queryFn: ({ signal }) =>
      callApi(stockEndpoints.listCuts, { query: { colonyId: toValue(colonyId), limit: 100 }, signal }),
    select: ({ items }) => items,
  });
}

export function useRacks(query: MaybeRefOrGetter<ListRacks> = {}) {
  return useQuery({
    queryKey: computed(() => stockKeys.racks(toValue(query))),
    queryFn: ({ signal }) => callApi(stockEndpoints.listRacks, { query: toValue(query), signal }),
    select: ({ items }) => items,
  });
}

export function useRack(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => stockKeys.rack(toValue(id))),
    queryFn: ({ signal }) => callApi(stockEndpoints.showRack, { params: { id: toValue(id) }, signal }),
  });
}

export function useTanks() {
  return useQuery({
    queryKey: stockKeys.tanks(),
    queryFn: ({ signal }) => callApi(stockEndpoints.listTanks, { signal }),
    select: ({ items }) => items,
  });
}

/** Batches, newest cut first, some at a time. */
export function useBatches(query: MaybeRefOrGetter<Partial<ListBatches>>) {
  return useInfiniteQuery({
    queryKey: computed(() => stockKeys.batches(toValue(query))),
    queryFn: ({ signal, pageParam }) =>
      callApi(stockEndpoints.listBatches, { query: { ...toValue(query), ...at(pageParam) }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });
}

export function useBatch(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => stockKeys.batch(toValue(id))),
    queryFn: ({ signal }) => callApi(stockEndpoints.showBatch, { params: { id: toValue(id) }, signal }),
  });
}

export function useBatchPlugs(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => stockKeys.batchPlugs(toValue(id))),
    queryFn: ({ signal }) => callApi(stockEndpoints.listBatchPlugs, { params: { id: toValue(id) }, signal }),
    select: ({ items }) => items,
  });
}

export function usePlug(code: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => stockKeys.plug(toValue(code))),
    queryFn: ({ signal }) => callApi(stockEndpoints.showPlug, { params: { code: toValue(code) }, signal }),
  });
}

function at(cursor: string | null) {
  return cursor === null ? {} : { cursor };
}
