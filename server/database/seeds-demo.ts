import { randomUUID } from 'node:crypto';
import { readFileSync } from 'node:fs';
import type { Role } from '../../shared/roles.js';
import { assemblyDocumentSchema } from '../../shared/schemas/assembly.js';
import { resolveDemoReferences } from '../../shared/schemas/demo.js';
import type { Actor, AppContext } from '../context.js';
import { createAssembly } from '../services/assemblies.js';
import { askForDecision } from '../services/askDecision.js';
import { decide } from '../services/decide.js';
import { dataFolder } from './data-folder.js';

/** The published password of the demo people; such teams are only ever made on a loopback start. */
const demoPassword = 'trim-the-wick-4310';

const demoTeams: { name: string; people: { name: string; email: string; roles: Role[] }[] }[] = [
  {
    name: 'Brackenmoor Lanterns',
    people: [
      { name: 'Ada Whin', email: 'admin@brackenmoor.example', roles: ['admin'] },
      { name: 'Dorrit Sedge', email: 'designer@brackenmoor.example', roles: ['designer'] },
      { name: 'Edmund Peat', email: 'engineer@brackenmoor.example', roles: ['engineer'] },
      { name: 'Rowan Heath', email: 'reviewer@brackenmoor.example', roles: ['reviewer'] },
      { name: 'Vera Ling', email: 'viewer@brackenmoor.example', roles: ['viewer'] },
    ],
  },
  {
    name: 'Saltmarsh Instruments',
    people: [{ name: 'Enid Creek', email: 'engineer@saltmarsh.example', roles: ['engineer'] }],
  },
];

async function makeTeams(context: AppContext): Promise<Map<string, Actor> | null> {
  const { dataSource, workers, now } = context;
  const passwordHash = await workers.hashPassword(demoPassword);
  return dataSource.transaction(async (manager) => {
    await manager.query('SELECT pg_advisory_xact_lock(4310, 2)');
    const [known] = await manager.query<unknown[]>('SELECT 1 FROM users WHERE email = $1', [
      demoTeams[0]?.people[0]?.email,
    ]);
    if (known) return null;
    const actors = new Map<string, Actor>();
    for (const team of demoTeams) {
      const teamId = randomUUID();
      await manager.query('INSERT INTO teams (id, name, created_at) VALUES ($1, $2, $3)', [teamId, team.name, now()]);
      for (const person of team.people) {
        const userId = randomUUID();
        await manager.query(
          'INSERT INTO users (id, email, name, password_hash, created_at) VALUES ($1, $2, $3, $4, $5)',
          [userId, person.email, person.name, passwordHash, now()],
        );
        await manager.query('INSERT INTO memberships (team_id, user_id, roles) VALUES ($1, $2, $3)', [
          teamId,
          userId,
          person.roles,
        ]);
        const { name, email, roles } = person;
        actors.set(email, { userId, name, email, teamId, teamName: team.name, roles, sessionId: randomUUID() });
      }
    }
    // The administrator belongs to both, so that changing teams can be tried.
    const admin = actors.get('admin@brackenmoor.example');
    const other = actors.get('engineer@saltmarsh.example');
    await manager.query('INSERT INTO memberships (team_id, user_id, roles) VALUES ($1, $2, $3)', [
      other?.teamId,
      admin?.userId,
      ['viewer'],
    ]);
    return actors;
  });
}

async function readDemo(context: AppContext, file: string): Promise<Record<string, unknown>> {
  const rows = await context.dataSource.query<{ kind: string; slug: string; version: string }[]>(
    `SELECT DISTINCT ON (v.id) v.kind, v.slug, n.id AS version FROM reference_values v
     JOIN reference_value_versions n ON n.value_id = v.id ORDER BY v.id, n.number DESC`,
  );
  const versions = new Map(rows.map(({ kind, slug, version }) => [`${kind}:${slug}`, version]));
  const resolved = resolveDemoReferences(
    JSON.parse(readFileSync(new URL(`demo/${file}.json`, dataFolder), 'utf8')),
    ({ kind, slug }) => {
      const version = versions.get(`${kind}:${slug}`);
      if (version === undefined) throw new Error(`The demo names a ${kind} “${slug}” that is not there`);
      return { version };
    },
  );
  return assemblyDocumentSchema.parse(resolved) as unknown as Record<string, unknown>;
}

/** Makes the two demo teams and their three assemblies through the services that people use. Does nothing the second time. */
export async function loadDemoTeams(context: AppContext): Promise<void> {
  const actors = await makeTeams(context);
  if (actors === null) return;
  const person = (role: string): Actor => {
    const actor = actors.get(`${role}@brackenmoor.example`);
    if (!actor) throw new Error(`No demo ${role}`);
    return actor;
  };
  await createAssembly(context, person('designer'), { document: await readDemo(context, 'stall-lantern') });
  await createAssembly(context, person('engineer'), { document: await readDemo(context, 'driver-box') });
  const box = await createAssembly(context, person('engineer'), { document: await readDemo(context, 'load-box') });
  const asked = await askForDecision(context, person('engineer'), {
    assemblyId: box.id,
    expectedVersion: box.draft.version,
    statement: 'Run the load box at its present current, continuously, on an open bench and in the warm store.',
    covers: { product: 'Bench load box', variant: 'four resistors', file: '', fileSha256: '' },
  });
  await decide(context, person('reviewer'), asked.id, {
    expectedVersion: asked.version,
    outcome: 'accepted',
    reason: 'All limits hold in the warm store with the margins of the plain workshop set; the case stays touchable.',
    conditions: [],
    flagsTaken: asked.redFlags.map(({ id }) => ({
      id,
      reason: 'Looked at: the margin stays well above what this could move.',
    })),
    password: demoPassword,
  });
}
