import type { DataSource } from 'typeorm';

/** Tables whose rows are never changed or removed by the application. */
const insertOnly = [
  'decision_events',
  'revisions',
  'revision_contributors',
  'reference_values',
  'reference_value_versions',
  'audit_entries',
];

/** The only tables that the application removes rows from: what it keeps of people’s work is never deleted. */
const removable = ['sessions', 'sign_in_failures'];

function quoted(name: string): string {
  return `"${name.replaceAll('"', '""')}"`;
}

/** Gives the application’s role what it needs and no more. Does nothing where owner and application are one. */
export async function grantToApplication(dataSource: DataSource, applicationRole: string): Promise<void> {
  const [{ current_user: owner }] = await dataSource.query<[{ current_user: string }]>('SELECT current_user');
  if (owner === applicationRole) return;
  const role = quoted(applicationRole);
  await dataSource.query(`GRANT USAGE ON SCHEMA public TO ${role}`);
  await dataSource.query(`GRANT SELECT, INSERT, UPDATE ON ALL TABLES IN SCHEMA public TO ${role}`);
  await dataSource.query(`REVOKE DELETE, TRUNCATE ON ALL TABLES IN SCHEMA public FROM ${role}`);
  await dataSource.query(`GRANT DELETE ON ${removable.join(', ')} TO ${role}`);
  await dataSource.query(`REVOKE UPDATE ON ${insertOnly.join(', ')} FROM ${role}`);
  await dataSource.query(`REVOKE INSERT ON reference_values, reference_value_versions FROM ${role}`);
  await dataSource.query(`REVOKE INSERT, UPDATE ON migrations FROM ${role}`);
}
