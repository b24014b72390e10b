import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { capabilities, roles, type Capability, type Role } from '../../shared/roles.js';
import { allRoutes } from '../../server/routes/all.js';
import { openApiDocument } from '../../server/openapi.js';
import { demoDocument, rodNetwork, type Json } from './support/documents.js';
import type { Person } from './support/person.js';
import { TestServer } from './support/server.js';

interface Operation {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  path: string;
  access: 'public' | Capability;
  hasBody: boolean;
  parameters: string[];
}

/** Every operation of the published document: what is not walked here does not exist. */
function readOperations(): Operation[] {
  const { paths } = openApiDocument(allRoutes) as {
    paths: Record<string, Record<string, { 'x-capability': Operation['access']; requestBody?: unknown }>>;
  };
  return Object.entries(paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(([method, operation]) => ({
      method: method as Operation['method'],
      path,
      access: operation['x-capability'],
      hasBody: operation.requestBody !== undefined,
      parameters: [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name ?? ''),
    })),
  );
}

const operations = readOperations();
const guardedOnes = operations.filter(({ access }) => access !== 'public');
const reason = 'a reason that is long enough';

/** A body that is valid where the thing is there, for each operation with parameters that takes one. */
const bodies: Record<string, Json> = {
  'put /api/v1/members/{userId}/roles': { roles: ['viewer'] },
  'put /api/v1/assemblies/{id}/draft': { expectedVersion: 1, document: { name: 'taken over' } },
  'post /api/v1/assemblies/{id}/duplicate': { name: 'taken over' },
  'post /api/v1/assemblies/{id}/revisions': { expectedVersion: 1, note: '' },
  'post /api/v1/assemblies/{id}/estimates': {},
  'post /api/v1/decisions/{id}/outcome': { expectedVersion: 1, outcome: 'returned', reason },
  'post /api/v1/decisions/{id}/withdraw': { expectedVersion: 1, reason },
};

/** Operations on values that ship with the program and belong to no team. */
const shared = /^\/api\/v1\/(materials|finishes|parts|rule-sets)\//;

let server: TestServer;
/** Ids of things of the first team. */
let ours: Record<string, string>;
/** A person of the second team who holds every role there. */
let stranger: Person;

beforeAll(async () => {
  server = await TestServer.start();
  await server.owner.query(
    `UPDATE memberships SET roles = ARRAY['viewer','designer','engineer','reviewer','admin'] WHERE user_id =
     (SELECT id FROM users WHERE email = 'engineer@saltmarsh.example')`,
  );
  stranger = await server.as('engineer@saltmarsh.example');
  const engineer = await server.as('engineer');
  const assembly = await engineer.post('/api/v1/assemblies', { document: demoDocument() });
  const asked = await engineer.post('/api/v1/decisions', {
    assemblyId: (assembly.body as { id: string }).id,
    expectedVersion: 1,
    statement: 'May this be built as it stands?',
    covers: { product: 'Load box' },
  });
  expect(asked.status).toBe(201);
  const session = await engineer.get('/api/v1/session');
  ours = {
    assembly: (assembly.body as { id: string }).id,
    decision: (asked.body as { id: string }).id,
    userId: (session.body as { user: { id: string } }).user.id,
    team: (session.body as { team: { id: string } }).team.id,
  };
});

afterAll(() => server.stop());

/** The address with ids filled in: of things of the first team, or of nothing. */
function addressOf({ path }: Operation, owned: boolean): string {
  const id = path.includes('/decisions/') ? ours.decision : ours.assembly;
  return path
    .replace('{id}', owned ? (id ?? '') : randomUUID())
    .replace('{userId}', owned ? (ours.userId ?? '') : randomUUID())
    .replace('{number}', '1')
    .replace('{key}', 'petg');
}

/** A demo person with just the role, and one without any role that would do. */
function personWithout(access: Capability): Role | undefined {
  return roles.find((role) => !(capabilities[access] as readonly Role[]).includes(role));
}

async function call(person: Person, operation: Operation, owned: boolean) {
  const body = bodies[`${operation.method} ${operation.path}`] ?? (operation.hasBody ? {} : undefined);
  return person.send(operation.method, addressOf(operation, owned), body);
}

