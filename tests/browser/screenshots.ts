import { mkdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { parseArgs } from 'node:util';
import type { Page } from 'playwright-core';
import { ensureBuilt, root } from '../../server/tasks/prepare.mjs';
import { DEVICES, Site, type Device, type Theme } from './support/site.ts';
import { settled, STOPS, type Stop } from './support/stops.ts';
import { makeTemplate, removeFolder } from './support/template.ts';

const { values: options } = parseArgs({
  options: { readme: { type: 'boolean', default: false }, only: { type: 'string' } },
});

/** The few that the README shows, small enough for a checkout. */
const README: readonly { name: string; device: Device; theme: Theme }[] = [
  { name: 'today', device: 'phone', theme: 'light' },
  { name: 'system', device: 'desktop', theme: 'light' },
  { name: 'rack', device: 'phone', theme: 'light' },
  { name: 'plug', device: 'phone', theme: 'dark' },
  { name: 'mix-limewater', device: 'phone', theme: 'light' },
  { name: 'costs', device: 'desktop', theme: 'dark' },
  { name: 'shop', device: 'desktop', theme: 'light' },
];

/** Pictures of every page as the role it is for, on a phone and a desk, light and dark. */
async function main(): Promise<void> {
  ensureBuilt();
  const template = await makeTemplate();
  const site = await Site.start(template);
  try {
    if (options.readme) await takeReadmePictures(site);
    else await takeAll(site);
  } finally {
    await site.close();
    removeFolder(template);
  }
}

async function takeAll(site: Site): Promise<void> {
  const only = options.only?.split(',');
  const stops = STOPS.filter(({ name }) => !only || only.includes(name));
  const roles = [...new Set(stops.map(({ as }) => as))];
  for (const device of Object.keys(DEVICES) as Device[]) {
    for (const role of roles) {
      const page = await site.newPage({ ...(role ? { as: role } : {}), device });
      for (const stop of stops.filter(({ as }) => as === role)) {
        await open(site, page, stop);
        for (const theme of ['light', 'dark'] as const) {
          await page.emulateMedia({ colorScheme: theme });
          const file = path.join(root, 'data', 'screenshots', `${device}-${theme}`, `${stop.name}.png`);
          await page.screenshot({ path: file, fullPage: true, timeout: 60_000 });
        }
        console.log(`${device} ${stop.name}`);
      }
      await page.context().close();
    }
  }
  report(site);
}

async function takeReadmePictures(site: Site): Promise<void> {
  const folder = path.join(root, 'tests', 'screenshots');
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true });
  for (const { name, device, theme } of README) {
    const stop = STOPS.find((each) => each.name === name);
    if (!stop) throw new Error(`There is no page ${name}.`);
    const page = await site.newPage({ ...(stop.as ? { as: stop.as } : {}), device, theme });
    await open(site, page, stop);
    await page.screenshot({ path: path.join(folder, `${name}.png`) });
    await page.context().close();
  }
  report(site);
}

async function open(site: Site, page: Page, stop: Stop): Promise<void> {
  await page.goto(await stop.path(site, page));
  await settled(page);
}

function report(site: Site): void {
  for (const fault of site.faults.take()) console.error(fault);
}

await main();
