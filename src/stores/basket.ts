import { useLocalStorage } from '@vueuse/core';
import { defineStore } from 'pinia';
import { computed } from 'vue';
import { useSessionStore } from '@/stores/session.ts';

type Basket = Record<string, number>;

/** What a buyer has chosen and not ordered yet: pieces by offer, kept on this device for each store. */
export const useBasketStore = defineStore('basket', () => {
  const session = useSessionStore();
  const baskets = useLocalStorage<Record<string, Basket>>('limestead.baskets', {});
  const storeId = computed(() => session.user?.storeId ?? '');
  const pieces = computed<Basket>(() => baskets.value[storeId.value] ?? {});
  const total = computed(() => Object.values(pieces.value).reduce((sum, count) => sum + count, 0));

  function choose(listingId: string, count: number): void {
    const { [listingId]: _before, ...others } = pieces.value;
    replace(count > 0 ? { ...others, [listingId]: count } : others);
  }

  function clear(): void {
    replace({});
  }

  function replace(basket: Basket): void {
    baskets.value = { ...baskets.value, [storeId.value]: basket };
  }

  return { pieces, total, choose, clear };
});
