import type { Locator, Page } from 'playwright-core';

/** Picks one of the choices that a field offers. */
export async function choose(scope: Page | Locator, label: string, choice: string | RegExp): Promise<void> {
  const page = 'page' in scope ? scope.page() : scope;
  // The field around it takes the click.
  await scope.getByRole('combobox', { name: label }).click({ force: true });
  await page.getByRole('option', { name: choice }).first().click();
}

/** Waits for a message at the edge of the screen. */
export async function toast(page: Page, text: string | RegExp): Promise<Locator> {
  const found = page.locator('.toast').filter({ hasText: text }).first();
  await found.waitFor();
  return found;
}

/** Waits until a page with this heading is open. */
export async function heading(page: Page, name: string | RegExp): Promise<void> {
  await page.getByRole('heading', { level: 1, name }).waitFor();
}
