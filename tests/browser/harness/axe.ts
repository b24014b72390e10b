import { AxeBuilder } from '@axe-core/playwright';
import type { Page } from 'playwright-core';

/** Each accessibility violation of the page as it stands: the rule, and what breaks it. */
export async function violationsOf(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  return violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`);
}
