import { existsSync } from 'node:fs';
import { aptInstall } from './apt.mjs';

const places = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];

/** Path of a Chromium for the browser tests, installed where it is missing. */
export async function ensureBrowser() {
  const found = process.env.CHROMIUM_PATH ?? places.find((place) => existsSync(place));
  if (found) return found;
  await aptInstall('chromium', 'Chromium (for the browser tests)');
  return places[0];
}
