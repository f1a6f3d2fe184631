import { keepPreviousData, useInfiniteQuery, useQuery, useQueryClient } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { type PlaceOrder, shopEndpoints, type ShopOrder } from '@shared/contracts/shop.ts';
import { callApi } from '@/api/call-api.ts';

const shopKeys = {
  all: ['shop'] as const,
  availability: ['shop', 'availability'] as const,
  orders: ['shop', 'orders'] as const,
  order: (id: string) => ['shop', 'order', id] as const,
};

export function useAvailability() {
  return useQuery({
    queryKey: shopKeys.availability,
    queryFn: ({ signal }) => callApi(shopEndpoints.availability, { signal }),
  });
}

export function useShopOrders() {
  return useInfiniteQuery({
    queryKey: shopKeys.orders,
    queryFn: ({ signal, pageParam }) =>
      callApi(shopEndpoints.list, { query: pageParam === null ? {} : { cursor: pageParam }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });
}

/** One order of the own store. `poll` says after how many milliseconds to ask again, for the order as it is. */
export function useShopOrder(id: MaybeRefOrGetter<string>, poll: (order: ShopOrder) => number | false = () => false) {
  return useQuery({
    queryKey: computed(() => shopKeys.order(toValue(id))),
    queryFn: ({ signal }) => callApi(shopEndpoints.show, { params: { id: toValue(id) }, signal }),
    refetchInterval: ({ state }) => (state.data ? poll(state.data) : false),
  });
}

export function useShopActs() {
  const client = useQueryClient();

  async function renewing<T>(act: Promise<T>): Promise<T> {
    try {
      return await act;
    } finally {
      // What was refused was refused because the counts on the page are old.
      await client.invalidateQueries({ queryKey: shopKeys.all });
    }
  }

  return {
    place: (body: PlaceOrder, idempotencyKey: string) =>
      renewing(callApi(shopEndpoints.place, { body, idempotencyKey })),
    pay: (id: string) => callApi(shopEndpoints.pay, { params: { id } }),
    cancel: (id: string) => renewing(callApi(shopEndpoints.cancel, { params: { id } })),
  };
}
