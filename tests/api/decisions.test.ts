import { createHash, randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Assembly } from '../../shared/schemas/assembly-records.js';
import type { Decision, DecisionSummary } from '../../shared/schemas/decision.js';
import { changed, demoDocument, type Json } from './support/documents.js';
import type { Person } from './support/person.js';
import { demoPassword, TestServer } from './support/server.js';

let server: TestServer;
let engineer: Person;
let designer: Person;
let reviewer: Person;
let second: Person;
let admin: Person;
let viewer: Person;

/** A further member of the first team with the demo password. */
async function addPerson(email: string, name: string, roles: string[]): Promise<Person> {
  const [user] = await server.owner.query<{ id: string }[]>(
    `INSERT INTO users (id, email, name, password_hash, created_at)
     SELECT gen_random_uuid(), $1, $2, password_hash, now() FROM users LIMIT 1 RETURNING id`,
    [email, name],
  );
  await server.owner.query(
    `INSERT INTO memberships (team_id, user_id, roles) SELECT id, $1, $2 FROM teams WHERE name = 'Brackenmoor Lanterns'`,
    [user?.id, roles],
  );
  return server.signIn(email);
}

beforeAll(async () => {
  server = await TestServer.start();
  [engineer, designer, reviewer, admin, viewer] = await Promise.all([
    server.as('engineer'),
    server.as('designer'),
    server.as('reviewer'),
    server.as('admin'),
    server.as('viewer'),
  ]);
  second = await addPerson('second@brackenmoor.example', 'Sedna Two', ['reviewer', 'designer']);
});
afterAll(() => server.stop());

const reason = 'Looked at every limit and its source.';
const decisions = '/api/v1/decisions';

async function make(name: 'load-box' | 'driver-box' | 'stall-lantern' = 'load-box'): Promise<Assembly> {
  return (await engineer.post('/api/v1/assemblies', { document: demoDocument(name, `${name} ${randomUUID()}`) }))
    .body as Assembly;
}
const askBody = (assembly: Assembly, version = assembly.draft.version): Json => ({
  assemblyId: assembly.id,
  expectedVersion: version,
  statement: 'May this be built and sold as it stands?',
  covers: { product: 'Load box', variant: 'B', file: 'case.3mf', fileSha256: 'a'.repeat(64) },
});
async function ask(assembly: Assembly, person = engineer, version = assembly.draft.version): Promise<Decision> {
  const answer = await person.post(decisions, askBody(assembly, version));
  expect(answer.status, JSON.stringify(answer.body)).toBe(201);
  return answer.body as Decision;
}
const read = async (id: string, person = viewer) => (await person.get(`${decisions}/${id}`)).body as Decision;
const accept = (decision: Decision, more: Json = {}): Json => ({
  expectedVersion: decision.version,
  outcome: 'accepted',
  reason,
  flagsTaken: decision.redFlags.map(({ id }) => ({ id, reason: 'Looked at' })),
  password: demoPassword,
  ...more,
});
const decide = (decision: Decision, person: Person, body: Json) =>
  person.post(`${decisions}/${decision.id}/outcome`, body);
async function edit(assembly: Assembly, person: Person, note: string): Promise<number> {
  const { draft } = (await viewer.get(`/api/v1/assemblies/${assembly.id}`)).body as Assembly;
  const saved = await person.put(`/api/v1/assemblies/${assembly.id}/draft`, {
    expectedVersion: draft.version,
    document: changed(draft.document, '/note', note),
  });
  expect(saved.status).toBe(200);
  return (saved.body as { version: number }).version;
}

