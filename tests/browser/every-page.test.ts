import type { Page } from 'playwright-core';
import type { RouteRecordRaw } from 'vue-router';
import { describe, expect, it } from 'vitest';
import type { Role } from '../../shared/permissions.ts';
import { routes } from '../../src/router/routes.ts';
import { expectWellMade } from './support/accessibility.ts';
import { DEVICES, type Device } from './support/site.ts';
import { settled, STOPS, type Stop } from './support/stops.ts';
import { useSite } from './support/use-site.ts';

const site = useSite();
/** One page for each role and device, since signing in and starting the client take longest. */
const pages = new Map<string, Promise<Page>>();
function pageFor(role: Role | null, device: Device): Promise<Page> {
  const key = `${role ?? 'nobody'} ${device}`;
  const open = pages.get(key) ?? site().newPage({ ...(role ? { as: role } : {}), device });
  pages.set(key, open);
  return open;
}

describe.each(Object.keys(DEVICES) as Device[])('on a %s', (device) => {
  it.each(STOPS.map((stop) => [stop.name, stop] as const))(
    '%s is headed, titled, as wide as the screen and accessible, light and dark',
    async (_, stop) => {
      const page = await pageFor(stop.as, device);
      await page.emulateMedia({ colorScheme: 'light' });
      await page.goto(await stop.path(site(), page));
      await settled(page);

      await expectWellMade(page);
    },
  );
});

it('every page that has a name is looked at here, but for those that other tests look at on their way', () => {
  const elsewhere = ['home', 'set-up', 'accept-invitation', 'plug-address'];
  const named = (records: readonly RouteRecordRaw[]): string[] =>
    records.flatMap(({ name, children = [] }) => [...(name ? [String(name)] : []), ...named(children)]);

  expect(
    named(routes)
      .filter((name) => !elsewhere.includes(name))
      .sort(),
  ).toEqual(STOPS.map(({ name }: Stop) => name).sort());
});
