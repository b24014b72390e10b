import { existsSync } from 'node:fs';
import { aptInstall } from './apt.mjs';
import { SetupError } from './fail.mjs';
import { run } from './run.mjs';

const place = '/usr/bin/python3';

async function hasScipy(python) {
  if (!existsSync(python)) return false;
  const { code } = await run(python, ['-c', 'import scipy.optimize, scipy.sparse'], { quiet: true });
  return code === 0;
}

/** Path of Debian’s Python with SciPy, by which tests compute networks and plates a second time; installed where it is missing. */
export async function ensurePython() {
  const python = process.env.PYTHON_PATH ?? place;
  if (await hasScipy(python)) return python;
  await aptInstall('python3-scipy', 'Python with SciPy (for the reference tests)');
  if (await hasScipy(place)) return place;
  throw new SetupError(`SciPy is installed, and ${place} does not find it`);
}
