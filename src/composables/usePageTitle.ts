import { type MaybeRefOrGetter, toValue, watchEffect } from 'vue';

const PRODUCT = 'Limestead';

export function setPageTitle(title: string | undefined): void {
  document.title = title ? `${title} · ${PRODUCT}` : PRODUCT;
}

/** Keeps the browser's title in step with the page's own. */
export function usePageTitle(title: MaybeRefOrGetter<string | undefined>): void {
  watchEffect(() => {
    const current = toValue(title);
    if (current) setPageTitle(current);
  });
}