describe('every operation of the OpenAPI document', () => {
  it('is the whole API: as many operations as routes', () => {
    expect(operations).toHaveLength(allRoutes.length);
    expect(operations.length).toBeGreaterThan(25);
  });

  it('is public for signing in and for health only', () => {
    const open = operations.filter(({ access }) => access === 'public').map(({ method, path }) => `${method} ${path}`);
    expect(open.sort()).toEqual(['get /api/v1/health', 'post /api/v1/session']);
  });

  it.each(guardedOnes)('$method $path answers 401 without a session', async (operation) => {
    const answer = await call(server.nobody(), operation, true);
    expect(answer.status).toBe(401);
  });

  it.each(guardedOnes.filter(({ access }) => access !== 'read'))(
    '$method $path answers 403 to a role without the capability $access',
    async (operation) => {
      const role = personWithout(operation.access as Capability);
      expect(role).toBeDefined();
      const answer = await call(await server.as(role ?? ''), operation, true);
      expect(answer.status).toBe(403);
    },
  );

  it('has a body to try for each operation with parameters that takes one', () => {
    const missing = guardedOnes
      .filter(({ hasBody, parameters }) => hasBody && parameters.length > 0)
      .map(({ method, path }) => `${method} ${path}`)
      .filter((key) => !(key in bodies));
    expect(missing).toEqual([]);
  });

  it.each(guardedOnes.filter(({ parameters, path }) => parameters.length > 0 && !shared.test(path)))(
    '$method $path answers 404 for another team’s id, exactly as for one that is not there',
    async (operation) => {
      const foreign = await call(stranger, operation, true);
      const absent = await call(stranger, operation, false);
      expect(foreign.status).toBe(404);
      expect(foreign.body).toEqual(absent.body);
    },
  );
});

describe('ids of another team inside a body', () => {
  it('are not there when asking for a decision or recording a self-check', async () => {
    const body = { expectedVersion: 1, statement: 'May this be built?', covers: { product: 'Theirs' } };
    for (const path of ['/api/v1/decisions', '/api/v1/decisions/self-check']) {
      // The second member of the other team would make a self-check a conflict before anything is looked up.
      await server.owner.query(
        `DELETE FROM memberships m USING teams t WHERE t.id = m.team_id AND t.name = 'Saltmarsh Instruments' AND m.roles = ARRAY['viewer']`,
      );
      const answer = await stranger.post(path, { ...body, assemblyId: ours.assembly });
      expect(answer.status).toBe(404);
    }
  });

  it('are not there when changing to a team that one does not belong to', async () => {
    const answer = await stranger.post('/api/v1/session/team', { teamId: ours.team });
    expect(answer.status).toBe(404);
  });

  it('are not there when an own assembly continues another team’s decision', async () => {
    const own = await stranger.post('/api/v1/assemblies', { document: demoDocument() });
    const answer = await stranger.post('/api/v1/decisions', {
      assemblyId: (own.body as { id: string }).id,
      decisionId: ours.decision,
      expectedVersion: 1,
      statement: 'May this be built?',
      covers: { product: 'Theirs' },
    });
    expect(answer.status).toBe(404);
  });
});

describe('lists', () => {
  it.each(['assemblies', 'decisions', 'members'])('of %s hold nothing of another team', async (name) => {
    const own = await (await server.as('viewer')).get(`/api/v1/${name}?pageSize=500`);
    const theirs = await stranger.get(`/api/v1/${name}?pageSize=500`);
    const idsOf = (body: unknown) => (body as { items: { id: string }[] }).items.map(({ id }) => id);
    expect(idsOf(own.body).length).toBeGreaterThan(0);
    expect(idsOf(theirs.body).filter((id) => idsOf(own.body).includes(id))).toEqual([]);
  });
});

describe('the schema', () => {
  it('refuses a revision of one team on an assembly of another, whatever the services do', async () => {
    const [team] = await server.owner.query<{ id: string }[]>(
      `SELECT id FROM teams WHERE name = 'Saltmarsh Instruments'`,
    );
    const insert = server.owner.query(
      `INSERT INTO revisions (team_id, id, assembly_id, number, document, draft_version, note, engine_version, created_by, created_at)
       VALUES ($1, $2, $3, 99, '{}', 1, '', '0', $4, now())`,
      [team?.id, randomUUID(), ours.assembly, ours.userId],
    );
    await expect(insert).rejects.toThrow(/revisions_assembly_fk/);
  });
});

it('computing needs no more than membership, and works for a viewer', async () => {
  const answer = await (await server.as('viewer')).post('/api/v1/networks/solve', rodNetwork());
  expect(answer.status).toBe(200);
  expect((answer.body as { temperaturesC: Record<string, number> }).temperaturesC.heater).toBeCloseTo(45, 9);
});
