import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { violationsOf } from './harness/axe.js';
import { openAs, type Person } from './people.js';
import { draftOnServer, makeLantern, saved, verdictHolds } from './sheet-helpers.js';

let designer: Person;
let address = '';

beforeAll(async () => {
  designer = await openAs('designer');
  address = await makeLantern(designer.page, designer.base, `Sheet under test ${String(Date.now())}`);
});
afterAll(async () => {
  await designer.close();
});
beforeEach(async () => {
  await designer.page.goto(address);
  await designer.page.waitForSelector('[data-testid=verdict]');
});

describe('typing on the sheet', () => {
  test.each([
    ['3.5 mm', 0.0035, '3.5 mm'],
    ['1/4 in', 0.00635, '6.35 mm'],
    ['0,3 cm', 0.003, '3 mm'],
    ['2.4e-3 m', 0.0024, '2.4 mm'],
  ])('a pasted “%s” is understood, shown and kept', async (text, value, shown) => {
    const { page } = designer;
    const wall = page.getByLabel('Wall', { exact: true });
    await wall.fill(text);
    await wall.blur();
    await expect.poll(() => wall.inputValue()).toBe(shown);
    await saved(page);
    const { document } = await draftOnServer(page, address);
    expect(document).toMatchObject({ housing: { faces: { top: { wallM: value }, left: { wallM: value } } } });
  });

  test('what cannot be read is told beside the field, kept through a reload, and the last answer stays as old', async () => {
    const { page } = designer;
    const width = page.getByLabel('Width, outside');
    await width.fill('sixteen fingers');
    await page.getByText('“sixteen fingers” is not a number').waitFor();
    await page.getByText('Cannot be computed:').waitFor();
    expect(await page.getByTestId('verdict').count()).toBe(1);
    await saved(page);
    await page.reload();
    await page.getByText('“sixteen fingers” is not a number').waitFor();
    await page.getByRole('button', { name: /^Width:/ }).click();
    expect(await page.locator(':focus').getAttribute('aria-invalid')).toBe('true');
    await width.fill('160 mm');
    await verdictHolds(page, /Worst room/);
    await saved(page);
  });

  test.each([
    ['-5', /at least 5 mm/],
    ['0', /at least 5 mm/],
    ['1e9 W', /not a length/],
    ['1e9', /at most 5000 mm/],
  ])('an absurd width “%s” is refused in the user’s words', async (text, words) => {
    const { page } = designer;
    await page.getByLabel('Width, outside').fill(text);
    await page.getByRole('alert').filter({ hasText: words }).waitFor();
    await page.getByLabel('Width, outside').fill('160');
    await verdictHolds(page, /Worst room/);
    await saved(page);
  });

  test('a note of ten thousand characters is kept, and told to be too long', async () => {
    const { page } = designer;
    await page.getByLabel('Note', { exact: true }).fill('x'.repeat(10_000));
    await page.getByText('A note must be at most 4000 characters').first().waitFor();
    await saved(page);
    expect(await draftOnServer(page, address)).toMatchObject({ document: { note: 'x'.repeat(10_000) } });
    await page.getByLabel('Note', { exact: true }).fill('');
    await saved(page);
  });

  test('undo and redo step through fields, and stop at a revision', async () => {
    const { page } = designer;
    const height = page.getByLabel('Height, outside');
    await height.fill('50');
    await page.getByLabel('Depth, outside').fill('95');
    const undo = page.getByRole('button', { name: 'Undo' });
    await undo.click();
    expect(await page.getByLabel('Depth, outside').inputValue()).toBe('90 mm');
    expect(await height.inputValue()).toBe('50 mm');
    await page.keyboard.press('Control+z');
    expect(await height.inputValue()).toBe('45 mm');
    await page.keyboard.press('Control+Shift+z');
    expect(await height.inputValue()).toBe('50 mm');
    await undo.click();
    const record = page.locator('#section-record');
    await record.getByRole('button', { name: 'Make a revision' }).click();
    await record.getByText('without a note').first().waitFor();
    expect(await undo.isDisabled()).toBe(true);
  });
});

