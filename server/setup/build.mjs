import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { SetupError } from './fail.mjs';
import { packaged, root } from './paths.mjs';
import { run } from './run.mjs';

const builds = {
  client: {
    inputs: ['src', 'shared', 'index.html', 'vite.config.ts', 'package-lock.json'],
    command: ['vite', ['build', '--logLevel', 'warn']],
    outputs: ['dist/client'],
    entry: 'dist/client/index.html',
  },
  server: {
    inputs: ['server', 'shared', 'tsconfig.json', 'tsconfig.build.json', 'package-lock.json'],
    command: ['tsc', ['-p', 'tsconfig.build.json']],
    outputs: ['dist/server', 'dist/shared'],
    entry: 'dist/server/main.js',
  },
};

/** Scripts that are run as they are. */
const unbuilt = path.join(root, 'server', 'setup');

function addFile(hash, file) {
  if (file === unbuilt) return;
  if (statSync(file).isDirectory()) {
    for (const name of readdirSync(file).sort()) addFile(hash, path.join(file, name));
    return;
  }
  hash.update(path.relative(root, file)).update('\0').update(readFileSync(file)).update('\0');
}

/** Builds the client and the server where their inputs have changed since the last build. */
export async function ensureBuilt(which = ['server', 'client']) {
  for (const name of which) {
    const { inputs, command, outputs, entry } = builds[name];
    const hash = createHash('sha256');
    for (const input of inputs) addFile(hash, path.join(root, input));
    const digest = hash.digest('hex');
    const stamp = path.join(root, 'dist', `.${name}-inputs`);
    const fresh = existsSync(stamp) && readFileSync(stamp, 'utf8') === digest && existsSync(path.join(root, entry));
    if (fresh) continue;
    console.log(`Building the ${name} …`);
    // Without its stamp a build that is broken off is made again.
    for (const old of [stamp, ...outputs.map((output) => path.join(root, output))])
      rmSync(old, { recursive: true, force: true });
    const result = await run(packaged(command[0]), command[1], { quiet: true, env: { NODE_ENV: 'production' } });
    if (result.code !== 0) throw new SetupError(`The ${name} could not be built:\n${result.output.trim()}`);
    writeFileSync(stamp, digest);
  }
}
