import { chmodSync, existsSync, mkdtempSync, readFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { ensureBrowser } from './browser.mjs';
import { ensureBuilt } from './build.mjs';
import { SetupError, told } from './fail.mjs';
import { checkNode } from './node-version.mjs';
import { ensurePackages } from './packages.mjs';
import { packaged } from './paths.mjs';
import { PrivateCluster } from './postgres.mjs';
import { noteProcess } from './processes.mjs';
import { ensurePython } from './python.mjs';
import { endRunning, run } from './run.mjs';
import { clearTestFolder, sweepAbandoned, testFolderPrefix } from './throw-away.mjs';

/** Checks beside the tests proper; each counts as one. */
const gates = {
  format: ['prettier', ['--check', '.', '--log-level', 'warn']],
  lint: ['eslint', ['.', '--max-warnings', '0']],
  'types of server, shared and tests': ['tsc', ['--noEmit']],
  'types of the client': ['vue-tsc', ['--noEmit', '-p', 'src']],
  'dependency rules': ['depcruise', ['server', 'shared', 'src', '--config', '.dependency-cruiser.cjs']],
};
const projects = ['engine', 'reference', 'client', 'api', 'browser'];

/** What a person has set for running the program must not reach its tests. */
const neutral = Object.fromEntries(
  ['DATABASE_URL', 'DATABASE_OWNER_URL', 'PORT', 'HOST', 'NODE_ENV', 'SESSION_KEY', 'LOG_LEVEL']
    .concat(['TRIMWICK_HOME', 'TRIMWICK_DEMO', 'TRIMWICK_TEST_URL'])
    .map((name) => [name, undefined]),
);

let passed = 0;
let failed = 0;
function count(fine) {
  if (fine) passed++;
  else failed++;
}

/** Does a step of the way; what goes wrong counts as a failure, and the rest of the checks is made all the same. */
async function attempt(step) {
  try {
    return await step();
  } catch (error) {
    failed++;
    console.error(told(error));
    return undefined;
  }
}

/** `npm test`, or `npm test -- --only api,browser [file …]` for some of it. */
function readArguments(args) {
  const at = args.indexOf('--only');
  if (at < 0) return { gates: Object.keys(gates), projects, files: args };
  const wanted = (args[at + 1] ?? '').split(',');
  const unknown = wanted.filter((name) => !(name in gates) && !projects.includes(name));
  if (unknown.length > 0) {
    console.error(`--only knows ${[...Object.keys(gates), ...projects].join(', ')}, not “${unknown.join(', ')}”`);
    process.exit(1);
  }
  return {
    gates: Object.keys(gates).filter((name) => wanted.includes(name)),
    projects: projects.filter((name) => wanted.includes(name)),
    files: args.slice(at + 2),
  };
}

async function runGate(name) {
  const [command, args] = gates[name];
  const began = Date.now();
  const { code, output } = await run(packaged(command), args, { quiet: true, env: neutral });
  const seconds = ((Date.now() - began) / 1000).toFixed(1);
  console.log(code === 0 ? `✓ ${name} (${seconds} s)` : `✗ ${name} (${seconds} s)\n${output.trim()}`);
  count(code === 0);
}

async function runProjects(names, files, env, folder) {
  const report = path.join(folder, `${names.join('-')}.json`);
  const { code } = await run(
    packaged('vitest'),
    [
      ...['run', ...names.flatMap((name) => ['--project', name]), ...files],
      ...['--reporter=default', '--reporter=json', `--outputFile.json=${report}`],
    ],
    { env: { ...neutral, ...env } },
  );
  if (!existsSync(report)) throw new SetupError(`The tests of ${names.join(', ')} ended without a report`);
  const { numPassedTests, numFailedTests } = JSON.parse(readFileSync(report, 'utf8'));
  passed += numPassedTests;
  // A file that does not even load has no tests to count.
  failed += code === 0 ? numFailedTests : Math.max(numFailedTests, 1);
}

/** A cluster, a build and, where they are looked at, a browser; undefined where one of them cannot be had. */
async function prepareServed(names, cluster) {
  await cluster.start();
  const env = { TEST_DATABASE_OWNER_URL: cluster.ownerUrl, TEST_DATABASE_URL: cluster.applicationUrl };
  await ensureBuilt();
  if (names.includes('browser')) env.CHROMIUM_PATH = await ensureBrowser();
  return env;
}

async function runAll(chosen, cluster, folder) {
  // Two at a time: that is what two cores bear.
  for (let i = 0; i < chosen.gates.length; i += 2) await Promise.all(chosen.gates.slice(i, i + 2).map(runGate));
  const served = chosen.projects.filter((name) => name === 'api' || name === 'browser');
  const alone = chosen.projects.filter((name) => !served.includes(name));
  const env = { TRIMWICK_TEST_FOLDER: folder };
  // Where it cannot be had, the line to run is said once here, and the tests that need it fail.
  if (alone.includes('reference')) env.PYTHON_PATH = await attempt(ensurePython);
  if (alone.length > 0) await attempt(() => runProjects(alone, chosen.files, env, folder));
  if (served.length === 0) return;
  const more = await attempt(() => prepareServed(served, cluster));
  if (!more) return;
  for (const name of served) await attempt(() => runProjects([name], chosen.files, { ...env, ...more }, folder));
}

const chosen = readArguments(process.argv.slice(2));
await attempt(async () => {
  checkNode();
  await ensurePackages();
  await sweepAbandoned();
  const folder = mkdtempSync(path.join(os.tmpdir(), testFolderPrefix));
  // The database server’s account must be able to enter it.
  chmodSync(folder, 0o755);
  noteProcess(path.join(folder, 'test.pid'), process.pid);
  const cluster = new PrivateCluster(path.join(folder, 'home'), { throwAway: true });
  let stopping = false;
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(signal, () => {
      if (stopping) return;
      stopping = true;
      endRunning();
      void clearTestFolder(folder).finally(() => process.exit(1));
    });
  }
  try {
    await runAll(chosen, cluster, folder);
  } finally {
    if (!stopping) await clearTestFolder(folder);
  }
});
if (passed + failed === 0) {
  failed++;
  console.error('No check was made: no test file matches');
}
console.log(`${passed} passed, ${failed} failed`);
if (failed > 0) process.exitCode = 1;
