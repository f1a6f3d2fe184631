import { createRouter, createWebHistory } from 'vue-router';
import { setPageTitle } from '@/composables/usePageTitle.ts';
import { reloadOnceForMissingChunk } from '@/router/chunk-reload.ts';
import { guard } from '@/router/guards.ts';
import { routes } from '@/router/routes.ts';

export const router = createRouter({
  history: createWebHistory(),
  routes,
  scrollBehavior(to, from, saved) {
    if (saved) return saved;
    if (to.hash) return { el: to.hash, top: 16 };
    // Filters and sorting live in the query: changing them keeps the place on the page.
    return to.path === from.path ? false : { top: 0 };
  },
});

router.beforeEach((to) => guard(to, router));
router.afterEach((to, _from, failure) => {
  if (!failure) setPageTitle(to.meta.title);
});
router.onError((error: unknown, to) => {
  reloadOnceForMissingChunk(error, to.fullPath);
});
