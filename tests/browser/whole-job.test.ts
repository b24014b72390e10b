import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { openAs, type Person } from './people.js';
import { draftOnServer, makeLantern, saved, verdictHolds } from './sheet-helpers.js';

/** The whole job in a real browser: designer, engineer and reviewer, from eight questions to the register. */
describe('a printed lamp housing, from the first question to an accepted decision', () => {
  const name = `Harbour wall lantern ${String(Date.now())}`;
  let designer: Person;
  let engineer: Person;
  let reviewer: Person;
  let address = '';
  let decisionAddress = '';

  beforeAll(async () => {
    designer = await openAs('designer');
    engineer = await openAs('engineer');
    reviewer = await openAs('reviewer');
  });
  afterAll(async () => {
    await Promise.all([designer, engineer, reviewer].map((person) => person.close()));
  });

  test('the designer answers eight questions, sees the first answer at once, and refines the sheet', async () => {
    const { page, base } = designer;
    address = await makeLantern(page, base, name);
    await page.getByLabel('Load it carries', { exact: true }).selectOption({ label: 'its own weight' });
    await page.getByLabel('Wall', { exact: true }).fill('2,4 mm');
    await page.getByLabel('Finish outside', { exact: true }).selectOption({ label: 'Printed polymer, white, matt' });
    await page.getByLabel('Finish inside', { exact: true }).selectOption({ label: 'Printed polymer, white, matt' });
    await verdictHolds(page, /Worst room/);
    await saved(page);
    const { document } = await draftOnServer(page, address);
    expect(document).toMatchObject({
      name,
      housing: {
        outerM: [0.16, 0.09, 0.045],
        faces: { top: { wallM: 0.0024, loadState: 'self-weight', print: { perimeters: 3, infillShare: 0.2 } } },
      },
      scenarios: [{ airC: 30 }],
    });
  });

  test('the engineer sets the joint and the drive, and reads the ceiling with what binds', async () => {
    const { page } = engineer;
    await page.goto(address);
    await page.waitForSelector('[data-testid=verdict]');
    await page.locator('#section-parts').getByRole('button', { name: 'LED array', exact: true }).click();
    const drawer = page.getByRole('dialog');
    await drawer.getByRole('button', { name: 'Add a layer' }).click();
    await drawer.getByLabel('Bond line', { exact: true }).fill('0.1 mm');
    await drawer.getByLabel('Light that stays inside as heat', { exact: true }).fill('15 %');
    await page.keyboard.press('Escape');
    await page.locator('#section-parts').getByRole('button', { name: 'Drive', exact: true }).click();
    await page.getByRole('dialog').getByLabel('Current', { exact: true }).fill('40 mA');
    await page.keyboard.press('Escape');
    const strip = await verdictHolds(page, /Headroom at 0\.04\u00a0A/);
    expect(strip).toMatch(/Drive ceiling, guarded\s*0\.\d+\u00a0A · \d/);
    await page.locator('#section-ceiling').getByText('Nominal', { exact: true }).scrollIntoViewIfNeeded();
    const figures = await page.locator('#section-ceiling .ceiling-figure').allTextContents();
    const [guarded = NaN, nominal = NaN] = figures.map((figure) => Number.parseFloat(figure));
    expect(guarded).toBeGreaterThan(0.04);
    expect(guarded).toBeLessThanOrEqual(nominal);
    await saved(page);
  });

  test('every number opens its working, which balances', async () => {
    const { page } = engineer;
    await page.locator('#section-temperatures .limits').getByRole('button').first().click();
    const drawer = page.getByRole('dialog');
    await drawer.getByText('Ways of the heat, largest first').waitFor();
    const words = (await drawer.textContent()) ?? '';
    const [, inW = '', outW = ''] = /heat that comes in: ([\d.]+) W in, ([\d.]+) W out/.exec(words) ?? [];
    expect(Number(inW)).toBeGreaterThan(0);
    expect(outW).toBe(inW);
    await page.keyboard.press('Escape');
  });

  test('the engineer makes a revision and asks for a decision', async () => {
    const { page } = engineer;
    const record = page.locator('#section-record');
    await record.getByLabel('Note for the next revision').fill('Paste under the array, 40 mA');
    await record.getByRole('button', { name: 'Make a revision' }).click();
    await record.getByText('Paste under the array, 40 mA').waitFor();
    await record.getByLabel('What is asked').fill('May the lantern be built and sold at 40 mA, up to 30 °C?');
    await record.getByRole('button', { name: 'Ask for a decision' }).click();
    await record.getByText('Name the product').waitFor();
    await record.getByLabel('Product it covers').fill('Harbour wall lantern');
    await record.getByLabel('Variant').fill('white');
    await record.getByRole('button', { name: 'Ask for a decision' }).click();
    const link = record.getByRole('link', { name: /^Decision \d+$/ });
    await link.waitFor();
    expect(await record.textContent()).toContain('asked, waits for a reviewer');
    decisionAddress = new URL((await link.getAttribute('href')) ?? '', page.url()).href;
  });

  test('neither of those who worked on it may decide', async () => {
    const { page } = engineer;
    await page.goto(decisionAddress);
    await page.getByRole('heading', { name: 'Decide' }).waitFor();
    expect(await page.getByLabel('Your password again').count()).toBe(0);
    await page.getByText('Only a reviewer may decide').waitFor();
  });

  test('the reviewer takes each red flag with a reason and accepts with conditions', async () => {
    const { page } = reviewer;
    await page.goto(decisionAddress);
    await page.getByRole('heading', { name: 'Decide' }).waitFor();
    await page.getByRole('radio', { name: /Accept with conditions/ }).check();
    await page.getByRole('button', { name: 'Add a condition' }).click();
    await page.getByLabel('Condition 1').fill('Drive at most 40 mA above 25 °C');
    for (const flag of await page.getByRole('checkbox').all()) await flag.check();
    for (const why of await page.getByLabel('Why it may be taken').all())
      await why.fill('Measured on one unit before sale');
    await page.getByLabel('Reason', { exact: true }).fill('Margins hold in the worst room with the drive held down.');
    await page.getByLabel('Your password again').fill(reviewer.password);
    await page.getByRole('button', { name: /^Record/ }).click();
    await page.getByRole('heading', { name: /accepted with conditions/i, level: 1 }).waitFor();
    expect(await page.getByText('Drive at most 40 mA above 25 °C').count()).toBeGreaterThan(0);
  });

  test('the register lists it, and the sheet says so', async () => {
    const { page, base } = designer;
    await page.goto(`${base}/decisions`);
    const row = page.getByRole('row').filter({ hasText: name });
    await row.waitFor();
    expect(await row.textContent()).toMatch(/accepted with conditions/i);
    await page.goto(address);
    await page.locator('#section-record').getByText('accepted with conditions').first().waitFor();
    expect(designer.troubles()).toEqual([]);
    expect(engineer.troubles()).toEqual([]);
    expect(reviewer.troubles()).toEqual([]);
  });
});
