import { gzipSync } from 'node:zlib';
import type { Response } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { violationsOf } from './harness/axe.js';
import { openAs, type Person } from './people.js';

let engineer: Person;
let admin: Person;

beforeAll(async () => {
  engineer = await openAs('engineer');
  admin = await openAs('admin');
});
afterAll(async () => {
  await Promise.all([engineer, admin].map((person) => person.close()));
});

/** Id of the demo’s own entry of a list: other tests make more of them. */
async function idOf(list: 'assemblies' | 'decisions', name: string): Promise<string> {
  const answer = await engineer.page.request.get(`${engineer.base}/api/v1/${list}?search=${encodeURIComponent(name)}`);
  const [first] = ((await answer.json()) as { items: { id: string }[] }).items;
  if (!first) throw new Error(`The demo’s “${name}” is not among the ${list}`);
  return first.id;
}

/** Every screen: its name, its address, and words that stand on it once it is loaded. */
const screens: [name: string, address: () => string | Promise<string>, words: string | RegExp][] = [
  ['desk', () => '/', /lantern/i],
  ['assemblies', () => '/assemblies', /lantern/i],
  ['new assembly', () => '/assemblies/new', 'In your words'],
  ['assembly', async () => `/assemblies/${await idOf('assemblies', 'stall')}`, /ceiling/i],
  ['materials', () => '/materials', /PETG/],
  ['finishes', () => '/finishes', /emissivity/],
  ['parts', () => '/parts', /LED array/],
  ['rule sets', () => '/rules', /rule/i],
  ['register', () => '/decisions', /load box/i],
  ['decision', async () => `/decisions/${await idOf('decisions', 'load box')}`, /load box/i],
  ['team', () => '/team', /Saltmarsh|Brackenmoor/],
  ['account', () => '/account', /password/i],
  ['guide', () => '/guide', /local code/i],
  ['no such page', () => '/nowhere', /not|no /i],
];

describe.each(['light', 'dark'] as const)('in %s colours', (colorScheme) => {
  test.each(screens)(
    'the screen “%s” has no accessibility violation and a clean console',
    async (name, address, words) => {
      const { page, base, troubles } = name === 'team' ? admin : engineer;
      await page.emulateMedia({ colorScheme });
      const before = troubles().length;
      await page.goto(`${base}${await address()}`);
      await page.getByRole('heading', { level: 1 }).waitFor();
      await page.getByRole('main').filter({ hasText: words }).waitFor();
      expect(await violationsOf(page)).toEqual([]);
      expect(troubles().slice(before)).toEqual([]);
    },
  );

  test('sign-in has none either, to one who has not signed in', async () => {
    const context = await engineer.page.context().browser()?.newContext({ colorScheme });
    const page = await context?.newPage();
    if (!context || !page) throw new Error('No browser');
    await page.goto(`${engineer.base}/assemblies`);
    await page.waitForURL(/\/sign-in/);
    await page.getByRole('heading', { level: 1, name: 'Sign in' }).waitFor();
    expect(await violationsOf(page)).toEqual([]);
    await context.close();
  });
});

describe('on a screen 360 px wide', () => {
  test.each(screens)('the screen “%s” does not run out of the page', async (_, address, words) => {
    const { page, base } = engineer;
    await page.setViewportSize({ width: 360, height: 800 });
    await page.goto(`${base}${await address()}`);
    await page.getByRole('main').filter({ hasText: words }).waitFor();
    const overflow = await page.evaluate<number>(
      'document.documentElement.scrollWidth - document.documentElement.clientWidth',
    );
    expect(overflow).toBeLessThanOrEqual(0);
    await page.setViewportSize({ width: 1440, height: 1000 });
  });
});

describe('a first load', () => {
  test.each(['/', '/assemblies', '/assemblies/new'])(
    'of %s brings less than 300 kB of compressed JavaScript',
    async (address) => {
      const person = await openAs('designer');
      try {
        const scripts: Response[] = [];
        person.page.on('response', (response) => {
          if (response.request().resourceType() === 'script') scripts.push(response);
        });
        await person.page.goto(`${person.base}${address}`, { waitUntil: 'networkidle' });
        expect(scripts.length).toBeGreaterThan(0);
        let compressed = 0;
        for (const script of scripts) {
          const body = await script.body();
          compressed += gzipSync(body).length;
          // What is smaller goes in one packet either way.
          if (body.length > 1024) expect(await script.headerValue('content-encoding')).toMatch(/gzip|br/);
        }
        expect(compressed).toBeGreaterThan(10_000);
        expect(compressed).toBeLessThan(300_000);
      } finally {
        await person.close();
      }
    },
  );

  test('Plotly comes with the first plot, and is kept by the browser under its hashed name', async () => {
    const { page, base } = engineer;
    const large: Response[] = [];
    page.on('response', (response) => {
      if (/plotly/.test(response.url())) large.push(response);
    });
    await page.goto(`${base}/materials`, { waitUntil: 'networkidle' });
    expect(large).toHaveLength(0);
    const list = await page.request.get(`${base}/api/v1/materials?pageSize=100`);
    const { items } = (await list.json()) as {
      items: { content: { slug: string; conductivityWPerMK: { value: unknown } } }[];
    };
    const withCurve = items.find(({ content }) => typeof content.conductivityWPerMK.value === 'object');
    if (!withCurve) throw new Error('No material has data against temperature');
    await page.goto(`${base}/materials/${withCurve.content.slug}`, { waitUntil: 'networkidle' });
    expect(large.length).toBeGreaterThan(0);
    expect(await large[0]?.headerValue('cache-control')).toMatch(/max-age=31536000.*immutable/);
  });
});
