import { existsSync, readdirSync, rmSync, statSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { PrivateCluster } from './postgres.mjs';
import { endLeftovers, endStart, notedProcess } from './processes.mjs';

/** What a test run’s folder, in the system’s place for temporary files, begins with. */
export const testFolderPrefix = 'trimwick-test-';

/** The homes that tests made in a folder: where a start, a server or a database is noted. */
function homesIn(folder, depth = 3) {
  const names = readdirSync(folder);
  const own = names.some((name) => ['start.pid', 'server.pid', 'postgres'].includes(name)) ? [folder] : [];
  if (own.length > 0 || depth === 0) return own;
  return names
    .map((name) => path.join(folder, name))
    .filter((inner) => statSync(inner).isDirectory())
    .flatMap((inner) => homesIn(inner, depth - 1));
}

/** Ends what a test run has started and not ended, as when it was stopped on the way, and removes its folder. */
export async function clearTestFolder(folder) {
  for (const home of homesIn(folder)) {
    await endStart(home);
    await endLeftovers(home);
    if (existsSync(path.join(home, 'postgres', 'postmaster.pid'))) {
      const cluster = new PrivateCluster(home);
      await cluster.prepare();
      await cluster.stop();
    }
  }
  rmSync(folder, { recursive: true, force: true });
}

/** Clears what test runs that were killed have left. */
export async function sweepAbandoned() {
  for (const name of readdirSync(os.tmpdir())) {
    const folder = path.join(os.tmpdir(), name);
    const note = path.join(folder, 'test.pid');
    if (!name.startsWith(testFolderPrefix) || !existsSync(note)) continue;
    if (statSync(note).uid !== process.getuid?.() || notedProcess(note)) continue;
    await clearTestFolder(folder);
  }
}
