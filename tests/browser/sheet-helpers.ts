import { expect } from 'vitest';
import type { Page } from 'playwright-core';

/** Steps that several tests of the assembly sheet share. */

/** Waits until the sheet says that everything is saved. */
export async function saved(page: Page): Promise<void> {
  await page
    .getByTestId('save-note')
    .filter({ hasText: /^saved/ })
    .waitFor();
}

/** The verdict strip’s words, once they hold what is expected. */
export async function verdictHolds(page: Page, words: RegExp): Promise<string> {
  const strip = page.getByTestId('verdict').filter({ hasText: words });
  await strip.waitFor();
  return (await strip.textContent()) ?? '';
}

/** Makes an assembly from the eight questions and opens its sheet; returns its address. */
export async function makeLantern(page: Page, base: string, name: string): Promise<string> {
  await page.goto(`${base}/assemblies/new`);
  await page.waitForSelector('[data-testid=verdict]');
  await page.getByLabel('Its name').fill(name);
  await page.getByLabel('Width × depth × height, outside', { exact: true }).fill('16 × 9 × 4,5 cm');
  await page.getByLabel('In your words', { exact: true }).fill('PETG, 3 walls, 20 % infill');
  await page.getByLabel('Part', { exact: true }).selectOption({ label: 'LED array, 10 W class, 30 to 36 V, white' });
  await page.getByLabel('Current through it', { exact: true }).fill('50 mA');
  await page.getByLabel('The housing').selectOption({ label: 'hangs free, air all round' });
  await page.getByLabel('Inside, the heat sits on').selectOption({ label: 'an aluminium plate under the top' });
  await page.getByLabel('Air of the worst room', { exact: true }).fill('86 F');
  await page.getByLabel('Touched', { exact: true }).selectOption({ label: 'handled, up to 10 s' });
  await page.getByLabel('Sun', { exact: true }).selectOption({ label: 'none' });
  await verdictHolds(page, /30\u00a0°C/);
  await page.getByRole('button', { name: 'Keep it and open the sheet' }).click();
  await page.waitForURL(/\/assemblies\/[0-9a-f-]{36}$/);
  await page.waitForSelector('[data-testid=verdict]');
  expect(await page.getByRole('heading', { level: 1 }).textContent()).toBe(name);
  return page.url();
}

/** The draft as the server has it. */
export async function draftOnServer(page: Page, address: string): Promise<{ version: number; document: unknown }> {
  const { origin, pathname } = new URL(address);
  const answer = await page.request.get(`${origin}/api/v1${pathname}`);
  const { draft } = (await answer.json()) as { draft: { version: number; document: unknown } };
  return draft;
}
