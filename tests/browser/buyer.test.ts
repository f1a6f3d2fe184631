import { expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import type { ShopOrder } from '../../shared/contracts/shop.ts';
import { heading } from './support/acts.ts';
import type { Device } from './support/site.ts';
import { useSite } from './support/use-site.ts';

const site = useSite();

/** Types a test card into the hosted page of the payment service. */
async function payWith(page: Page, number: string): Promise<void> {
  await page.getByLabel('Card number').fill(number);
  await page.getByLabel('Expiry').fill('12 / 34');
  await page.getByLabel('CVC').fill('123');
  await page.getByLabel('Name on card').fill('Noor Aydin');
  await page.getByRole('button', { name: /^Pay / }).click();
}

it.each<Device>(['phone', 'desktop'])(
  'when a store orders on a %s and its first card is declined, it pays by a second one, gets a mail and sees it paid',
  async (device) => {
    const page = await site().newPage({ as: 'buyer', device });
    await page.goto('/shop');
    await heading(page, 'Availability');
    const more = page.getByRole('button', { name: /^One more of/ }).and(page.locator(':enabled'));
    await more.first().click();
    await more.first().click();
    await page.getByText('2 corals', { exact: true }).waitFor();
    await page.getByRole('link', { name: 'Look at your order' }).click();
    await heading(page, 'Your order');
    await page.getByRole('button', { name: 'Place the order' }).click();
    await heading(page, /^Order \d+$/);
    const address = page.url();

    await page.getByRole('button', { name: 'Pay now' }).click();
    await page.getByRole('heading', { name: 'Test payment page' }).waitFor();
    site().faults.allow(/status of 402/);
    await payWith(page, '4000000000000002');
    await page.getByRole('alert').filter({ hasText: 'declined' }).waitFor();
    await payWith(page, '4242424242424242');

    await page.waitForURL((url) => url.href.startsWith(address));
    await page.getByText('paid', { exact: true }).first().waitFor();
    const id = new URL(address).pathname.split('/').at(-1) ?? '';
    const order = await site().get<ShopOrder>(page, `/api/shop/orders/${id}`);
    expect(order.state).toBe('paid');
    await site().mailTo('example.com', new RegExp(`${order.number}.*paid|paid.*${order.number}`, 'i'));
  },
);

it('when an order was shipped, its invoice opens as a PDF with its number', async () => {
  const page = await site().newPage({ as: 'buyer' });
  await page.goto('/shop/orders');
  const { items } = await site().get<{ items: { id: string; state: string }[] }>(page, '/api/shop/orders');
  const shipped = items.find(({ state }) => state === 'shipped');
  await page.goto(`/shop/orders/${shipped?.id ?? ''}`);

  const link = page.getByRole('link', { name: /^Invoice / });
  const file = await page.request.get((await link.getAttribute('href')) ?? '');

  expect(file.headers()['content-type']).toBe('application/pdf');
  expect((await file.body()).subarray(0, 5).toString()).toBe('%PDF-');
});

it('when nothing is chosen, the order page says so and leads back to what is there', async () => {
  const page = await site().newPage({ as: 'buyer', device: 'phone' });
  await page.goto('/shop/checkout');
  await page.getByText('Nothing is chosen yet').waitFor();

  await page.getByRole('link', { name: 'Look at what is there' }).click();

  await heading(page, 'Availability');
});
