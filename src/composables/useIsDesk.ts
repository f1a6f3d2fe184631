import { useMediaQuery } from '@vueuse/core';
import type { Ref } from 'vue';

/** Wide enough for the spine and dense tables; keep in step with the media queries in styles/. */
export function useIsDesk(): Readonly<Ref<boolean>> {
  return useMediaQuery('(min-width: 900px)');
}
