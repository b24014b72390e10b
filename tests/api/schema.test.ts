import { randomUUID } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeDataSource } from '../../server/database/data-source.js';
import { migrations } from '../../server/database/migrations/index.js';
import { loadReferenceValues } from '../../server/database/seeds-reference.js';
import { migrate } from '../../server/migrate.js';
import { adminQuery, databaseUrl, requireUrl } from './support/databases.js';
import { TestServer } from './support/server.js';

let server: TestServer;
beforeAll(async () => {
  server = await TestServer.start();
});
afterAll(() => server.stop());

const insertOnly = [
  'decision_events',
  'revisions',
  'revision_contributors',
  'reference_values',
  'reference_value_versions',
  'audit_entries',
];

describe('the entities', () => {
  it('and the migrated schema say the same', async () => {
    const { upQueries } = await server.owner.driver.createSchemaBuilder().log();
    expect(upQueries.map(({ query }) => query)).toEqual([]);
  });

  it('have an index that starts with the columns of every foreign key', async () => {
    const missing = await server.owner.query<{ name: string }[]>(
      `SELECT c.conname AS name FROM pg_constraint c
       WHERE c.contype = 'f' AND c.connamespace = 'public'::regnamespace AND NOT EXISTS (
         SELECT 1 FROM pg_index i WHERE i.indrelid = c.conrelid AND i.indpred IS NULL
           AND (SELECT array_agg(k ORDER BY k) FROM unnest(c.conkey) k) =
               (SELECT array_agg(k ORDER BY k) FROM unnest((i.indkey::int2[])[0:array_length(c.conkey, 1) - 1]) k))`,
    );
    expect(missing.map(({ name }) => name)).toEqual([]);
  });

  it('carry the team in every foreign key between a team’s tables', async () => {
    const loose = await server.owner.query<{ name: string }[]>(
      `SELECT c.conname AS name FROM pg_constraint c
       WHERE c.contype = 'f' AND c.connamespace = 'public'::regnamespace
         AND EXISTS (SELECT 1 FROM pg_attribute a WHERE a.attrelid = c.conrelid AND a.attname = 'team_id')
         AND EXISTS (SELECT 1 FROM pg_attribute a WHERE a.attrelid = c.confrelid AND a.attname = 'team_id')
         AND NOT EXISTS (SELECT 1 FROM unnest(c.conkey) k
           JOIN pg_attribute a ON a.attrelid = c.conrelid AND a.attnum = k WHERE a.attname = 'team_id')`,
    );
    expect(loose).toEqual([]);
  });

  it('leave no team open: team_id is never null', async () => {
    const nullable = await server.owner.query<unknown[]>(
      `SELECT table_name FROM information_schema.columns
       WHERE table_schema = 'public' AND column_name = 'team_id' AND is_nullable = 'YES'`,
    );
    expect(nullable).toEqual([]);
  });
});

describe('the migrations', () => {
  it('go down to nothing and up again to the same schema', async () => {
    const name = `migrations_${randomUUID().replaceAll('-', '')}`;
    await adminQuery(`CREATE DATABASE ${name}`);
    const fresh = await makeDataSource(databaseUrl(requireUrl('TEST_DATABASE_OWNER_URL'), name)).initialize();
    try {
      for (let round = 0; round < 2; round++) {
        await fresh.runMigrations({ transaction: 'all' });
        expect((await fresh.driver.createSchemaBuilder().log()).upQueries).toEqual([]);
        for (let i = 0; i < migrations.length; i++) await fresh.undoLastMigration({ transaction: 'all' });
        const left = await fresh.query<{ tablename: string }[]>(
          `SELECT tablename FROM pg_tables WHERE schemaname = 'public'`,
        );
        expect(left.map(({ tablename }) => tablename)).toEqual(['migrations']);
      }
    } finally {
      await fresh.destroy();
      await adminQuery(`DROP DATABASE ${name}`);
    }
  });

  it('run by two processes at once leave one schema and one set of demo teams', async () => {
    const name = `twice_${randomUUID().replaceAll('-', '')}`;
    await adminQuery(`CREATE DATABASE ${name}`);
    const config = {
      ...server.context.config,
      ownerUrl: databaseUrl(requireUrl('TEST_DATABASE_OWNER_URL'), name),
      databaseUrl: databaseUrl(requireUrl('TEST_DATABASE_URL'), name),
      demo: true,
    };
    try {
      await Promise.all([migrate(config), migrate(config)]);
      await migrate(config);
      const owner = await makeDataSource(config.ownerUrl).initialize();
      const count = async (table: string) =>
        Number((await owner.query<[{ count: string }]>(`SELECT count(*) FROM ${table}`))[0].count);
      expect(await count('teams')).toBe(2);
      expect(await count('users')).toBe(6);
      expect(await count('assemblies')).toBe(3);
      expect(await count('decision_events')).toBe(2);
      await owner.destroy();
    } finally {
      await adminQuery(`DROP DATABASE ${name}`);
    }
  });
});

