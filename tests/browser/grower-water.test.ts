import { expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import { heading, toast } from './support/acts.ts';
import { useSite } from './support/use-site.ts';

const site = useSite();

interface Reservoir {
  id: string;
  code: string;
  systemId: string;
  state: string;
  levelL: number;
  volumeL: number;
}

/** A system with one reservoir online and another beside it. */
async function pairOfReservoirs(page: Page): Promise<{ online: Reservoir; other: Reservoir }> {
  const { items } = await site().get<{ items: Reservoir[] }>(page, '/api/reservoirs');
  for (const online of items.filter(({ state }) => state === 'online')) {
    const other = items.find(({ id, systemId }) => id !== online.id && systemId === online.systemId);
    if (other) return { online, other };
  }
  throw new Error('The demo has no system with two reservoirs.');
}

it('when readings are logged on a phone, they stand on the page of the system, and Undo takes them back', async () => {
  const page = await site().newPage({ as: 'grower', device: 'phone' });
  const { online } = await pairOfReservoirs(page);
  await page.goto(`/water/systems/${online.systemId}`);
  await page.getByRole('link', { name: 'Log readings' }).click();
  await heading(page, 'Log readings');
  await page.getByLabel('Alkalinity').fill('8,3');
  await page.getByLabel('Magnesium').fill('1340');
  await page.getByRole('button', { name: 'Log readings' }).click();

  const message = await toast(page, '2 readings logged.');
  await page.waitForURL(`**/water/systems/${online.systemId}`);
  const newest = async () => {
    const { items } = await site().get<{ items: { parameter: string; value: number }[] }>(
      page,
      `/api/readings?systemId=${online.systemId}&limit=2`,
    );
    return items.map(({ parameter, value }) => `${parameter} ${value.toFixed(2)}`).sort();
  };
  // 8.3 dKH at 2.8 dKH to 1 meq/L.
  expect(await newest()).toEqual(['alkalinity 2.96', 'magnesium 1340.00']);

  await message.getByRole('button', { name: 'Undo' }).click();
  await toast(page, 'Undone.');
  expect(await newest()).not.toContain('magnesium 1340.00');
});

it('when limewater is mixed and put online on a phone, the reservoirs have swapped', async () => {
  const page = await site().newPage({ as: 'grower', device: 'phone' });
  const { online, other } = await pairOfReservoirs(page);
  await page.goto(`/water/mix?system=${online.systemId}&reservoir=${other.id}`);
  await heading(page, 'Mix limewater');
  await page.getByLabel('Left in it').fill('0');
  await page.getByLabel('Water added').fill(String(Math.floor(other.volumeL * 0.9)));
  await page.getByLabel('Lime, weighed').fill('20');
  await page.getByLabel('Vinegar, if any').fill('0');
  await page.getByRole('button', { name: 'Log this mix' }).click();
  await heading(page, other.code);
  await page.getByText('Limewater mixed').first().waitFor();

  await page.getByRole('button', { name: 'Put online' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Put online' }).click();
  await toast(page, `${other.code} is online.`);

  await page.goto(`/water/systems/${online.systemId}`);
  const state = async (id: string) => (await site().get<Reservoir>(page, `/api/reservoirs/${id}`)).state;
  expect(await state(other.id)).toBe('online');
  expect(await state(online.id)).not.toBe('online');
});

it('when a system has been tested for months, its page says its demand with its uncertainty', async () => {
  const page = await site().newPage({ as: 'grower', device: 'phone' });
  const { online } = await pairOfReservoirs(page);
  await page.goto(`/water/systems/${online.systemId}`);

  const sentence = page.locator('.page-sentence');
  await sentence.getByText('±').first().waitFor();

  expect(await sentence.innerText()).toMatch(/\d ± \d.*dKH/);
});