describe('asking', () => {
  it('makes a revision and freezes document, values, rules, every scenario’s estimate and red flags under one hash', async () => {
    const assembly = await make();
    const decision = await ask(assembly);
    expect(decision).toMatchObject({ state: 'asked', revision: 1, version: 1, decidedBy: null });
    expect(decision.snapshot.covers).toMatchObject({ product: 'Load box', fileSha256: 'a'.repeat(64) });
    expect(JSON.stringify(decision.snapshot.assembly)).not.toContain('"version"');
    const scenarios = (assembly.draft.document.scenarios as { id: string }[]).map(({ id }) => id);
    expect(decision.snapshot.estimates.map(({ scenario }) => scenario)).toEqual(scenarios);
    const [row] = await server.owner.query<{ snapshot: string; snapshot_sha256: string }[]>(
      'SELECT snapshot, snapshot_sha256 FROM decision_events WHERE decision_id = $1',
      [decision.id],
    );
    const hash = createHash('sha256')
      .update(row?.snapshot ?? '')
      .digest('hex');
    expect(row?.snapshot_sha256).toBe(hash);
    expect(decision.snapshotSha256).toBe(hash);
    expect(decision.events[0]).toMatchObject({ kind: 'asked', revision: 1, snapshotSha256: hash });
  });

  it('leaves the snapshot as it was when draft and values move on', async () => {
    const assembly = await make();
    const decision = await ask(assembly);
    await edit(assembly, designer, 'moved on');
    expect((await read(decision.id)).snapshot).toEqual(decision.snapshot);
  });

  it('twice with one press makes one request; with two presses the second is told', async () => {
    const assembly = await make();
    const body = { ...askBody(assembly), requestId: randomUUID() };
    const answers = await Promise.all([engineer.post(decisions, body), engineer.post(decisions, body)]);
    expect(answers.map(({ status }) => status)).toEqual([201, 201]);
    expect(new Set(answers.map((answer) => (answer.body as Decision).id)).size).toBe(1);
    const again = await designer.post(decisions, askBody(assembly));
    expect(again.status).toBe(409);
    expect(again.body).toMatchObject({ code: 'already-asked' });
  });

  it('on a draft that has moved answers what stands now; on an unfinished one the paths', async () => {
    const assembly = await make();
    await edit(assembly, designer, 'meanwhile');
    const moved = await engineer.post(decisions, askBody(assembly));
    expect(moved.status).toBe(409);
    expect(moved.body).toMatchObject({ current: { version: 2, updatedBy: { name: 'Dorrit Sedge' } } });
    const unfinished = (await engineer.post('/api/v1/assemblies', { document: { name: 'Half' } })).body as Assembly;
    const refused = await engineer.post(decisions, askBody(unfinished));
    expect(refused.status).toBe(422);
    expect((refused.body as { errors: unknown[] }).errors.length).toBeGreaterThan(1);
    expect(((await viewer.get(`/api/v1/assemblies/${unfinished.id}`)).body as Assembly).revisions).toEqual([]);
  });

  it('numbers decisions and events of a team without gaps, however many ask at once', async () => {
    const assemblies = await Promise.all(Array.from({ length: 6 }, () => make()));
    await Promise.all(assemblies.map((assembly) => ask(assembly)));
    const rows = await server.owner.query<{ sequence: number }[]>(
      `SELECT e.sequence FROM decision_events e JOIN teams t ON t.id = e.team_id WHERE t.name LIKE 'Bracken%' ORDER BY 1`,
    );
    expect(rows.map(({ sequence }) => sequence)).toEqual(rows.map((_, i) => i + 1));
    const numbers = await server.owner.query<{ number: number }[]>('SELECT number FROM decisions ORDER BY 1');
    expect(numbers.map(({ number }) => number)).toEqual(numbers.map((_, i) => i + 1));
  });
});

describe('red flags', () => {
  it('name limits exceeded first, then tight ones, assumptions and values from memory', async () => {
    const exceeding = await ask(await make('stall-lantern'));
    expect(exceeding.redFlags[0]?.id).toMatch(/^exceeds:/);
    expect(exceeding.redFlags[0]?.words).toMatch(/exceeds its limit by [\d.]+ /);
    const tight = await ask(await make('driver-box'));
    expect(tight.redFlags.some(({ id }) => id.startsWith('tight:'))).toBe(true);
    expect(tight.redFlags.some(({ id }) => id.startsWith('exceeds:'))).toBe(false);
    expect(tight.redFlags.find(({ id }) => id === 'from-memory:values')?.words).toMatch(
      /\d+ values in use are from memory/,
    );
    expect(new Set(tight.redFlags.map(({ id }) => id)).size).toBe(tight.redFlags.length);
  });

  it('must each be ticked with a reason before accepting, and only those there are', async () => {
    const decision = await ask(await make('driver-box'));
    const [first, ...rest] = accept(decision).flagsTaken as { id: string; reason: string }[];
    const missing = await decide(decision, reviewer, accept(decision, { flagsTaken: rest }));
    expect(missing.status).toBe(422);
    const [error] = (missing.body as { errors: { path: string; message: string }[] }).errors;
    expect(error?.path).toBe(`/flagsTaken/${(first?.id ?? '').replaceAll('~', '~0').replaceAll('/', '~1')}`);
    expect(error?.message).toContain(decision.redFlags[0]?.words);
    const invented = await decide(
      decision,
      reviewer,
      accept(decision, { flagsTaken: [{ id: 'own', reason: 'none' }] }),
    );
    expect(invented.body).toMatchObject({ errors: [{ path: '/flagsTaken/0/id' }] });
    const blank = await decide(decision, reviewer, accept(decision, { flagsTaken: [{ id: first?.id, reason: ' ' }] }));
    expect(blank.body).toMatchObject({ errors: [{ path: '/flagsTaken/0/reason' }] });
    expect((await read(decision.id)).state).toBe('asked');
  });

  it('need no ticks to return or to decline', async () => {
    const decision = await ask(await make('stall-lantern'));
    const answer = await decide(decision, reviewer, { expectedVersion: 1, outcome: 'declined', reason });
    expect(answer.body).toMatchObject({ state: 'declined', decidedBy: { name: 'Rowan Heath' } });
  });
});

