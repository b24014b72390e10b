import { createServer } from 'node:http';
import { makeApp } from './app.js';
import { ConfigError, readConfig } from './config.js';
import type { AppContext } from './context.js';
import { makeDataSource } from './database/data-source.js';
import { makeLog } from './log.js';
import { Workers } from './workers/pool.js';

/** How long open requests may take to end after a stop was asked for [ms]. */
const stopPatienceMs = 10_000;

function fail(message: string): never {
  process.stderr.write(`trimwick: ${message}\n`);
  process.exit(1);
}

async function start(): Promise<void> {
  const config = readConfig(process.env);
  const log = makeLog(config.logLevel);
  const dataSource = makeDataSource(config.databaseUrl);
  try {
    await dataSource.initialize();
  } catch (error) {
    const { hostname, port } = new URL(config.databaseUrl);
    fail(
      `The database at ${hostname}:${port || '5432'} cannot be reached: ${error instanceof Error ? error.message : String(error)}`,
    );
  }
  const workers = new Workers();
  const context: AppContext = { config, dataSource, workers, background: new Set(), now: () => new Date() };
  const server = createServer(makeApp(context, log));
  server.on('error', (error: NodeJS.ErrnoException) => {
    fail(error.code === 'EADDRINUSE' ? `Port ${String(config.port)} is in use` : error.message);
  });
  server.listen(config.port, config.host);

  let stopping = false;
  const stop = (): void => {
    if (stopping) return;
    stopping = true;
    setTimeout(() => process.exit(0), stopPatienceMs).unref();
    server.close(() => {
      void (async () => {
        await Promise.all(context.background);
        await workers.close();
        await dataSource.destroy();
        process.exit(0);
      })();
    });
    // Connections that fall idle after their last answer, too.
    setInterval(() => {
      server.closeIdleConnections();
    }, 50).unref();
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
}

start().catch((error: unknown) => {
  fail(
    error instanceof ConfigError
      ? error.message
      : error instanceof Error
        ? (error.stack ?? error.message)
        : String(error),
  );
});
