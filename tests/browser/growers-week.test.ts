import type { Page } from 'playwright-core';
import { expect, it } from 'vitest';
import { heading, toast } from './support/acts.ts';
import { useSite } from './support/use-site.ts';
import { logTests, tendSystem, type Tending } from './support/water.ts';

const site = useSite();

const sheetOf = (page: Page, title: string) =>
  page.locator('.app-sheet').filter({ has: page.getByRole('heading', { level: 2, name: title }) });

/** The ± of the demand that the page of a system tells. */
async function toldError(page: Page, systemId: string): Promise<number> {
  await page.goto(`/water/systems/${systemId}`);
  const told = page.locator('.page-sentence').getByText(/±/).first();
  await told.waitFor();
  return Number(/± ([\d.]+)/.exec(await told.innerText())?.[1]);
}

it('when a grower tests through the week, takes the advice, mixes it and puts it online, the demand grows surer', async () => {
  const page = await site().newPage({ as: 'grower', device: 'phone' });
  const tending: Tending = { code: 'GW', days: 21, level: 9.4, fallsADay: 0.11, testedDays: 10 };
  const system = await tendSystem(site(), page, tending);
  const before = await toldError(page, system.id);

  // The tests of the days since, then today's by hand.
  await logTests(site(), page, system.id, tending, [10, 21]);
  await page.goto(`/water/systems/${system.id}`);
  await page.getByRole('link', { name: 'Log readings' }).click();
  await heading(page, 'Log readings');
  await page.getByLabel('Alkalinity').fill('7,1');
  await page.getByRole('button', { name: 'Log readings' }).click();
  await toast(page, '1 reading logged.');
  expect(await toldError(page, system.id)).toBeLessThan(before);

  // The advice becomes the plan, and the plan a mix.
  const plan = sheetOf(page, 'Dosing plan');
  await plan.getByText(/g of lime a litre/).waitFor();
  await plan.getByRole('button', { name: 'Use this plan' }).click();
  await toast(page, 'This is the plan now.');
  await plan.getByRole('link', { name: `Mix ${system.spare.code}` }).click();
  await heading(page, 'Mix limewater');
  expect(Number(await page.getByLabel('Lime, weighed').inputValue())).toBeGreaterThan(100);
  for (const step of await page.getByRole('checkbox').all()) await step.check();
  await page.getByRole('button', { name: 'Log this mix' }).click();
  await heading(page, system.spare.code);

  await page.getByRole('button', { name: 'Put online' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Put online' }).click();
  await toast(page, `${system.spare.code} is online.`);

  await page.goto(`/water/systems/${system.id}`);
  await page.getByRole('button', { name: 'Log level' }).click();
  await page.getByLabel('Stands in it now').fill('200');
  await page.getByRole('dialog').getByRole('button', { name: 'Log level' }).click();
  await toast(page, `${system.spare.code} stands at 200`);
  // All of it stands in the log, the newest first.
  const log = sheetOf(page, 'Everything that happened');
  await log.getByText(`${system.spare.code} stands at 200`).waitFor();
  await log.getByText('Plan taken:').waitFor();
});

it('when a value is typed without its point, it is asked about; an odd one that is kept is flagged and left out', async () => {
  const page = await site().newPage({ as: 'grower', device: 'phone' });
  const system = await tendSystem(site(), page, { code: 'GX', days: 14, level: 8.2, fallsADay: 0 });
  await page.goto(`/water/log?system=${system.id}`);
  await heading(page, 'Log readings');

  await page.getByLabel('Alkalinity').fill('83');
  await page.getByRole('button', { name: /8\.3/ }).first().click();
  expect(await page.getByLabel('Alkalinity').inputValue()).toBe('8.3');

  await page.getByLabel('Alkalinity').fill('12.6');
  await page.getByRole('button', { name: 'Keep what I typed' }).click();
  await page.getByRole('button', { name: 'Log readings' }).click();
  await toast(page, '1 reading logged.');
  await heading(page, `GX Bay GX`);
  await page.locator('.chart-flag-word').getByText('flagged 12.6').waitFor();
  await sheetOf(page, 'Checks')
    .getByText(/It is kept, and all but left out/)
    .waitFor();
});

it('when the days are looked at closer and read as a table, both tell the same tests', async () => {
  const page = await site().newPage({ as: 'grower' });
  const system = await tendSystem(site(), page, { code: 'GY', days: 28, level: 8.4, fallsADay: 0.01 });
  await page.goto(`/water/systems/${system.id}?days=30&show=alkalinity`);
  const frame = page.locator('.chart-frame');
  await frame.scrollIntoViewIfNeeded();
  const box = await frame.boundingBox();
  if (!box) throw new Error('The chart is not there.');

  // A drag across some days in the past looks closer; the right half is what is forecast.
  await page.mouse.move(box.x + box.width * 0.2, box.y + 80);
  await page.mouse.down();
  await page.mouse.move(box.x + box.width * 0.4, box.y + 80, { steps: 4 });
  await page.mouse.up();
  const whole = page.getByRole('button', { name: 'Whole period' });
  await whole.waitFor();
  await frame.getByRole('slider').press('End');
  await page
    .locator('.chart-read-out')
    .getByText(/alkalinity 8\.\d ± 0\.\d/)
    .waitFor();

  await page.getByRole('button', { name: 'As a table' }).click();
  const rows = sheetOf(page, 'Over time').locator('tbody tr');
  await rows.first().waitFor();
  const closer = await rows.count();
  expect(closer).toBeGreaterThan(4);
  expect(closer).toBeLessThan(15);
  await page.getByRole('button', { name: 'As a table' }).click();
  await page.getByRole('button', { name: 'Whole period' }).click();
  await page.getByRole('button', { name: 'As a table' }).click();
  expect(await rows.count()).toBeGreaterThan(25);
});

it('when a file has rows that can not be right, they are named and left out, and Undo takes the rest back', async () => {
  const page = await site().newPage({ as: 'grower' });
  const system = await tendSystem(site(), page, { code: 'GZ', days: 3, level: 8, fallsADay: 0 });
  await page.goto('/water/import');
  await heading(page, 'Import readings');
  const lines = [
    'Date,System,Alkalinity (dKH),Calcium (mg/L)',
    '2025-05-02 09:00,GZ,8.1,430',
    '2025-05-03 09:00,GZ,eight,428',
    '2025-05-04 09:00,GZ,8.2,431',
  ];
  await page.locator('input[type=file]').setInputFiles({
    ...{ name: 'slips.csv', mimeType: 'text/csv', buffer: Buffer.from(lines.join('\n')) },
  });

  await page.getByText('Rows that are left out').waitFor();
  await page.getByRole('button', { name: /^Import \d+ readings$/ }).click();
  const message = await toast(page, /readings imported/);
  await heading(page, 'Readings');
  const count = async () =>
    (await site().get<{ total: number }>(page, `/api/readings?systemId=${system.id}&parameter=calcium`)).total;
  expect(await count()).toBeGreaterThan(0);

  await message.getByRole('button', { name: 'Undo' }).click();
  await expect.poll(count).toBe(0);
});

it('when the top-off stuck, the overfill is logged, its card says what to do, and tests come due', async () => {
  const page = await site().newPage({ as: 'grower', device: 'phone' });
  const system = await tendSystem(site(), page, { code: 'GO', days: 7, level: 8, fallsADay: 0 });
  await page.goto(`/water/systems/${system.id}`);
  const sheet = sheetOf(page, 'If the top-off sticks');
  await sheet.getByRole('button', { name: 'Log an overfill' }).click();
  await page.getByLabel('Ran in').fill('60');
  await page.getByLabel('What stuck').fill('float');
  await page.getByRole('button', { name: 'Log overfill' }).click();

  await toast(page, /An overfill of 60/);
  const card = page.getByRole('dialog', { name: 'When limewater has run in' });
  await card.waitFor();
  await card.getByRole('button', { name: 'Close' }).click();
  await sheet.getByText(/ran in/).waitFor();
  const { items } = await site().get<{ items: { title: string; systemId: string | null }[] }>(page, '/api/tasks');
  expect(items.filter(({ systemId }) => systemId === system.id)).toHaveLength(3);
});
