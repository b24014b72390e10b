import pg from 'pg';

/** The same server and role, another database. */
export function databaseUrl(url: string, name: string): string {
  const changed = new URL(url);
  changed.pathname = `/${name}`;
  return changed.href;
}

export function requireUrl(name: 'TEST_DATABASE_OWNER_URL' | 'TEST_DATABASE_URL'): string {
  const url = process.env[name];
  if (!url) throw new Error(`${name} is not set: run these tests through npm test -- --only api`);
  return url;
}

/** Runs a statement beside every test database, with the role that may make them. */
export async function adminQuery(statement: string): Promise<void> {
  const client = new pg.Client({ connectionString: requireUrl('TEST_DATABASE_OWNER_URL') });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}
