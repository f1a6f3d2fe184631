import { keepPreviousData, useInfiniteQuery, useQuery, useQueryClient } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import type { z } from 'zod';
import { listingEndpoints } from '@shared/contracts/listings.ts';
import { type ListOrders, orderEndpoints, packingEndpoints } from '@shared/contracts/orders.ts';
import { storeEndpoints } from '@shared/contracts/stores.ts';
import { callApi } from '@/api/call-api.ts';
import { stockKeys } from '@/queries/stock.ts';

/** Orders, stores and listings start alike: what one act changes shows on pages of the others. */
const orderKeys = {
  all: ['orders'] as const,
  list: (query: Partial<ListOrders>) => ['orders', 'list', query] as const,
  one: (id: string) => ['orders', 'one', id] as const,
  plan: (id: string) => ['orders', 'plan', id] as const,
  stores: (search: string) => ['orders', 'stores', search] as const,
  store: (id: string) => ['orders', 'store', id] as const,
  listings: ['orders', 'listings'] as const,
  packingSupplies: ['orders', 'packing-supplies'] as const,
};

/** Orders newest first, some at a time. */
export function useOrders(query: MaybeRefOrGetter<Partial<ListOrders>>) {
  return useInfiniteQuery({
    queryKey: computed(() => orderKeys.list(toValue(query))),
    queryFn: ({ signal, pageParam }) =>
      callApi(orderEndpoints.list, { query: { ...toValue(query), ...at(pageParam) }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });
}

export function useOrder(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => orderKeys.one(toValue(id))),
    queryFn: ({ signal }) => callApi(orderEndpoints.show, { params: { id: toValue(id) }, signal }),
  });
}

export function usePickPlan(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => orderKeys.plan(toValue(id))),
    queryFn: ({ signal }) => callApi(packingEndpoints.plan, { params: { id: toValue(id) }, signal }),
  });
}

/** Stores by name, some at a time. */
export function useStores(search: MaybeRefOrGetter<string> = '') {
  return useInfiniteQuery({
    queryKey: computed(() => orderKeys.stores(toValue(search))),
    queryFn: ({ signal, pageParam }) =>
      callApi(storeEndpoints.list, {
        query: { ...(toValue(search) ? { search: toValue(search) } : {}), ...at(pageParam) },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });
}

export function useStore(id: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => orderKeys.store(toValue(id))),
    queryFn: ({ signal }) => callApi(storeEndpoints.show, { params: { id: toValue(id) }, signal }),
  });
}

/** Packing supplies change with every order that is packed, so they are asked for afresh. */
export function usePackingSupplies() {
  return useQuery({
    queryKey: orderKeys.packingSupplies,
    queryFn: ({ signal }) => callApi(packingEndpoints.supplies, { signal }),
    staleTime: 0,
  });
}

export function useListings() {
  return useInfiniteQuery({
    queryKey: orderKeys.listings,
    queryFn: ({ signal, pageParam }) => callApi(listingEndpoints.list, { query: at(pageParam), signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });
}

type BodyOf<E extends { body: z.ZodType }> = z.input<E['body']>;

/** Everything that changes orders, stores and listings; each act renews what pages show, the stock's too. */
export function useOrderActs() {
  const client = useQueryClient();

  async function renewing<T>(act: Promise<T>): Promise<T> {
    try {
      return await act;
    } finally {
      // A refusal too may mean that what the page shows is old.
      await Promise.all([
        client.invalidateQueries({ queryKey: orderKeys.all }),
        client.invalidateQueries({ queryKey: stockKeys.all, refetchType: 'none' }),
      ]);
    }
  }

  return {
    cancel: (id: string, body: BodyOf<typeof orderEndpoints.cancel>) =>
      renewing(callApi(orderEndpoints.cancel, { params: { id }, body })),
    refund: (id: string, body: BodyOf<typeof orderEndpoints.refund>, idempotencyKey: string) =>
      renewing(callApi(orderEndpoints.refund, { params: { id }, body, idempotencyKey })),
    pick: (id: string, code: string, idempotencyKey: string) =>
      renewing(callApi(packingEndpoints.pick, { params: { id }, body: { code }, idempotencyKey })),
    undoPick: (id: string, pickId: string) => renewing(callApi(packingEndpoints.undoPick, { params: { id, pickId } })),
    pack: (id: string, body: BodyOf<typeof packingEndpoints.pack>) =>
      renewing(callApi(packingEndpoints.pack, { params: { id }, body })),
    ship: (id: string, body: BodyOf<typeof packingEndpoints.ship>) =>
      renewing(callApi(packingEndpoints.ship, { params: { id }, body })),
    createStore: (body: BodyOf<typeof storeEndpoints.create>, idempotencyKey: string) =>
      renewing(callApi(storeEndpoints.create, { body, idempotencyKey })),
    editStore: (id: string, ifMatch: number, body: BodyOf<typeof storeEndpoints.edit>) =>
      renewing(callApi(storeEndpoints.edit, { params: { id }, ifMatch, body })),
    createListing: (body: BodyOf<typeof listingEndpoints.create>, idempotencyKey: string) =>
      renewing(callApi(listingEndpoints.create, { body, idempotencyKey })),
    editListing: (id: string, ifMatch: number, body: BodyOf<typeof listingEndpoints.edit>) =>
      renewing(callApi(listingEndpoints.edit, { params: { id }, ifMatch, body })),
  };
}

function at(cursor: string | null) {
  return cursor === null ? {} : { cursor };
}
