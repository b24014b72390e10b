import { mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { startDemoInstance } from '../../../server/setup/demo-instance.mjs';
import { adminQuery, databaseUrl } from '../../api/support/databases.js';

/**
 * Starts the built program with fresh demo teams, and names its address in TRIMWICK_TEST_URL for the test files. Where
 * that is set already, the program that runs there is looked at instead.
 */
export default async function setup(): Promise<(() => Promise<void>) | void> {
  const { TEST_DATABASE_OWNER_URL: owner, TEST_DATABASE_URL: application, TRIMWICK_TEST_URL } = process.env;
  if (TRIMWICK_TEST_URL) return;
  if (!owner || !application) {
    throw new Error(
      'Browser tests need a database and a build: npm test -- --only browser, or TRIMWICK_TEST_URL=… for a running program',
    );
  }
  const database = `browser_${String(process.pid)}`;
  const home = mkdtempSync(path.join(process.env.TRIMWICK_TEST_FOLDER ?? os.tmpdir(), 'browser-'));
  await adminQuery(`CREATE DATABASE ${database}`);
  const instance = await startDemoInstance({
    applicationUrl: databaseUrl(application, database),
    ownerUrl: databaseUrl(owner, database),
    home,
  });
  process.env.TRIMWICK_TEST_URL = instance.base;
  return async () => {
    delete process.env.TRIMWICK_TEST_URL;
    await instance.stop();
    await adminQuery(`DROP DATABASE IF EXISTS ${database} WITH (FORCE)`);
    rmSync(home, { recursive: true, force: true });
  };
}
