import { expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import type { OrderPage, PickPlan } from '../../shared/contracts/orders.ts';
import { heading, toast } from './support/acts.ts';
import { somePlug } from './support/stops.ts';
import { useSite } from './support/use-site.ts';

const site = useSite();

async function paidOrder(page: Page): Promise<string> {
  const { items } = await site().get<{ items: { id: string }[] }>(page, '/api/orders?state=paid');
  const [order] = items;
  if (!order) throw new Error('The demo has no paid order.');
  return order.id;
}

async function type(page: Page, code: string): Promise<void> {
  await page.getByLabel('Code of a plug').fill(code);
  await page.getByRole('button', { name: 'Read' }).click();
}

it('when an order is picked by scans, wrong plugs are refused, and it is packed and shipped', async () => {
  const page = await site().newPage({ as: 'sales' });
  const id = await paidOrder(page);
  await page.goto(`/orders/${id}`);
  await page.getByRole('link', { name: 'Pick', exact: true }).click();
  await heading(page, /^Pick order/);
  const plan = await site().get<PickPlan>(page, `/api/orders/${id}/picking`);

  // A plug of a line that this order does not want, or of none at all.
  site().faults.allow(/status of 4(04|09)/);
  await type(page, '7Q2-KX9M');
  await page.locator('.pick-result').getByText('Not picked').waitFor();
  const other = await somePlug(site(), page, ({ line }) => !plan.lines.some(({ lineCode }) => lineCode === line.code));
  await type(page, other);
  await page.locator('.pick-result').getByText('Wrong plug').waitFor();

  let picked = 0;
  for (const code of await codesFor(page, plan)) {
    await type(page, code);
    picked += 1;
    await page.getByRole('progressbar', { name: `${picked} of ${plan.wanted} picked` }).waitFor();
  }
  await page.getByRole('button', { name: 'Pack', exact: true }).click();
  await page.getByRole('dialog').getByLabel('Boxes', { exact: true }).fill('1');
  await page.getByRole('dialog').getByRole('button', { name: 'Packed' }).click();
  await toast(page, 'is packed');

  await page.getByRole('button', { name: 'Ship', exact: true }).click();
  await page.getByRole('dialog').getByLabel('Carrier').fill('Night van');
  await page.getByRole('dialog').getByRole('button', { name: 'Ship' }).click();
  await toast(page, 'on its way');
  await page.getByRole('link', { name: /^Invoice / }).waitFor();
  const order = await site().get<OrderPage>(page, `/api/orders/${id}`);
  expect(order.state).toBe('shipped');
});

interface BatchPlug {
  code: string;
  rackCode: string | null;
}

/** Plugs of the promised batches that stand where the plan says. */
async function codesFor(page: Page, { stops }: PickPlan): Promise<string[]> {
  const codes: string[] = [];
  for (const { rackCode, items } of stops) {
    for (const { batchCode, pieces } of items) {
      const { plugs } = await batchOf(page, batchCode);
      codes.push(...plugs.flatMap((plug) => (plug.rackCode === rackCode ? [plug.code] : [])).slice(0, pieces));
    }
  }
  return codes;
}

async function batchOf(page: Page, code: string): Promise<{ plugs: BatchPlug[] }> {
  const { items } = await site().get<{ items: { id: string }[] }>(page, `/api/batches?search=${code}`);
  const { items: plugs } = await site().get<{ items: BatchPlug[] }>(page, `/api/batches/${items[0]?.id ?? ''}/plugs`);
  return { plugs };
}
