import type { Page } from 'playwright-core';
import type { Role } from '../../../shared/permissions.ts';
import type { Site } from './site.ts';

/** A page of the product: the name of its route, who looks at it, and how to find its address in any demo farm. */
export interface Stop {
  name: string;
  /** Null: not signed in. */
  as: Role | null;
  path: (site: Site, page: Page) => string | Promise<string>;
}

interface Found {
  id: string;
  code: string;
}

/** The first record of a list that fits; a demo farm without one is a mistake of the demo. */
async function first<T extends object = Found>(
  site: Site,
  page: Page,
  list: string,
  fits: (item: T) => boolean = () => true,
): Promise<T> {
  const { items } = await site.get<{ items: T[] }>(page, list);
  const found = items.find(fits);
  if (!found) throw new Error(`${list} has no record that fits.`);
  return found;
}

const at = (name: string, as: Role | null, path: string): Stop => ({ name, as, path: () => path });
/** A page about the first record of a list. */
const of = (name: string, as: Role, list: string, pathOf: (item: Found) => string): Stop => ({
  ...{ name, as },
  path: async (site, page) => pathOf(await first(site, page, list)),
});

const SYSTEMS = '/api/systems';
const LIVE_RESERVOIRS = '/api/reservoirs';
/** Grown enough to have a history: saleable pieces stand on racks. */
const BATCHES = '/api/batches?state=saleable';

interface BatchOfLine extends Found {
  line: { code: string };
}

/** A plug that stands on a rack, of a batch that fits. */
export async function somePlug(
  site: Site,
  page: Page,
  fits: (batch: BatchOfLine) => boolean = () => true,
): Promise<string> {
  const batch = await first(site, page, BATCHES, fits);
  const plug = await first<{ code: string; state: string }>(
    ...([site, page, `/api/batches/${batch.id}/plugs`] as const),
    ({ state }) => state === 'rack',
  );
  return plug.code;
}

export const STOPS: readonly Stop[] = [
  at('sign-in', null, '/sign-in'),
  at('request-reset', null, '/reset-password'),
  at('reset-password', null, '/reset-password/a-link-that-nobody-has-used-yet-0123456789ab'),
  at('no-permission', null, '/no-permission?from=/costs'),
  at('not-found', null, '/nowhere'),

  at('today', 'grower', '/today'),
  at('water', 'grower', '/water'),
  at('system-new', 'grower', '/water/systems/new'),
  of('system', 'grower', SYSTEMS, ({ id }) => `/water/systems/${id}`),
  of('system-plan', 'grower', SYSTEMS, ({ id }) => `/water/systems/${id}/plan`),
  of('system-edit', 'grower', SYSTEMS, ({ id }) => `/water/systems/${id}/edit`),
  of('log-readings', 'grower', SYSTEMS, ({ id }) => `/water/log?system=${id}`),
  of('mix-limewater', 'grower', SYSTEMS, ({ id }) => `/water/mix?system=${id}`),
  at('readings', 'grower', '/water/readings'),
  at('reading-import', 'grower', '/water/import'),
  at('dosing', 'grower', '/water/dosing'),
  at('water-changes', 'grower', '/water/changes'),
  at('make-up-water', 'grower', '/water/make-up'),
  at('test-methods', 'grower', '/water/methods'),
  of('bench', 'grower', SYSTEMS, ({ id }) => `/water/bench?tool=dose&system=${id}`),
  of('reservoir', 'grower', LIVE_RESERVOIRS, ({ id }) => `/water/reservoirs/${id}`),
  at('stock', 'grower', '/stock'),
  at('line-new', 'grower', '/stock/lines/new'),
  of('line', 'grower', '/api/lines', ({ id }) => `/stock/lines/${id}`),
  of('line-edit', 'grower', '/api/lines', ({ id }) => `/stock/lines/${id}/edit`),
  of('colony', 'grower', '/api/colonies', ({ id }) => `/stock/mothers/${id}`),
  at('batches', 'grower', '/stock/batches'),
  of('batch', 'grower', BATCHES, ({ id }) => `/stock/batches/${id}`),
  { name: 'plug', as: 'grower', path: async (site, page) => `/stock/plugs/${await somePlug(site, page)}` },
  at('survival', 'grower', '/stock/survivors'),
  at('racks', 'grower', '/stock/racks'),
  {
    name: 'rack',
    as: 'grower',
    path: async (site, page) => {
      const rack = await first<Found & { plugs: number }>(site, page, '/api/racks', ({ plugs }) => plugs > 40);
      return `/stock/racks/${rack.id}`;
    },
  },
  of('rack-address', 'grower', '/api/racks', ({ code }) => `/r/${code}`),
  at('tank-address', 'grower', '/t/no-such-tank'),
  at('box-address', 'sales', '/b/0-1'),
  of('labels', 'grower', BATCHES, ({ id }) => `/labels?batchId=${id}`),
  at('label-stocks', 'grower', '/labels/stocks'),
  at('label-stock-new', 'grower', '/labels/stocks/new'),
  at('label-stock', 'grower', '/labels/stocks/none'),
  at('label-fit', 'grower', '/labels/stocks/a4-65/printers'),
  at('cutting', 'grower', '/cutting'),
  of('log-cut', 'grower', '/api/colonies', ({ id }) => `/cutting/log?colonyId=${id}`),
  at('scan', 'grower', '/scan'),
  at('tasks', 'grower', '/tasks'),
  at('alerts', 'grower', '/alerts'),
  at('supply-receive', 'grower', '/supplies/receive'),
  at('supply-new', 'grower', '/supplies/new'),
  of('supply-edit', 'grower', '/api/supplies/items', ({ id }) => `/supplies/${id}/edit`),

  at('supplies', 'viewer', '/supplies'),
  of('supply', 'viewer', '/api/supplies/items', ({ id }) => `/supplies/${id}`),
  at('costs', 'viewer', '/costs'),
  at('audit-log', 'viewer', '/settings/audit-log'),
  at('account', 'viewer', '/account'),

  at('orders', 'sales', '/orders'),
  of('order', 'sales', '/api/orders?state=shipped', ({ id }) => `/orders/${id}`),
  of('order-pick', 'sales', '/api/orders?state=paid', ({ id }) => `/orders/${id}/pick`),
  at('stores', 'sales', '/stores'),
  of('store', 'sales', '/api/stores', ({ id }) => `/stores/${id}`),
  at('listings', 'owner', '/listings'),

  at('settings', 'owner', '/settings'),
  at('farm-settings', 'owner', '/settings/farm'),
  at('water-rules', 'owner', '/settings/water-rules'),
  at('people', 'owner', '/settings/people'),

  at('shop', 'buyer', '/shop'),
  at('shop-checkout', 'buyer', '/shop/checkout'),
  at('shop-orders', 'buyer', '/shop/orders'),
  of('shop-order', 'buyer', '/api/shop/orders', ({ id }) => `/shop/orders/${id}`),
];

/** Waits until a page shows its own words: headed, loaded, and in its own type. */
export async function settled(page: Page): Promise<void> {
  await page.waitForFunction(
    () =>
      Boolean(document.querySelector('h1')?.textContent.trim()) &&
      !document.querySelector('.app-loading, [aria-busy="true"]'),
  );
  await page.evaluate(() => document.fonts.ready);
}