describe('by keyboard alone', () => {
  test('a face, its wall, a part’s drawer and a working are reached and left without a pointer', async () => {
    const { page } = designer;
    await page
      .locator('#section-housing')
      .getByRole('button', { name: /^left face/ })
      .focus();
    await page.keyboard.press('Enter');
    await page.getByRole('group', { name: 'The left face' }).waitFor();
    const part = page.locator('#section-parts').getByRole('button', { name: 'LED array', exact: true });
    await part.focus();
    await page.keyboard.press('Enter');
    await page.getByRole('dialog').waitFor();
    expect(await page.locator('h2:focus').textContent()).toBe('Part: LED array');
    await page.keyboard.press('Escape');
    await page.getByRole('dialog').waitFor({ state: 'detached' });
    expect((await page.locator(':focus').textContent())?.trim()).toBe('LED array');
    await page.locator('#section-temperatures .step').first().focus();
    await page.keyboard.press('Enter');
    await page.getByRole('dialog', { name: /^Working/ }).waitFor();
    await page.keyboard.press('Escape');
  });
});

/** Width of the page, and the smallest type in its pictures as drawn; runs in the page. */
const measurePage = `(() => {
  const texts = [...document.querySelectorAll('svg text')].filter((text) => text.getClientRects().length > 0);
  const drawn = (text) => {
    const svg = text.closest('svg');
    const scale = svg.getBoundingClientRect().width / (svg.viewBox.baseVal.width || 1);
    return parseFloat(getComputedStyle(text).fontSize) * scale;
  };
  return {
    page: document.documentElement.scrollWidth,
    smallest: Math.min(...texts.map(drawn)),
    count: texts.length,
  };
})()`;

describe('on a phone', () => {
  test('nothing runs out of the page, and no text in a picture is below 11 px', async () => {
    const { page } = designer;
    await page.setViewportSize({ width: 390, height: 844 });
    await page.reload();
    await page.waitForSelector('[data-testid=verdict]');
    const sizes = await page.evaluate<{ page: number; smallest: number; count: number }>(measurePage);
    expect(sizes.page).toBeLessThanOrEqual(390);
    expect(sizes.count).toBeGreaterThan(20);
    expect(sizes.smallest).toBeGreaterThanOrEqual(11);
    await page.getByLabel('Go to section').selectOption({ label: '5 Drive ceiling' });
    const box = await page.locator('#section-ceiling').boundingBox();
    expect(box?.y).toBeLessThan(400);
    await page.setViewportSize({ width: 1440, height: 1000 });
  });
});

describe('for everybody', () => {
  test.each(['light', 'dark'] as const)(
    'the sheet and its drawers have no accessibility violation, %s',
    async (colorScheme) => {
      const { page } = designer;
      await page.emulateMedia({ colorScheme });
      const openers = [
        null,
        page.locator('#section-parts').getByRole('button', { name: 'LED array', exact: true }),
        page.locator('#section-parts').getByRole('button', { name: 'plate', exact: true }),
        page.locator('#section-scenarios').getByRole('button', { name: 'Worst room', exact: true }),
        page.locator('#section-temperatures .limits').getByRole('button').first(),
        page.getByRole('button', { name: /assumed value/ }),
      ];
      for (const opener of openers) {
        await opener?.click();
        expect(await violationsOf(page)).toEqual([]);
      }
      await page.emulateMedia({ colorScheme: 'light' });
    },
  );
});

test('a viewer reads the sheet and can change nothing', async () => {
  const viewer = await openAs('viewer');
  try {
    await viewer.page.goto(address);
    await viewer.page.waitForSelector('[data-testid=verdict]');
    expect(await viewer.page.getByLabel('Width, outside').getAttribute('readonly')).not.toBeNull();
    expect(await viewer.page.getByRole('button', { name: 'Undo' }).count()).toBe(0);
    expect(await viewer.page.getByRole('button', { name: 'Add a part' }).count()).toBe(0);
    expect(await viewer.page.getByRole('button', { name: 'Make a revision' }).count()).toBe(0);
    expect(viewer.troubles()).toEqual([]);
  } finally {
    await viewer.close();
  }
});
