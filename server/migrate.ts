import { ConfigError, isLoopback, readConfig, type Config } from './config.js';
import type { AppContext } from './context.js';
import { makeDataSource } from './database/data-source.js';
import { grantToApplication } from './database/grants.js';
import { hasDemoTeams, loadDemoTeams } from './database/seeds-demo.js';
import { loadReferenceValues } from './database/seeds-reference.js';
import { Workers } from './workers/pool.js';

/** Held while a process brings a database up to date, so that two that start at once do so one after the other. */
const migrationLock = '4310, 3';

/** The demo teams, made with the application’s role and through its services. */
async function makeDemo(config: Config): Promise<void> {
  const dataSource = makeDataSource(config.databaseUrl);
  await dataSource.initialize();
  const workers = new Workers();
  const context: AppContext = { config, dataSource, workers, background: new Set(), now: () => new Date() };
  try {
    await loadDemoTeams(context);
    await Promise.all(context.background);
  } finally {
    await workers.close();
    await dataSource.destroy();
  }
}

/** Brings a database up to date: migrations, grants, reference values, and where they are wanted the demo teams. */
export async function migrate(config: Config): Promise<void> {
  const owner = makeDataSource(config.ownerUrl);
  await owner.initialize();
  // Its connection holds the lock; closing it, however this ends, lets go.
  const runner = owner.createQueryRunner();
  try {
    await runner.query(`SELECT pg_advisory_lock(${migrationLock})`);
    await owner.runMigrations({ transaction: 'all' });
    await grantToApplication(owner, decodeURIComponent(new URL(config.databaseUrl).username));
    await loadReferenceValues(owner);
    if (config.demo) await makeDemo(config);
    else if (!isLoopback(config.host) && (await hasDemoTeams(owner))) {
      throw new ConfigError(
        `Settings: HOST: ${config.host} would let others reach this database’s demo teams, whose password is printed in the documentation; choose another TRIMWICK_HOME or database`,
      );
    }
  } finally {
    await runner.release();
    await owner.destroy();
  }
}

/** True when this file is what Node was started with. */
const isMain = process.argv[1] !== undefined && /migrate\.(js|ts)$/.test(process.argv[1]);

if (isMain) {
  try {
    await migrate(readConfig(process.env));
  } catch (error) {
    const unreachable =
      error instanceof Error &&
      /ECONNREFUSED|ENOTFOUND|ETIMEDOUT|password authentication/.test(
        `${error.message}${String((error as { code?: unknown }).code)}`,
      );
    const message =
      error instanceof Error ? error.message || String((error as { code?: unknown }).code) : String(error);
    const plain =
      error instanceof ConfigError
        ? message
        : unreachable
          ? `The database cannot be reached: ${message}`
          : (error as Error).stack;
    process.stderr.write(`trimwick: ${plain ?? message}\n`);
    process.exitCode = 1;
  }
}
