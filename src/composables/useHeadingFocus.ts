import { nextTick } from 'vue';
import { useRouter } from 'vue-router';

/** After navigation, moves focus to the new page's heading, so that screen readers and Tab go on from there. */
export function useHeadingFocus(): void {
  const router = useRouter();
  router.afterEach(async (to, from, failure) => {
    if (failure || from.matched.length === 0 || to.path === from.path) return;
    await nextTick();
    const heading = document.querySelector<HTMLElement>('main h1') ?? document.querySelector<HTMLElement>('main');
    heading?.setAttribute('tabindex', '-1');
    heading?.focus({ preventScroll: true });
  });
}
