import { afterAll, beforeAll, expect, test } from 'vitest';
import { openAs, type Person } from './people.js';
import { draftOnServer, makeLantern, saved, verdictHolds } from './sheet-helpers.js';

let designer: Person;
let engineer: Person;
let address = '';

beforeAll(async () => {
  designer = await openAs('designer');
  engineer = await openAs('engineer');
  address = await makeLantern(designer.page, designer.base, `Saving under test ${String(Date.now())}`);
});
afterAll(async () => {
  await Promise.all([designer.close(), engineer.close()]);
});

test('typing is saved about a second after the last keystroke', async () => {
  const { page } = designer;
  const before = await draftOnServer(page, address);
  const sent = page.waitForResponse((response) => response.url().endsWith('/draft') && response.ok());
  await page.getByLabel('Height, outside').fill('46');
  const typedAt = Date.now();
  await sent;
  expect(Date.now() - typedAt).toBeLessThan(1500);
  const after = await draftOnServer(page, address);
  expect(after.version).toBe(before.version + 1);
});

test('without connection it is kept here and said so; with connection it goes by itself', async () => {
  const { page } = designer;
  await page.context().setOffline(true);
  await page.getByLabel('Height, outside').fill('47');
  await page.getByText('not saved: no connection, kept here').waitFor();
  await page.getByText('No connection: this is the last answer').waitFor();
  await page.context().setOffline(false);
  await saved(page);
  await verdictHolds(page, /Worst room/);
  expect(await draftOnServer(page, address)).toMatchObject({ document: { housing: { outerM: [0.16, 0.09, 0.047] } } });
});

test('a tab closed without connection loses nothing: the next one finds what was typed', async () => {
  const context = designer.page.context();
  const doomed = await context.newPage();
  await doomed.goto(address);
  await doomed.waitForSelector('[data-testid=verdict]');
  // The server is dead for saving; the keystroke is a moment old when the tab dies.
  await doomed.route('**/draft', (route) => route.abort());
  await doomed.getByLabel('Note', { exact: true }).fill('typed just before the lights went out');
  await doomed.close({ runBeforeUnload: false });
  const next = await context.newPage();
  await next.goto(address);
  await next.waitForSelector('[data-testid=verdict]');
  expect(await next.getByLabel('Note', { exact: true }).inputValue()).toBe('typed just before the lights went out');
  await saved(next);
  expect(await draftOnServer(next, address)).toMatchObject({
    document: { note: 'typed just before the lights went out' },
  });
  await next.close();
  await designer.page.reload();
  await designer.page.waitForSelector('[data-testid=verdict]');
});

test('two people on one draft: both versions are shown, and either can be chosen', async () => {
  const { page } = designer;
  const other = engineer.page;
  await other.goto(address);
  await other.waitForSelector('[data-testid=verdict]');
  await other.getByLabel('Depth, outside').fill('100');
  await saved(other);
  await page.getByLabel('Height, outside').fill('60');
  const conflict = page.getByRole('alertdialog', { name: /Somebody else saved this draft meanwhile/ });
  await conflict.waitFor();
  const rows = await conflict.getByRole('row').allTextContents();
  expect(rows.some((row) => /Depth.*90\u00a0mm.*100\u00a0mm/.test(row))).toBe(true);
  expect(rows.some((row) => /Height.*60\u00a0mm/.test(row))).toBe(true);
  await conflict
    .getByRole('button', { name: /Keep mine/, exact: false })
    .first()
    .click();
  await saved(page);
  expect(await draftOnServer(page, address)).toMatchObject({ document: { housing: { outerM: [0.16, 0.09, 0.06] } } });
  expect(await page.getByRole('button', { name: 'Undo' }).isDisabled()).toBe(true);

  // Now the engineer’s sheet is the stale one, and takes what is there.
  await other.getByLabel('Width, outside').fill('200');
  await other.getByRole('alertdialog').waitFor();
  await other.getByRole('button', { name: 'Take theirs' }).click();
  await other.getByRole('alertdialog').waitFor({ state: 'detached' });
  expect(await other.getByLabel('Height, outside').inputValue()).toBe('60 mm');
  expect(await other.getByLabel('Width, outside').inputValue()).toBe('160 mm');
});

test('two tabs of one person on one draft do not overwrite each other unseen', async () => {
  const { page } = designer;
  const second = await page.context().newPage();
  await second.goto(address);
  await second.waitForSelector('[data-testid=verdict]');
  await second.getByLabel('Depth, outside').fill('110');
  await saved(second);
  await page.getByLabel('Height, outside').fill('61');
  await page.getByRole('alertdialog').waitFor();
  await page.getByRole('button', { name: 'Take theirs' }).click();
  await page.getByRole('alertdialog').waitFor({ state: 'detached' });
  expect(await page.getByLabel('Depth, outside').inputValue()).toBe('110 mm');
  await second.close();
});

test('a session that ends in the middle of work asks for the password in place, and loses nothing', async () => {
  const { page, base } = designer;
  await page.locator('#section-record').getByLabel('What is asked').fill('half a statement');
  await page.request.delete(`${base}/api/v1/session`);
  await page.getByLabel('Height, outside').fill('59');
  await page.getByText('Your session has ended').waitFor();
  await page.getByLabel('Password').fill(designer.password);
  await page.keyboard.press('Enter');
  await page.getByText('Your session has ended').waitFor({ state: 'detached' });
  await saved(page);
  expect(await draftOnServer(page, address)).toMatchObject({ document: { housing: { outerM: [0.16, 0.11, 0.059] } } });
  expect(await page.locator('#section-record').getByLabel('What is asked').inputValue()).toBe('half a statement');
  await verdictHolds(page, /Worst room/);
});

test('pressing “keep it” twice makes one assembly', async () => {
  const { page, base } = designer;
  const name = `Double press ${String(Date.now())}`;
  await page.goto(`${base}/assemblies/new`);
  await page.waitForSelector('[data-testid=verdict]');
  await page.getByLabel('Its name').fill(name);
  await page.getByRole('button', { name: 'Keep it and open the sheet' }).dblclick();
  await page.waitForURL(/\/assemblies\/[0-9a-f-]{36}$/);
  const list = await page.request.get(`${base}/api/v1/assemblies?search=${encodeURIComponent(name)}`);
  expect(((await list.json()) as { total: number }).total).toBe(1);
});
