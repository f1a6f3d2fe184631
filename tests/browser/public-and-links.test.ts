import { expect, it } from 'vitest';
import type { PublicPlug } from '../../shared/contracts/public.ts';
import { expectWellMade } from './support/accessibility.ts';
import { heading } from './support/acts.ts';
import { somePlug } from './support/stops.ts';
import { useSite } from './support/use-site.ts';

const site = useSite();

it('when anyone opens the address on a plug, they see its public side and nothing of the farm’s inside', async () => {
  const staff = await site().newPage({ as: 'grower' });
  await staff.goto('/today');
  const code = await somePlug(site(), staff);
  const page = await site().newPage({ device: 'phone' });
  await page.goto(`/p/${code}`);
  const plug = await site().get<PublicPlug>(page, `/api/public/plugs/${code}`);

  await heading(page, plug.tradeName);
  expect(await page.title()).toBe(`${plug.tradeName} · Limestead`);
  const text = await page.locator('body').innerText();
  expect(text).toContain(plug.taxon);
  expect(text).not.toMatch(/€|EUR|rack|cost|alive/i);
  await expectWellMade(page);
});

it('when staff open the same address, they stand on the plug’s own page', async () => {
  const page = await site().newPage({ as: 'grower', device: 'phone' });
  await page.goto('/today');
  const code = await somePlug(site(), page);

  await page.goto(`/P/${code}`);

  await page.waitForURL(`**/stock/plugs/${code}`);
});

it('when the code on an address is not one of the farm’s, the page says so and takes another', async () => {
  site().faults.allow(/status of 404/);
  const page = await site().newPage();
  await page.goto('/p/0000000');

  await heading(page, 'This code is not known here');
  expect(await page.title()).toBe('Code not known · Limestead');
});

it('when a link is opened without being signed in, signing in leads on to it', async () => {
  const page = await site().newPage();
  await page.goto('/stock/batches?state=saleable');
  await heading(page, 'Sign in');
  await page
    .getByRole('button', { name: /Grower/ })
    .first()
    .click();

  await heading(page, 'Batches');
  expect(new URL(page.url()).search).toBe('?state=saleable');
});

it('when pages are walked through, each has its title and place, and Back and reload keep both', async () => {
  const page = await site().newPage({ as: 'grower' });
  await page.goto('/stock');
  await page.getByRole('link', { name: 'Water', exact: true }).click();
  await heading(page, 'Water');
  expect(await page.title()).toBe('Water · Limestead');
  const current = page.locator('[aria-current="true"]');
  expect(await current.allInnerTexts()).toEqual(['Water']);

  await page.goBack();
  await heading(page, 'Stock');
  expect(await page.title()).toBe('Stock · Limestead');
  await page.reload();
  await heading(page, 'Stock');
  expect(await current.allInnerTexts()).toEqual(['Stock']);
});

it('when a role may not see a page, its link leads to words about that and no data', async () => {
  const page = await site().newPage({ as: 'grower' });

  await page.goto('/listings');

  await heading(page, 'Not open to you');
});

it('when an address leads nowhere, the page says so and leads home', async () => {
  const page = await site().newPage({ as: 'viewer', device: 'phone' });

  await page.goto('/no/such/page');

  await heading(page, /./);
  expect(await page.title()).toBe('Page not found · Limestead');
});