describe('the application’s role', () => {
  it.each(insertOnly.flatMap((table) => [`DELETE FROM ${table}`, `TRUNCATE ${table}`]))('may not %s', async (sql) => {
    await expect(server.context.dataSource.query(sql)).rejects.toThrow(/permission denied/);
  });

  it.each([
    `UPDATE decision_events SET reason = 'rewritten'`,
    `UPDATE revisions SET note = 'rewritten'`,
    `UPDATE revision_contributors SET user_id = user_id`,
    `UPDATE reference_value_versions SET content = '{}'`,
    `UPDATE audit_entries SET detail = '{}'`,
    `INSERT INTO reference_values (id, kind, slug) VALUES (gen_random_uuid(), 'material', 'own')`,
    `DELETE FROM decisions`,
    `DELETE FROM assemblies`,
    `UPDATE migrations SET name = 'other'`,
    `CREATE TABLE own (id integer)`,
    `ALTER TABLE decisions ADD own integer`,
    `DROP TABLE decision_events`,
  ])('may not %s', async (sql) => {
    await expect(server.context.dataSource.query(sql)).rejects.toThrow(/permission denied|must be owner/);
  });

  it('cannot give itself more', async () => {
    // PostgreSQL answers a grant of what one may not give with a warning only.
    await server.context.dataSource.query('GRANT UPDATE ON decision_events TO CURRENT_USER');
    const rewrite = server.context.dataSource.query(`UPDATE decision_events SET reason = 'rewritten'`);
    await expect(rewrite).rejects.toThrow(/permission denied/);
  });

  it('may do what the services do', async () => {
    await expect(server.context.dataSource.query('DELETE FROM sessions WHERE false')).resolves.toBeDefined();
    await expect(server.context.dataSource.query('SELECT 1 FROM decision_events')).resolves.toHaveLength(2);
  });
});

describe('the check constraints', () => {
  it.each([
    [`UPDATE users SET email = 'Upper@brackenmoor.example'`, /users_email_lower/],
    [`UPDATE memberships SET roles = '{owner}'`, /memberships_roles_known/],
    [`UPDATE decisions SET state = 'maybe'`, /decisions_state_known/],
    [`UPDATE decisions SET decided_by = NULL, decided_at = NULL`, /decisions_decided_by_somebody/],
    [`UPDATE decisions SET decided_at = NULL`, /decisions_decided_whole/],
    [`UPDATE assembly_drafts SET version = 0`, /assembly_drafts_version_positive/],
    [`UPDATE decision_events SET snapshot_sha256 = NULL WHERE snapshot IS NOT NULL`, /decision_events_snapshot_whole/],
    [`UPDATE reference_values SET kind = 'rumour'`, /reference_values_kind_known/],
  ])('stand against even the owner’s %s', async (sql, name) => {
    await expect(server.owner.query(sql)).rejects.toThrow(name);
  });
});

describe('loading reference values again', () => {
  const versions = () =>
    server.owner.query<{ number: number; content: { name: string } }[]>(
      `SELECT n.number, n.content FROM reference_value_versions n JOIN reference_values v ON v.id = n.value_id
       WHERE v.kind = 'material' AND v.slug = 'petg' ORDER BY n.number`,
    );
  const total = async () =>
    (await server.owner.query<[{ count: string }]>('SELECT count(*) FROM reference_value_versions'))[0].count;

  it('adds nothing where nothing has changed', async () => {
    const before = await total();
    await loadReferenceValues(server.owner);
    expect(await total()).toBe(before);
  });

  it('adds a further version where the content has, and leaves the earlier one as it was', async () => {
    const earlier = JSON.parse(readFileSync(new URL('../../data/materials.json', import.meta.url), 'utf8')) as {
      slug: string;
      name: string;
    }[];
    await server.owner.query(
      `UPDATE reference_value_versions SET content = jsonb_set(content, '{name}', '"An earlier name"'), content_sha256 = 'other'
       WHERE value_id = (SELECT id FROM reference_values WHERE kind = 'material' AND slug = 'petg')`,
    );
    await loadReferenceValues(server.owner);
    const rows = await versions();
    expect(rows.map(({ number, content }) => [number, content.name])).toEqual([
      [1, 'An earlier name'],
      [2, earlier.find(({ slug }) => slug === 'petg')?.name],
    ]);
    const viewer = await server.as('viewer');
    const shown = (await viewer.get('/api/v1/materials/petg')).body as { number: number };
    expect(shown.number).toBe(2);
  });
});
