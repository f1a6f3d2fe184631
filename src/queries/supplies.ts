import { keepPreviousData, useInfiniteQuery, useQuery, useQueryClient } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import type { z } from 'zod';
import { supplierEndpoints } from '@shared/contracts/suppliers.ts';
import { type ListItems, supplyEndpoints } from '@shared/contracts/supplies.ts';
import { callApi } from '@/api/call-api.ts';

const supplyKeys = {
  all: ['supplies'] as const,
  items: (query: Partial<ListItems>) => ['supplies', 'items', query] as const,
  item: (id: string) => ['supplies', 'item', id] as const,
  lots: (itemId: string) => ['supplies', 'lots', itemId] as const,
  uses: (itemId: string) => ['supplies', 'uses', itemId] as const,
  suppliers: ['supplies', 'suppliers'] as const,
};

const ROWS_AT_ONCE = 10;

/** All supplies that match, the most urgent first. */
export function useSupplyItems(query: MaybeRefOrGetter<Partial<ListItems>> = {}) {
  return useQuery({
    queryKey: computed(() => supplyKeys.items(toValue(query))),
    queryFn: ({ signal }) => callApi(supplyEndpoints.items, { query: toValue(query), signal }),
    placeholderData: keepPreviousData,
  });
}

export function useSupplyItem(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => supplyKeys.item(toValue(id))),
    queryFn: ({ signal }) => callApi(supplyEndpoints.item, { params: { id: toValue(id) }, signal }),
  });
}

export function useSuppliers() {
  return useQuery({
    queryKey: supplyKeys.suppliers,
    queryFn: ({ signal }) => callApi(supplierEndpoints.list, { signal }),
  });
}

/** Lots of an item, newest first, a few at a time. */
export function useSupplyLots(itemId: MaybeRefOrGetter<string>) {
  return useInfiniteQuery({
    queryKey: computed(() => supplyKeys.lots(toValue(itemId))),
    queryFn: ({ signal, pageParam }) =>
      callApi(supplyEndpoints.lots, { query: pageOf(toValue(itemId), pageParam), signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });
}

/** What was taken of an item, newest first, a few at a time. */
export function useSupplyUses(itemId: MaybeRefOrGetter<string>) {
  return useInfiniteQuery({
    queryKey: computed(() => supplyKeys.uses(toValue(itemId))),
    queryFn: ({ signal, pageParam }) =>
      callApi(supplyEndpoints.uses, { query: pageOf(toValue(itemId), pageParam), signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });
}

function pageOf(itemId: string, cursor: string | null) {
  return { itemId, limit: ROWS_AT_ONCE, ...(cursor === null ? {} : { cursor }) };
}

type BodyOf<E extends { body: z.ZodType }> = z.output<E['body']>;

/** Everything that changes supplies; each act renews what pages show. */
export function useSupplyActs() {
  const client = useQueryClient();

  async function renewing<T>(act: Promise<T>): Promise<T> {
    const answer = await act;
    await client.invalidateQueries({ queryKey: supplyKeys.all });
    return answer;
  }

  return {
    createItem: (body: BodyOf<typeof supplyEndpoints.createItem>, idempotencyKey: string) =>
      renewing(callApi(supplyEndpoints.createItem, { body, idempotencyKey })),
    editItem: (id: string, ifMatch: number, body: BodyOf<typeof supplyEndpoints.editItem>) =>
      renewing(callApi(supplyEndpoints.editItem, { params: { id }, ifMatch, body })),
    createSupplier: (body: BodyOf<typeof supplierEndpoints.create>, idempotencyKey: string) =>
      renewing(callApi(supplierEndpoints.create, { body, idempotencyKey })),
    editSupplier: (id: string, ifMatch: number, body: BodyOf<typeof supplierEndpoints.edit>) =>
      renewing(callApi(supplierEndpoints.edit, { params: { id }, ifMatch, body })),
    receive: (body: BodyOf<typeof supplyEndpoints.receive>, idempotencyKey: string) =>
      renewing(callApi(supplyEndpoints.receive, { body, idempotencyKey })),
    undoReceipt: (id: string) => renewing(callApi(supplyEndpoints.undoReceipt, { params: { id } })),
    count: (body: BodyOf<typeof supplyEndpoints.count>, idempotencyKey: string) =>
      renewing(callApi(supplyEndpoints.count, { body, idempotencyKey })),
  };
}
