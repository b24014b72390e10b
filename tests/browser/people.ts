import { chromium, type Browser, type Page } from 'playwright-core';
import type { Role } from '../../shared/roles.js';

/** A demo person, signed in, in a browser context of his or her own. */
export interface Person {
  page: Page;
  /** Address of the running program. */
  base: string;
  password: string;
  /** What the console and the page complained about so far. */
  troubles: () => readonly string[];
  close: () => Promise<void>;
}

const password = 'trim-the-wick-4310';
const args = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

let browser: Promise<Browser> | undefined;
let open = 0;

function launch(): Promise<Browser> {
  browser ??= chromium.launch({ executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium', args });
  return browser;
}

async function closeWhenLast(): Promise<void> {
  open -= 1;
  if (open > 0) return;
  const last = browser;
  browser = undefined;
  await (await last)?.close();
}

/** Opens the program as one of the demo team’s people. `TRIMWICK_TEST_URL` is the address of the program under test. */
export async function openAs(role: Role): Promise<Person> {
  const base = process.env.TRIMWICK_TEST_URL;
  if (base === undefined) throw new Error('TRIMWICK_TEST_URL does not name the program under test');
  open += 1;
  const context = await (await launch()).newContext({ viewport: { width: 1440, height: 1000 } });
  const page = await context.newPage();
  page.setDefaultTimeout(15_000);
  const troubles: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error' || message.type() === 'warning') troubles.push(message.text());
  });
  page.on('pageerror', (error) => troubles.push(error.message));
  const answer = await page.request.post(`${base}/api/v1/session`, {
    data: { email: `${role}@brackenmoor.example`, password },
  });
  if (!answer.ok()) throw new Error(`${role} could not sign in: ${String(answer.status())}`);
  return {
    page,
    base,
    password,
    troubles: () => troubles,
    close: async () => {
      await context.close();
      await closeWhenLast();
    },
  };
}
