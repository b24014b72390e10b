import { chromium, type Page } from 'playwright-core';
import { spreadOf } from './quantiles.js';

/**
 * Sheet keystroke → painted verdict strip, in a real browser against a running server with the demo team.
 * `TRIMWICK_URL` names it (http://127.0.0.1:4310 is what `npm start` serves).
 */
const base = process.env.TRIMWICK_URL ?? 'http://127.0.0.1:4310';
const executablePath = process.env.CHROMIUM_PATH ?? '/usr/bin/chromium';
const keystrokes = 60;
const demo = { email: 'designer@brackenmoor.example', password: 'trim-the-wick-4310' };

/** Notes, for every key pressed, the time until the frame after the strip’s words have changed; runs in the page. */
const watchStrip = `(() => {
  globalThis.strokeTimes = [];
  let pressedAt = 0;
  document.addEventListener('keydown', () => { pressedAt = performance.now(); }, { capture: true });
  new MutationObserver(() => {
    const from = pressedAt;
    if (from === 0) return;
    pressedAt = 0;
    requestAnimationFrame(() => setTimeout(() => globalThis.strokeTimes.push(performance.now() - from)));
  }).observe(document.querySelector('[data-testid=verdict]'), { characterData: true, childList: true, subtree: true });
})()`;

async function measure(page: Page): Promise<number[]> {
  const list = await page.request.get(`${base}/api/v1/assemblies?search=lantern`);
  const { items } = (await list.json()) as { items: { id: string }[] };
  const [lantern] = items;
  if (!lantern) throw new Error('The demo lantern is not there');
  await page.goto(`${base}/assemblies/${lantern.id}`);
  await page.waitForSelector('[data-testid=verdict]');
  await page.locator('#section-scenarios .sheet-link').last().click();
  const air = page.getByRole('dialog').getByLabel('Air', { exact: true });
  await air.fill('30');
  await page.waitForTimeout(1000);
  await page.evaluate(watchStrip);
  await air.press('End');
  for (let i = 0; i < keystrokes / 2; i += 1) {
    for (const key of ['Backspace', String(1 + (i % 9))]) {
      const before = await page.evaluate<number>('strokeTimes.length');
      await page.keyboard.press(key);
      await page.waitForFunction(`strokeTimes.length > ${String(before)}`, undefined, { timeout: 10_000 });
    }
  }
  return page.evaluate<number[]>('strokeTimes');
}

const browser = await chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-gpu'] });
try {
  const page = await browser.newPage({
    viewport: { width: 1440, height: 1000 },
    // The program’s policy forbids the page what measuring in it needs.
    bypassCSP: true,
  });
  const signedIn = await page.request.post(`${base}/api/v1/session`, { data: demo });
  if (!signedIn.ok())
    throw new Error(`Sign-in answered ${String(signedIn.status())}: is the demo team loaded at ${base}?`);
  // What is typed here must not stay in the demo: the draft is never saved.
  await page.route('**/draft', (route) => route.abort());
  console.log(`keystroke → painted strip: ${spreadOf(await measure(page), 0)}`);
} finally {
  await browser.close();
}
