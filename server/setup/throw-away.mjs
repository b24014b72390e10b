import { existsSync, readdirSync, rmSync, statSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { PrivateCluster } from './postgres.mjs';
import { notedProcess } from './processes.mjs';

/** What a test run’s folder, in the system’s place for temporary files, begins with. */
export const testFolderPrefix = 'trimwick-test-';

/** Stops and removes what test runs that were killed have left. */
export async function sweepAbandoned() {
  for (const name of readdirSync(os.tmpdir())) {
    const folder = path.join(os.tmpdir(), name);
    const note = path.join(folder, 'test.pid');
    if (!name.startsWith(testFolderPrefix) || !existsSync(note)) continue;
    if (statSync(note).uid !== process.getuid?.() || notedProcess(note)) continue;
    const home = path.join(folder, 'home');
    if (existsSync(path.join(home, 'postgres'))) {
      const cluster = new PrivateCluster(home, { throwAway: true });
      await cluster.prepare();
      await cluster.stop();
    }
    rmSync(folder, { recursive: true, force: true });
  }
}
