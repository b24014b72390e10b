import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { SetupError, tellingLine } from './fail.mjs';
import { root } from './paths.mjs';
import { run } from './run.mjs';

const stamp = path.join(root, 'node_modules', '.trimwick-lock');

function lockHash() {
  return createHash('sha256')
    .update(readFileSync(path.join(root, 'package-lock.json')))
    .digest('hex');
}

/** Installs the packages of the lock file when they are missing or the lock file has changed. */
export async function ensurePackages() {
  const hash = lockHash();
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === hash) return;
  console.log('Installing packages …');
  // The client is built here, so the packages for development are needed in production too.
  const args = ['ci', '--include=dev', '--engine-strict', '--no-audit', '--no-fund'];
  const { code, output } = await run('npm', args, { quiet: true });
  if (code !== 0) throw new SetupError(`The packages could not be installed (npm ci): ${tellingLine(output)}`);
  writeFileSync(stamp, hash);
}
