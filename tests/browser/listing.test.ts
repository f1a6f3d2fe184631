import { expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import { useSite } from './support/use-site.ts';

const site = useSite();

async function openFirstOffer(page: Page): Promise<void> {
  await page.goto('/listings');
  await page
    .getByRole('button', { name: /^Change the offer of/ })
    .first()
    .click();
  await page.getByRole('dialog').waitFor();
}

async function priceOf(page: Page): Promise<number> {
  const { items } = await site().get<{ items: { priceMinor: number }[] }>(page, '/api/listings');
  return items[0]?.priceMinor ?? Number.NaN;
}

it('when the owner prices an offer, sales sees the new price and stores pay it', async () => {
  const owner = await site().newPage({ as: 'owner' });
  await openFirstOffer(owner);

  await owner.getByRole('dialog').getByLabel('Price each').fill('33.50');
  await owner.getByRole('dialog').getByRole('button', { name: 'Save' }).click();
  await owner.getByRole('dialog').waitFor({ state: 'hidden' });

  const sales = await site().newPage({ as: 'sales' });
  await sales.goto('/listings');
  await sales
    .getByRole('row', { name: /33\.50/ })
    .first()
    .waitFor();
  expect(await sales.getByRole('button', { name: /^Change the offer of/ }).count()).toBe(0);
  expect(await priceOf(sales)).toBe(3350);
});

it('when two people change one offer, the second sees both versions and decides', async () => {
  const [first, second] = [await site().newPage({ as: 'owner' }), await site().newPage({ as: 'owner' })];
  await openFirstOffer(first);
  await openFirstOffer(second);
  await first.getByRole('dialog').getByLabel('Price each').fill('41');
  await first.getByRole('dialog').getByRole('button', { name: 'Save' }).click();
  await first.getByRole('dialog').waitFor({ state: 'hidden' });

  site().faults.allow(/status of 412/);
  await second.getByRole('dialog').getByLabel('Price each').fill('42');
  await second.getByRole('dialog').getByRole('button', { name: 'Save' }).click();
  await second.getByText('This was changed by someone else').waitFor();
  expect(await priceOf(second)).toBe(4100);

  await second.getByRole('button', { name: 'Keep mine' }).click();
  await second.getByRole('dialog').waitFor({ state: 'hidden' });
  expect(await priceOf(second)).toBe(4200);
});

it('when the connection is gone, what was entered stays and the page says so; when it is back, saving goes on', async () => {
  const page = await site().newPage({ as: 'owner' });
  await openFirstOffer(page);
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('Price each').fill('27');

  site().faults.allow(/ERR_INTERNET_DISCONNECTED/);
  await page.context().setOffline(true);
  await dialog.getByRole('button', { name: 'Save' }).click();
  await dialog.getByText('No connection to the farm').waitFor();
  expect(await dialog.getByLabel('Price each').inputValue()).toBe('27');

  await page.context().setOffline(false);
  await dialog.getByRole('button', { name: 'Save' }).click();
  await dialog.waitFor({ state: 'hidden' });
  expect(await priceOf(page)).toBe(2700);
});
