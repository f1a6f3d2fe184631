import type { RouteLocationNormalized, RouteLocationRaw, Router } from 'vue-router';
import { PLACES } from '@/router/places.ts';
import { useSessionStore } from '@/stores/session.ts';

/** The first place that this person may use: where they land after sign-in. */
export function homeOf(router: Router): RouteLocationRaw {
  const session = useSessionStore();
  const place = PLACES.find(({ name, access }) => session.can(access) && router.hasRoute(name));
  return { name: place?.name ?? 'account' };
}

/** Only paths of this site: a link must not be able to send a person elsewhere after sign-in. */
export function safeNext(next: unknown): string | null {
  return typeof next === 'string' && /^\/(?![/\\])/.test(next) ? next : null;
}

/** Where to go instead, or true. It only spares people a refusal: the server decides. */
export async function guard(to: RouteLocationNormalized, router: Router): Promise<true | RouteLocationRaw> {
  const session = useSessionStore();
  // Without an answer the page still opens and says that the server can't be reached.
  if (!session.isLoaded) await session.load().catch(() => undefined);

  if (session.needsSetup) return to.name === 'set-up' ? true : { name: 'set-up' };
  if (to.name === 'set-up') return homeOf(router);
  if (to.name === 'sign-in' && session.user) return safeNext(to.query.next) ?? homeOf(router);

  const access = to.meta.access ?? 'account.own';
  if (!session.user && access !== 'public') return signInFor(to);
  if (!session.can(access)) return { name: 'no-permission', query: { from: to.fullPath }, replace: true };
  return to.name === 'home' ? homeOf(router) : true;
}

function signInFor(to: RouteLocationNormalized): RouteLocationRaw {
  return { name: 'sign-in', query: to.fullPath === '/' ? {} : { next: to.fullPath } };
}
