import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Page } from 'playwright-core';
import { expect } from 'vitest';

const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
/** WCAG 2.2, levels A and AA. */
const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/** Holds the open page to what every page owes: one heading, a title, no sideways scroll, and nothing for axe in either theme. */
export async function expectWellMade(page: Page): Promise<void> {
  expect(await page.title()).toMatch(/^\S.* · Limestead$/);
  expect(await page.locator('h1').count()).toBe(1);
  expect(await tooWide(page)).toEqual([]);
  expect(await violations(page)).toEqual([]);
  await page.emulateMedia({ colorScheme: 'dark' });
  await page.locator('.v-theme--limesteadDark').first().waitFor();
  // Colours must have arrived before they are compared.
  await page.waitForFunction(() => document.getAnimations().every(({ playState }) => playState !== 'running'));
  expect(await violations(page)).toEqual([]);
}

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