describe('accepting', () => {
  it('needs the password again', async () => {
    const decision = await ask(await make());
    for (const password of [undefined, '', 'not mine']) {
      const answer = await decide(decision, reviewer, accept(decision, { password }));
      expect(answer.status).toBe(422);
      expect(answer.body).toMatchObject({ errors: [{ path: '/password' }] });
    }
    const accepted = await decide(decision, reviewer, accept(decision));
    expect(accepted.body).toMatchObject({ state: 'accepted', version: 2, decidedBy: { name: 'Rowan Heath' } });
    expect((accepted.body as Decision).events.at(-1)).toMatchObject({ kind: 'accepted', reason });
  });

  it('with conditions needs conditions that speak of what was asked, and keeps them', async () => {
    const decision = await ask(await make());
    const body = accept(decision, { outcome: 'accepted-with-conditions' });
    const none = await decide(decision, reviewer, body);
    expect(none.body).toMatchObject({ errors: [{ path: '/conditions' }] });
    const condition = { words: 'Not above 0.5 A in the store', maxDrive: 0.5, owner: 'Edmund Peat', due: '2027-03-31' };
    const wrong = await decide(decision, reviewer, { ...body, conditions: [{ ...condition, scenario: 'nowhere' }] });
    expect(wrong.body).toMatchObject({ errors: [{ path: '/conditions/0/scenario' }] });
    const scenario = decision.snapshot.estimates[0]?.scenario;
    const accepted = await decide(decision, reviewer, { ...body, conditions: [{ ...condition, scenario }] });
    expect(accepted.body).toMatchObject({
      state: 'accepted-with-conditions',
      conditions: [{ ...condition, scenario }],
    });
    const plain = await decide(await ask(await make()), reviewer, accept(decision, { conditions: [condition] }));
    expect(plain.body).toMatchObject({ errors: [{ path: '/conditions' }] });
  });

  it('a newer revision supersedes the one accepted before, and says so in its history', async () => {
    const assembly = await make();
    const first = await ask(assembly);
    expect((await decide(first, reviewer, accept(first))).status).toBe(200);
    const version = await edit(assembly, engineer, 'a little more');
    const next = await ask(assembly, engineer, version);
    expect((await read(first.id)).state).toBe('accepted');
    expect((await decide(next, reviewer, accept(next))).status).toBe(200);
    const old = await read(first.id);
    expect(old.state).toBe('superseded');
    expect(old.events.map(({ kind }) => kind)).toEqual(['asked', 'accepted', 'superseded']);
    expect((await read(next.id)).revision).toBe(2);
  });

  it('by two reviewers at once: one wins, the other is told who decided what', async () => {
    const decision = await ask(await make());
    const answers = await Promise.all([
      decide(decision, reviewer, accept(decision)),
      decide(decision, second, { expectedVersion: 1, outcome: 'declined', reason }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const winner = answers.find(({ status }) => status === 200)?.body as Decision;
    const loser = answers.find(({ status }) => status === 409)?.body as { detail: string; state: string };
    expect(loser.detail).toBe(`This decision is ${winner.state} already by ${winner.decidedBy?.name ?? ''}`);
    expect(loser.state).toBe(winner.state);
    expect((await read(decision.id)).events).toHaveLength(2);
    const late = await decide(decision, reviewer, { expectedVersion: 1, outcome: 'returned', reason });
    expect(late.status).toBe(409);
  });
});

describe('independence', () => {
  const declined = (decision: Decision, person: Person) =>
    decide(decision, person, { expectedVersion: decision.version, outcome: 'declined', reason });

  it('is missing to who asked, whatever the roles', async () => {
    const assembly = await make();
    const decision = await ask(assembly, second);
    const seen = await read(decision.id, second);
    expect(seen).toMatchObject({ mayDecide: false });
    expect(seen.mayDecideWhy).toMatch(/You asked/);
    const answer = await declined(decision, second);
    expect(answer.status).toBe(403);
    expect(answer.body).toMatchObject({ code: 'not-independent' });
    expect((await read(decision.id, reviewer)).mayDecide).toBe(true);
  });

  it('is missing to who changed the draft since the last accepted decision, and comes back with the next', async () => {
    const assembly = await make();
    const version = await edit(assembly, second, 'by a reviewer');
    const own = await ask(assembly, engineer, version);
    expect((await declined(own, second)).status).toBe(403);
    expect((await decide(own, reviewer, accept(own))).status).toBe(200);
    const next = await ask(assembly, engineer, await edit(assembly, engineer, 'by the engineer'));
    expect((await read(next.id, second)).mayDecide).toBe(true);
  });

  it('is missing to who changed the draft while another’s request waited, once that was accepted', async () => {
    const assembly = await make();
    const first = await ask(assembly);
    const version = await edit(assembly, second, 'while the reviewer read');
    expect((await decide(first, reviewer, accept(first))).status).toBe(200);
    const next = await ask(assembly, engineer, version);
    expect((await declined(next, second)).status).toBe(403);
  });

  it('is missing to who worked on what the assembly was duplicated from', async () => {
    const assembly = await make();
    await edit(assembly, second, 'in the original');
    const copy = (await engineer.post(`/api/v1/assemblies/${assembly.id}/duplicate`, { name: 'Copy' }))
      .body as Assembly;
    expect((await declined(await ask(copy), second)).status).toBe(403);
  });

  it('is not given by being an administrator', async () => {
    const answer = await declined(await ask(await make()), admin);
    expect(answer.status).toBe(403);
  });
});

describe('returning and asking again', () => {
  it('goes on with the same decision and a new snapshot; a second press makes no second one', async () => {
    const assembly = await make();
    const decision = await ask(assembly);
    const returned = await decide(decision, reviewer, { expectedVersion: 1, outcome: 'returned', reason });
    expect(returned.body).toMatchObject({ state: 'returned' });
    const version = await edit(assembly, engineer, 'mended');
    const body = { ...askBody(assembly, version), decisionId: decision.id, requestId: randomUUID() };
    const again = (await engineer.post(decisions, body)).body as Decision;
    expect(again).toMatchObject({ id: decision.id, number: decision.number, state: 'asked', revision: 2, version: 3 });
    expect(again.snapshotSha256).not.toBe(decision.snapshotSha256);
    expect(again.events.map(({ kind }) => kind)).toEqual(['asked', 'returned', 'asked']);
    const repeated = await engineer.post(decisions, body);
    expect(repeated.status).toBe(201);
    expect((repeated.body as Decision).version).toBe(3);
    const stale = await decide(again, reviewer, { expectedVersion: 1, outcome: 'declined', reason });
    expect(stale.status).toBe(409);
  });

  it('is only for what was returned', async () => {
    const assembly = await make();
    const decision = await ask(assembly);
    await decide(decision, reviewer, { expectedVersion: 1, outcome: 'declined', reason });
    const again = await engineer.post(decisions, { ...askBody(assembly), decisionId: decision.id });
    expect(again.status).toBe(409);
  });
});

describe('withdrawing', () => {
  const withdraw = (decision: Decision, person: Person, expectedVersion = decision.version) =>
    person.post(`${decisions}/${decision.id}/withdraw`, { expectedVersion, reason });

  it('is for who asked and for an administrator, while nobody has decided', async () => {
    const one = await ask(await make());
    expect(await read(one.id, engineer)).toMatchObject({ mayWithdraw: true });
    expect((await withdraw(one, designer)).status).toBe(403);
    expect((await withdraw(one, engineer)).body).toMatchObject({ state: 'withdrawn', version: 2 });
    expect((await withdraw(one, engineer, 2)).status).toBe(409);
    const other = await ask(await make());
    expect((await withdraw(other, admin)).body).toMatchObject({ state: 'withdrawn' });
  });

  it('and accepting at once: one wins', async () => {
    const decision = await ask(await make());
    const answers = await Promise.all([
      withdraw(decision, engineer),
      decide(decision, reviewer, { expectedVersion: 1, outcome: 'returned', reason }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  });
});

describe('what cannot happen', () => {
  const outcomes = ['accepted', 'accepted-with-conditions', 'returned', 'declined'];
  let closed: Decision[];
  beforeEach(async () => {
    closed ??= await Promise.all(
      ['declined', 'returned', 'accepted'].map(async (outcome) => {
        const decision = await ask(await make());
        const answer = await decide(decision, reviewer, accept(decision, { outcome }));
        expect(answer.status).toBe(200);
        return answer.body as Decision;
      }),
    );
  });

  it.each(outcomes)('%s after an outcome is refused, and leaves no event', async (outcome) => {
    for (const decision of closed) {
      const conditions = outcome === 'accepted-with-conditions' ? [{ words: 'Not above half' }] : [];
      const answer = await decide(decision, second, accept(decision, { outcome, conditions }));
      expect(answer.status).toBe(409);
      expect((await read(decision.id)).events).toHaveLength(2);
    }
  });
});

describe('self-check', () => {
  it('is for a team of one, and never looks accepted', async () => {
    expect((await engineer.post(`${decisions}/self-check`, askBody(await make()))).status).toBe(409);
    await server.owner.query(
      `DELETE FROM memberships m USING teams t WHERE t.id = m.team_id AND t.name LIKE 'Saltmarsh%' AND m.roles = '{viewer}'`,
    );
    const alone = await server.as('engineer@saltmarsh.example');
    const assembly = (await alone.post('/api/v1/assemblies', { document: demoDocument() })).body as Assembly;
    const answer = await alone.post(`${decisions}/self-check`, askBody(assembly));
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({ state: 'self-checked', number: 1, decidedBy: null, mayDecide: false });
  });
});

describe('the register', () => {
  const list = async (query: string) =>
    (await viewer.get(`${decisions}?${query}`)).body as { items: DecisionSummary[]; total: number };

  it('lists, searches, filters and sorts', async () => {
    const newest = await list('pageSize=1');
    expect(newest.items[0]?.number).toBe(newest.total);
    const oldest = (await list('sort=number&pageSize=1')).items[0];
    expect(oldest).toMatchObject({ number: 1, state: 'accepted', decidedBy: { name: 'Rowan Heath' } });
    const declinedOnes = await list('state=declined&pageSize=500');
    expect(declinedOnes.total).toBeGreaterThan(1);
    expect(new Set(declinedOnes.items.map(({ state }) => state))).toEqual(new Set(['declined']));
    const found = await list(`search=${encodeURIComponent(declinedOnes.items[0]?.assembly.name ?? '')}`);
    expect(found.items.map(({ id }) => id)).toContain(declinedOnes.items[0]?.id);
    expect((await list('search=nobody-would-write-this')).total).toBe(0);
  });
});

describe('roles', () => {
  it('that an administrator gives himself are logged with before and after', async () => {
    const me = ((await admin.get('/api/v1/session')).body as { user: { id: string } }).user.id;
    const changedRoles = await admin.put(`/api/v1/members/${me}/roles`, { roles: ['admin', 'reviewer'] });
    expect(changedRoles.body).toMatchObject({ roles: ['admin', 'reviewer'] });
    const [entry] = await server.owner.query<{ kind: string; actor_id: string; detail: unknown }[]>(
      'SELECT kind, actor_id, detail FROM audit_entries',
    );
    expect(entry).toEqual({
      kind: 'roles-changed',
      actor_id: me,
      detail: { userId: me, from: ['admin'], to: ['admin', 'reviewer'] },
    });
    await admin.put(`/api/v1/members/${me}/roles`, { roles: ['admin'] });
  });

  it('leave a team at least one administrator', async () => {
    const me = ((await admin.get('/api/v1/session')).body as { user: { id: string } }).user.id;
    const answer = await admin.put(`/api/v1/members/${me}/roles`, { roles: ['viewer'] });
    expect(answer.status).toBe(409);
  });
});
