import { SetupError } from './fail.mjs';
import { run } from './run.mjs';

/** True when this process may install Debian’s packages. */
export function mayInstall() {
  return process.getuid?.() === 0;
}

/**
 * Installs a package of Debian’s.
 *
 * @throws SetupError with the one line to run where there is no right to, or where it failed
 */
export async function aptInstall(name, what) {
  const line = `sudo apt-get update && sudo apt-get install -y ${name}`;
  if (!mayInstall()) throw new SetupError(`${what} is missing. Install it, then start again: ${line}`);
  console.log(`Installing ${name} …`);
  const env = { DEBIAN_FRONTEND: 'noninteractive' };
  await run('apt-get', ['update'], { quiet: true, env });
  const { code, output } = await run('apt-get', ['install', '-y', '--no-install-recommends', name], {
    quiet: true,
    env,
  });
  if (code !== 0)
    throw new SetupError(
      `${what} is missing and could not be installed (${line}):\n${output.trim().split('\n').at(-1)}`,
    );
}
