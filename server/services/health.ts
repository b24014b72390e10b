import { readFileSync } from 'node:fs';
import type { AppContext } from '../context.js';
import { DomainError } from '../errors.js';

function readVersion(): string {
  for (const up of ['../../package.json', '../../../package.json']) {
    try {
      return (JSON.parse(readFileSync(new URL(up, import.meta.url), 'utf8')) as { version: string }).version;
    } catch {
      // From the build it lies one folder higher than from the sources.
    }
  }
  return 'unknown';
}

export const version = readVersion();

/** @throws DomainError 503 naming the part that is down */
export async function health({ dataSource }: AppContext): Promise<{ status: 'ok'; database: 'ok'; version: string }> {
  try {
    await dataSource.query('SELECT 1');
  } catch {
    throw new DomainError(503, 'database-down', 'The database cannot be reached', [], {
      health: { status: 'down', database: 'down', version },
    });
  }
  return { status: 'ok', database: 'ok', version };
}
