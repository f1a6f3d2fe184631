import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Page } from 'playwright-core';
import type { RouteRecordRaw } from 'vue-router';
import { describe, expect, it } from 'vitest';
import type { Role } from '../../shared/permissions.ts';
import { routes } from '../../src/router/routes.ts';
import { DEVICES, type Device } from './support/site.ts';
import { settled, STOPS, type Stop } from './support/stops.ts';
import { useSite } from './support/use-site.ts';

const site = useSite();
const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
/** WCAG 2.2, levels A and AA. */
const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

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

      expect(await page.title()).toMatch(/^\S.* · Limestead$/);
      expect(await page.locator('h1').count()).toBe(1);
      expect(await tooWide(page)).toEqual([]);
      expect(await violations(page)).toEqual([]);
      await page.emulateMedia({ colorScheme: 'dark' });
      await page.locator('.v-theme--limesteadDark').first().waitFor();
      // Colours must have arrived before they are compared.
      await page.waitForFunction(() => document.getAnimations().every(({ playState }) => playState !== 'running'));
      expect(await violations(page)).toEqual([]);
    },
  );
});

it('every page that has a name is looked at here', () => {
  const elsewhere = ['home', 'set-up', 'accept-invitation', 'plug-address'];
  const named = (records: readonly RouteRecordRaw[]): string[] =>
    records.flatMap(({ name, children = [] }) => [...(name ? [String(name)] : []), ...named(children)]);

  expect(
    named(routes)
      .filter((name) => !elsewhere.includes(name))
      .sort(),
  ).toEqual(STOPS.map(({ name }: Stop) => name).sort());
});

/** What sticks out to the right of the screen and makes the page scroll sideways. */
function tooWide(page: Page): Promise<string[]> {
  return page.evaluate(() => {
    const { scrollWidth, clientWidth } = document.documentElement;
    if (scrollWidth <= clientWidth) return [];
    return [...document.querySelectorAll('body *')]
      .filter((element) => element.getBoundingClientRect().right > clientWidth + 1)
      .map((element) => `${element.tagName.toLowerCase()}.${element.className}`)
      .slice(0, 5);
  });
}

async function violations(page: Page): Promise<string[]> {
  // Put in anew after each navigation; the page's own policy does not hold for the tester.
  if (!(await page.evaluate(() => 'axe' in window))) await page.evaluate(axe);
  return page.evaluate(async (tags) => {
    interface Axe {
      run(
        where: Document,
        options: object,
      ): Promise<{ violations: { id: string; nodes: { target: unknown[]; failureSummary?: string }[] }[] }>;
    }
    const { axe: tester } = window as unknown as { axe: Axe };
    const { violations: found } = await tester.run(document, { runOnly: { type: 'tag', values: tags } });
    return found.flatMap(({ id, nodes }) =>
      nodes.map(({ target, failureSummary = '' }) => `${id}: ${target.join(' ')}: ${failureSummary.slice(0, 300)}`),
    );
  }, TAGS);
}
