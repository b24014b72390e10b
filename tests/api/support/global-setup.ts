import type { TestProject } from 'vitest/node';
import { readConfig } from '../../../server/config.js';
import { migrate } from '../../../server/migrate.js';
import { adminQuery, databaseUrl } from './databases.js';

declare module 'vitest' {
  export interface ProvidedContext {
    /** Database with schema, reference values and demo teams that each test file copies; empty without a test database. */
    templateDatabase: string;
  }
}

/** Makes the database that the test files copy: migrated, granted and loaded once, by the program’s own means. */
export default async function setup(project: TestProject): Promise<(() => Promise<void>) | void> {
  const { TEST_DATABASE_OWNER_URL: owner, TEST_DATABASE_URL: application, TRIMWICK_TEST_FOLDER } = process.env;
  if (!owner || !application) {
    project.provide('templateDatabase', '');
    return;
  }
  const template = `template_${String(process.pid)}`;
  await adminQuery(`CREATE DATABASE ${template}`);
  await migrate(
    readConfig({
      DATABASE_URL: databaseUrl(application, template),
      DATABASE_OWNER_URL: databaseUrl(owner, template),
      TRIMWICK_DEMO: '1',
      TRIMWICK_HOME: TRIMWICK_TEST_FOLDER,
      SESSION_KEY: Buffer.alloc(32, 7).toString('base64url'),
      NODE_ENV: 'test',
    }),
  );
  project.provide('templateDatabase', template);
  return async () => {
    await adminQuery(`DROP DATABASE IF EXISTS ${template}`);
  };
}
