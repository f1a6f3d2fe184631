import type { Access } from '@shared/permissions.ts';
import type { PlaceName } from '@/router/places.ts';

declare module 'vue-router' {
  interface RouteMeta {
    /** Shown as "Title · Limestead"; a page with a name of its own replaces it through AppPage. */
    title?: string;
    /** Who may open it. A route without it needs a signed-in person. */
    access?: Access;
    /** 'plain' pages stand alone, without the places around them. */
    layout?: 'shell' | 'plain';
    /** The place of the menu that is marked while this page is open. */
    place?: PlaceName;
  }
}
