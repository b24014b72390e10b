import { chmodSync, mkdtempSync, readdirSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { ensureBrowser } from './browser.mjs';
import { ensureBuilt } from './build.mjs';
import { startDemoInstance } from './demo-instance.mjs';
import { runScript } from './fail.mjs';
import { checkNode } from './node-version.mjs';
import { ensurePackages } from './packages.mjs';
import { packaged, root } from './paths.mjs';
import { PrivateCluster } from './postgres.mjs';
import { endRunning, run } from './run.mjs';
import { stopRequested } from './service.mjs';

/** Runs the benchmarks; those that look at the running program find it at TRIMWICK_URL. */
async function runBenchmarks(words, env) {
  const files = readdirSync(path.join(root, 'tests/speed'))
    .filter((name) => name.endsWith('.speed.ts') && (words.length === 0 || words.some((word) => name.includes(word))))
    .sort();
  const processor = os.cpus()[0]?.model ?? 'unknown processor';
  console.log(`${os.hostname()}: ${processor}, ${os.cpus().length} cores, Node.js ${process.versions.node}\n`);
  for (const file of files) {
    console.log(`— ${file}`);
    const { code } = await run(packaged('tsx'), [path.join('tests/speed', file)], { env });
    if (code !== 0) process.exitCode = 1;
  }
}

/** `npm run speed [-- name …]`: every benchmark under tests/speed, or those whose name holds one of the words. */
await runScript(async () => {
  checkNode();
  await ensurePackages();
  await ensureBuilt();
  const words = process.argv.slice(2);
  const env = { CHROMIUM_PATH: await ensureBrowser() };
  if (process.env.TRIMWICK_URL) {
    await runBenchmarks(words, env);
    return;
  }
  const home = mkdtempSync(path.join(os.tmpdir(), 'trimwick-speed-'));
  chmodSync(home, 0o755);
  // As people run it: what is committed is on disk.
  const cluster = new PrivateCluster(home);
  const stopping = stopRequested();
  void stopping.then(endRunning);
  try {
    await cluster.start();
    const instance = await startDemoInstance({
      applicationUrl: cluster.applicationUrl,
      ownerUrl: cluster.ownerUrl,
      home,
    });
    try {
      await Promise.race([runBenchmarks(words, { ...env, TRIMWICK_URL: instance.base }), stopping]);
    } finally {
      await instance.stop();
    }
  } finally {
    await cluster.remove();
  }
});
