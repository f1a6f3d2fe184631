import type { Page } from 'playwright-core';
import { it } from 'vitest';
import { expectWellMade } from './support/accessibility.ts';
import { choose, heading, toast } from './support/acts.ts';
import { useSite } from './support/use-site.ts';

const site = useSite({ empty: true });

const OWNER = { email: 'ines@example.com', password: 'nine herons over the salt pan' };
const GROWER = { email: 'pedro@example.com', password: 'a bucket of cold clear limewater' };

/** Today is headed by its day. */
async function onToday(page: Page): Promise<void> {
  await page.waitForURL('**/today');
  await heading(page, /day, \d+ [A-Z]/);
}

it('when a farm is new, its owner sets it up in the browser and stands on Today', async () => {
  const page = await site().newPage({ device: 'phone' });
  await page.goto('/');
  await heading(page, 'Set up the farm');
  await expectWellMade(page);

  await page.getByLabel('Name of the farm').fill('Lower Quay Corals');
  await page.getByLabel('Your name').fill('Ines Prado');
  await page.getByLabel('E-mail').fill(OWNER.email);
  await page.getByLabel('Password', { exact: true }).fill(OWNER.password);
  await page.getByRole('button', { name: 'Set up the farm' }).click();

  await onToday(page);
});

it('when someone is invited, the link in the mail makes an account with the role that was chosen', async () => {
  const owner = await site().newPage();
  await owner.goto('/settings/people');
  await owner.getByLabel('E-mail').fill(OWNER.email);
  await owner.getByLabel('Password', { exact: true }).fill(OWNER.password);
  await owner.getByRole('button', { name: 'Sign in' }).click();
  await heading(owner, 'People');

  await owner.getByRole('button', { name: 'Invite someone' }).click();
  const dialog = owner.getByRole('dialog');
  await dialog.getByLabel('E-mail').fill(GROWER.email);
  await choose(dialog, 'Role', 'Grower');
  await dialog.getByRole('button', { name: 'Send the invitation' }).click();
  await toast(owner, GROWER.email);
  const mail = await site().mailTo(GROWER.email, /./);
  const link = mail.links.find((each) => each.includes('/invitation/'));

  const grower = await site().newPage({ device: 'phone' });
  await grower.goto(link ?? 'no link');
  await grower.getByText('You are invited to Lower Quay Corals as grower').waitFor();
  await expectWellMade(grower);
  await grower.getByLabel('Your name').fill('Pedro Lima');
  await grower.getByLabel('Password', { exact: true }).fill(GROWER.password);
  await grower.getByRole('button', { name: 'Accept' }).click();
  await onToday(grower);

  await owner.reload();
  await owner.getByRole('row', { name: /Pedro Lima.*Grower/ }).waitFor();
});

it('when a password is forgotten, the link in the mail sets a new one, and the old one is refused', async () => {
  const page = await site().newPage();
  await page.goto('/sign-in');
  await page.getByRole('link', { name: 'Forgotten password' }).click();
  await heading(page, 'Forgotten password');
  await page.getByLabel('E-mail').fill(GROWER.email);
  await page.getByRole('button', { name: 'Send the link' }).click();
  await heading(page, 'Look into your mail');
  const mail = await site().mailTo(GROWER.email, /password/i);

  await page.goto(mail.links.find((each) => each.includes('/reset-password/')) ?? 'no link');
  await page.getByLabel('New password').fill('another bucket of colder limewater');
  await page.getByRole('button', { name: 'Set password' }).click();
  await heading(page, 'Sign in');

  site().faults.allow(/status of 401/);
  await page.getByLabel('E-mail').fill(GROWER.email);
  await page.getByLabel('Password', { exact: true }).fill(GROWER.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByRole('alert').waitFor();
  await page.getByLabel('Password', { exact: true }).fill('another bucket of colder limewater');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await onToday(page);
});
