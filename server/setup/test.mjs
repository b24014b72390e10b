import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { chmodSync } from 'node:fs';
import { ensureBrowser } from './browser.mjs';
import { ensureBuilt } from './build.mjs';
import { runScript } from './fail.mjs';
import { checkNode } from './node-version.mjs';
import { ensurePackages } from './packages.mjs';
import { PrivateCluster } from './postgres.mjs';
import { run } from './run.mjs';

/** Checks beside the tests proper; each counts as one. */
const gates = {
  format: ['prettier', ['--check', '.', '--log-level', 'warn']],
  lint: ['eslint', ['.', '--max-warnings', '0']],
  'types of server, shared and tests': ['tsc', ['--noEmit']],
  'types of the client': ['vue-tsc', ['--noEmit', '-p', 'src']],
  'dependency rules': ['depcruise', ['server', 'shared', 'src', '--config', '.dependency-cruiser.cjs']],
};
const projects = ['engine', 'reference', 'client', 'api', 'browser'];

/** `npm test`, or `npm test -- --only api,browser [file …]` for some of it. */
function readArguments(args) {
  const at = args.indexOf('--only');
  if (at < 0) return { gates: Object.keys(gates), projects, files: args };
  const wanted = (args[at + 1] ?? '').split(',');
  return {
    gates: Object.keys(gates).filter((name) => wanted.includes(name)),
    projects: projects.filter((name) => wanted.includes(name)),
    files: args.slice(at + 2),
  };
}

async function runGate(name) {
  const [command, args] = gates[name];
  const began = Date.now();
  const { code, output } = await run('npx', ['--no-install', command, ...args], { quiet: true });
  const seconds = ((Date.now() - began) / 1000).toFixed(1);
  console.log(code === 0 ? `✓ ${name} (${seconds} s)` : `✗ ${name} (${seconds} s)\n${output.trim()}`);
  return code === 0;
}

async function runProject(name, files, env, folder) {
  const report = path.join(folder, `${name}.json`);
  const { code } = await run(
    'npx',
    [
      ...['--no-install', 'vitest', 'run', '--project', name, ...files],
      ...['--reporter=default', '--reporter=json', `--outputFile.json=${report}`],
    ],
    { env },
  );
  try {
    const { numPassedTests, numFailedTests } = JSON.parse(readFileSync(report, 'utf8'));
    // A file that does not even load has no tests to count.
    return { passed: numPassedTests, failed: code === 0 ? numFailedTests : Math.max(numFailedTests, 1) };
  } catch {
    return { passed: 0, failed: 1 };
  }
}

await runScript(async () => {
  checkNode();
  await ensurePackages();
  const chosen = readArguments(process.argv.slice(2));
  const folder = mkdtempSync(path.join(os.tmpdir(), 'trimwick-test-'));
  // The database server’s account must be able to enter it.
  chmodSync(folder, 0o755);
  let passed = 0;
  let failed = 0;
  const needsDatabase = chosen.projects.some((name) => name === 'api' || name === 'browser');
  const cluster = needsDatabase ? new PrivateCluster(path.join(folder, 'home'), { throwAway: true }) : null;
  try {
    const env = { TRIMWICK_TEST_FOLDER: folder };
    if (chosen.projects.includes('browser')) env.CHROMIUM_PATH = await ensureBrowser();
    // Two at a time: that is what two cores bear.
    for (let i = 0; i < chosen.gates.length; i += 2) {
      for (const fine of await Promise.all(chosen.gates.slice(i, i + 2).map(runGate))) {
        if (fine) passed++;
        else failed++;
      }
    }
    if (cluster) {
      await cluster.start();
      env.TEST_DATABASE_OWNER_URL = cluster.ownerUrl;
      env.TEST_DATABASE_URL = cluster.applicationUrl;
    }
    if (needsDatabase) await ensureBuilt();
    for (const name of chosen.projects) {
      const counts = await runProject(name, chosen.files, env, folder);
      passed += counts.passed;
      failed += counts.failed;
    }
  } catch (error) {
    failed++;
    console.error(error instanceof Error ? error.message : error);
  } finally {
    await cluster?.remove();
    rmSync(folder, { recursive: true, force: true });
  }
  console.log(`${passed} passed, ${failed} failed`);
  if (failed > 0) process.exitCode = 1;
});
