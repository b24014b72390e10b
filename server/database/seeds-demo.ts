import { randomUUID } from 'node:crypto';
import { readFileSync } from 'node:fs';
import type { DataSource } from 'typeorm';
import type { Role } from '../../shared/roles.js';
import type { Assembly } from '../../shared/schemas/assembly-records.js';
import { assemblyDocumentSchema } from '../../shared/schemas/assembly.js';
import { resolveDemoReferences } from '../../shared/schemas/demo.js';
import type { Actor, AppContext } from '../context.js';
import { createAssembly } from '../services/assemblies.js';
import { askForDecision } from '../services/askDecision.js';
import { decide } from '../services/decide.js';
import { dataFolder } from './data-folder.js';

/** Names of the demo’s own requests: sent again they answer with what the first made, so that loading can go on after a stop. */
const requests = {
  stallLantern: '6b0d6d52-5a0e-4c6e-9a55-1d6d6b3e4310',
  driverBox: '0f3d9a41-7c1b-4f0b-8f5e-2c5a7a1e4310',
  loadBox: 'c7a5e0d8-3b52-4d8e-b1a4-9e2f5b7c4310',
  loadBoxDecision: 'e2c49d10-86fb-4a3e-9d07-5b1c8e6f4310',
};

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

/** True where the demo people can sign in. */
export async function hasDemoTeams(dataSource: DataSource): Promise<boolean> {
  const emails = demoTeams.flatMap(({ people }) => people.map(({ email }) => email));
  const [known] = await dataSource.query<unknown[]>('SELECT 1 FROM users WHERE email = ANY($1) LIMIT 1', [emails]);
  return known !== undefined;
}

async function makeTeams(context: AppContext): Promise<void> {
  const { dataSource, workers, now } = context;
  const passwordHash = await workers.hashPassword(demoPassword);
  await dataSource.transaction(async (manager) => {
    await manager.query('SELECT pg_advisory_xact_lock(4310, 2)');
    const [known] = await manager.query<unknown[]>('SELECT 1 FROM users WHERE email = $1', [
      demoTeams[0]?.people[0]?.email,
    ]);
    if (known) return;
    const ids = new Map<string, { userId: string; teamId: string }>();
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
        ids.set(person.email, { userId, teamId });
      }
    }
    // The administrator belongs to both, so that changing teams can be tried.
    const admin = ids.get('admin@brackenmoor.example');
    const other = ids.get('engineer@saltmarsh.example');
    await manager.query('INSERT INTO memberships (team_id, user_id, roles) VALUES ($1, $2, $3)', [
      other?.teamId,
      admin?.userId,
      ['viewer'],
    ]);
  });
}

/** The demo’s people in the first team as they stand now. */
async function findPeople(context: AppContext): Promise<Map<string, Actor>> {
  const rows = await context.dataSource.query<Omit<Actor, 'sessionId'>[]>(
    `SELECT u.id AS "userId", u.name, u.email, t.id AS "teamId", t.name AS "teamName", m.roles
     FROM users u JOIN memberships m ON m.user_id = u.id JOIN teams t ON t.id = m.team_id
     WHERE u.email LIKE '%@brackenmoor.example' AND t.name = $1`,
    [demoTeams[0]?.name],
  );
  return new Map(rows.map((row) => [row.email, { ...row, sessionId: randomUUID() }]));
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
  return assemblyDocumentSchema.parse(resolved);
}

async function makeAssembly(context: AppContext, actor: Actor, file: string, requestId: string): Promise<Assembly> {
  return createAssembly(context, actor, { document: await readDemo(context, file), requestId });
}

/** Asks for the load box’s decision and has it accepted, through the same services that people use. */
async function decideOnLoadBox(context: AppContext, engineer: Actor, reviewer: Actor): Promise<void> {
  const box = await makeAssembly(context, engineer, 'load-box', requests.loadBox);
  const asked = await askForDecision(context, engineer, {
    assemblyId: box.id,
    expectedVersion: box.draft.version,
    statement: 'Run the load box at its present current, continuously, on an open bench and in the warm store.',
    covers: { product: 'Bench load box', variant: 'four resistors', file: '', fileSha256: '' },
    requestId: requests.loadBoxDecision,
  });
  if (asked.state !== 'asked' || asked.version !== 1) return;
  await decide(context, reviewer, asked.id, {
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

/**
 * Makes the two demo teams and their three assemblies. What an earlier, interrupted start has made is kept; where all
 * is there, or somebody has been at work, nothing is done.
 */
export async function loadDemoTeams(context: AppContext): Promise<void> {
  await makeTeams(context);
  const people = await findPeople(context);
  const [designer, engineer, reviewer] = ['designer', 'engineer', 'reviewer'].map((role) =>
    people.get(`${role}@brackenmoor.example`),
  );
  // Somebody has changed the team since: it is theirs now.
  if (!designer || !engineer || !reviewer) return;
  const [complete] = await context.dataSource.query<unknown[]>(
    'SELECT 1 FROM decision_events WHERE team_id = $1 AND sequence = 2',
    [engineer.teamId],
  );
  if (complete) return;
  await makeAssembly(context, designer, 'stall-lantern', requests.stallLantern);
  await makeAssembly(context, engineer, 'driver-box', requests.driverBox);
  await decideOnLoadBox(context, engineer, reviewer);
}
