import { readdirSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { ensureBrowser } from './browser.mjs';
import { ensureBuilt } from './build.mjs';
import { runScript } from './fail.mjs';
import { checkNode } from './node-version.mjs';
import { ensurePackages } from './packages.mjs';
import { root } from './paths.mjs';
import { run } from './run.mjs';

/** `npm run speed [-- name …]`: every benchmark under tests/speed, or those whose name holds one of the words. */
await runScript(async () => {
  checkNode();
  await ensurePackages();
  await ensureBuilt();
  const words = process.argv.slice(2);
  const files = readdirSync(path.join(root, 'tests/speed'))
    .filter((name) => name.endsWith('.speed.ts') && (words.length === 0 || words.some((word) => name.includes(word))))
    .sort();
  const processor = os.cpus()[0]?.model ?? 'unknown processor';
  console.log(`${os.hostname()}: ${processor}, ${os.cpus().length} cores, Node.js ${process.versions.node}\n`);
  const env = { CHROMIUM_PATH: await ensureBrowser() };
  for (const file of files) {
    console.log(`— ${file}`);
    const { code } = await run('npx', ['--no-install', 'tsx', path.join('tests/speed', file)], { env });
    if (code !== 0) process.exitCode = 1;
  }
});
