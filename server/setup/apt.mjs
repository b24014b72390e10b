import { SetupError, tellingLine } from './fail.mjs';
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
  const update = await run('apt-get', ['update'], { quiet: true, env });
  const options = ['-y', '--no-install-recommends', '-o', 'DPkg::Lock::Timeout=120'];
  const { code, output } = await run('apt-get', ['install', ...options, name], { quiet: true, env });
  if (code !== 0) {
    // Without its lists the installation only says that it knows no such package.
    const said = tellingLine(update.code === 0 ? output : update.output);
    throw new SetupError(`${what} is missing and could not be installed (${line}): ${said}`);
  }
}
