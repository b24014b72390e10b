import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { accessSeconds } from '../../server/services/sessions.js';
import { demoDocument } from './support/documents.js';
import { demoPassword, TestServer } from './support/server.js';

let server: TestServer;
beforeAll(async () => {
  server = await TestServer.start();
});
afterAll(() => server.stop());

const session = '/api/v1/session';
const [access, refresh] = ['trimwick_access', 'trimwick_refresh'] as const;
const expire = () => {
  server.passes((accessSeconds + 1) * 1000);
};

describe('signing in', () => {
  it('answers with person, team and roles, and two cookies that scripts in a page cannot read', async () => {
    const answer = await server
      .nobody()
      .post(session, { email: 'Engineer@Brackenmoor.example ', password: demoPassword });
    expect(answer.body).toMatchObject({
      user: { email: 'engineer@brackenmoor.example' },
      team: { name: 'Brackenmoor Lanterns' },
      roles: ['engineer'],
    });
    const cookies = answer.headers['set-cookie'] as unknown as string[];
    expect(cookies.map((line) => line.split('=')[0])).toEqual([access, refresh, 'trimwick_present']);
    for (const line of cookies) {
      expect(line).toMatch(/; SameSite=Strict/);
      expect(line).not.toMatch(/; Secure/);
    }
    for (const line of cookies.slice(0, 2)) {
      expect(line).toMatch(/; HttpOnly/);
      expect(line).toMatch(/; Path=\/api/);
    }
    // The mark that a page may read tells that there is a session and nothing else.
    expect(cookies[2]).toMatch(/^trimwick_present=marker; /);
  });

  it('marks the cookies Secure behind https', async () => {
    const answer = await server
      .nobody()
      .send(
        'post',
        session,
        { email: 'viewer@brackenmoor.example', password: demoPassword },
        { 'X-Forwarded-Proto': 'https' },
      );
    for (const line of answer.headers['set-cookie'] as unknown as string[]) expect(line).toMatch(/; Secure/);
  });

  it('tells a wrong password and an unknown address in the same words', async () => {
    const wrong = await server
      .nobody()
      .post(session, { email: 'viewer@brackenmoor.example', password: 'not this one' });
    const unknown = await server
      .nobody()
      .post(session, { email: 'nobody@brackenmoor.example', password: 'not this one' });
    expect(wrong.status).toBe(401);
    expect(unknown.body).toEqual(wrong.body);
    expect(wrong.headers['set-cookie']).toBeUndefined();
  });

  it('takes as long for an unknown address as for a known one', async () => {
    const took = async (email: string) => {
      const began = performance.now();
      await server.nobody().post(session, { email, password: 'not this one' });
      return performance.now() - began;
    };
    const known: number[] = [];
    const unknown: number[] = [];
    for (let i = 0; i < 3; i++) {
      known.push(await took('designer@brackenmoor.example'));
      unknown.push(await took(`nobody${String(i)}@brackenmoor.example`));
    }
    // Hashing is what takes long: leaving it out would show as a factor of ten or more.
    expect(Math.min(...unknown)).toBeGreaterThan(Math.min(...known) / 3);
  });

  it('refuses a password of which only the first 72 bytes would be read', async () => {
    const long = 'x'.repeat(72);
    const hash = await server.context.workers.hashPassword(long);
    expect(await server.context.workers.checkPassword(long, hash)).toBe(true);
    expect(await server.context.workers.checkPassword(`${long}y`, hash)).toBe(false);
    await expect(server.context.workers.hashPassword(`${long}y`)).rejects.toThrow(/72 bytes/);
  });

  it('needs a membership', async () => {
    await server.owner.query(
      `INSERT INTO users (id, email, name, password_hash, created_at)
       SELECT gen_random_uuid(), 'loose@brackenmoor.example', 'Loose Wire', password_hash, now() FROM users LIMIT 1`,
    );
    const answer = await server.nobody().post(session, { email: 'loose@brackenmoor.example', password: demoPassword });
    expect(answer.status).toBe(403);
  });
});

describe('a session', () => {
  it('takes roles from the database at each request, not from its token', async () => {
    const designer = await server.signIn('designer@brackenmoor.example');
    const make = () => designer.post('/api/v1/assemblies', { document: demoDocument() });
    expect((await make()).status).toBe(201);
    const setRoles = (list: string) =>
      server.owner.query(
        `UPDATE memberships SET roles = $1 WHERE user_id = (SELECT id FROM users WHERE email = 'designer@brackenmoor.example')`,
        [list],
      );
    await setRoles('{viewer}');
    expect((await make()).status).toBe(403);
    await setRoles('{designer}');
    expect((await make()).status).toBe(201);
  });

  it('ends at sign-out, also for who kept its cookies', async () => {
    const viewer = await server.signIn('viewer@brackenmoor.example');
    const kept = viewer.copy();
    expect((await viewer.delete(session)).status).toBe(204);
    expect(viewer.cookies.size).toBe(0);
    expect((await kept.get(session)).status).toBe(401);
    expire();
    expect((await kept.get(session)).status).toBe(401);
  });

  it('ends everywhere at once when asked to', async () => {
    const here = await server.signIn('viewer@brackenmoor.example');
    const there = await server.signIn('viewer@brackenmoor.example');
    const other = await server.signIn('designer@brackenmoor.example');
    expect((await here.delete('/api/v1/sessions')).status).toBe(204);
    expect((await there.get(session)).status).toBe(401);
    expect((await other.get(session)).status).toBe(200);
  });

  it('is worth nothing with a token that somebody else signed', async () => {
    const forged = server.nobody();
    forged.cookies.set(access, 'eyJhbGciOiJub25lIn0.eyJzaWQiOiJ4In0.');
    forged.cookies.set(refresh, 'no.token');
    expect((await forged.get(session)).status).toBe(401);
  });

  it('changes to another team of the person and stays there, with the roles held there', async () => {
    const admin = await server.signIn('admin@brackenmoor.example');
    const before = (await admin.get(session)).body as { roles: string[]; teams: { id: string; name: string }[] };
    expect(before.roles).toEqual(['admin']);
    expect(before.teams.map(({ name }) => name)).toEqual(['Brackenmoor Lanterns', 'Saltmarsh Instruments']);
    const other = before.teams[1]?.id;
    expect((await admin.post(`${session}/team`, { teamId: other })).body).toMatchObject({ roles: ['viewer'] });
    expect((await admin.get(session)).body).toMatchObject({ team: { id: other }, roles: ['viewer'] });
    const list = (await admin.get('/api/v1/assemblies')).body as { total: number };
    expect(list.total).toBe(0);
  });

  it('ends with the membership', async () => {
    await server.owner.query(
      `INSERT INTO users (id, email, name, password_hash, created_at)
       SELECT gen_random_uuid(), 'leaver@brackenmoor.example', 'Lea Ver', password_hash, now() FROM users LIMIT 1`,
    );
    await server.owner.query(
      `INSERT INTO memberships (team_id, user_id, roles)
       SELECT t.id, u.id, '{viewer}' FROM teams t, users u
       WHERE t.name = 'Brackenmoor Lanterns' AND u.email = 'leaver@brackenmoor.example'`,
    );
    const leaver = await server.signIn('leaver@brackenmoor.example');
    expect((await leaver.get(session)).status).toBe(200);
    await server.owner.query(
      `DELETE FROM memberships WHERE user_id = (SELECT id FROM users WHERE email = 'leaver@brackenmoor.example')`,
    );
    expect((await leaver.get(session)).status).toBe(401);
  });
});

describe('rotation', () => {
  it('renews an access token silently, with a new refresh token', async () => {
    const viewer = await server.signIn('viewer@brackenmoor.example');
    const before = new Map(viewer.cookies);
    expire();
    expect((await viewer.get(session)).status).toBe(200);
    expect(viewer.cookies.get(access)).not.toBe(before.get(access));
    expect(viewer.cookies.get(refresh)).not.toBe(before.get(refresh));
  });

  it('lets two tabs with the same token go on', async () => {
    const one = await server.signIn('viewer@brackenmoor.example');
    const two = one.copy();
    expire();
    const answers = await Promise.all([one.get(session), two.get(session), two.copy().get(session)]);
    expect(answers.map(({ status }) => status)).toEqual([200, 200, 200]);
    server.passes(20_000);
    expect((await one.get(session)).status).toBe(200);
    expect((await two.get(session)).status).toBe(200);
  });

  it('ends the session when a replaced token comes after the grace', async () => {
    const owner = await server.signIn('viewer@brackenmoor.example');
    const thief = owner.copy();
    expire();
    expect((await owner.get(session)).status).toBe(200);
    server.passes(31_000);
    thief.cookies.delete(access);
    expect((await thief.get(session)).status).toBe(401);
    expect((await owner.get(session)).status).toBe(401);
  });

  it('ends the session when a token from before the last comes', async () => {
    const owner = await server.signIn('viewer@brackenmoor.example');
    const thief = owner.copy();
    for (let i = 0; i < 2; i++) {
      expire();
      expect((await owner.get(session)).status).toBe(200);
    }
    expect((await thief.get(session)).status).toBe(401);
    expect((await owner.get(session)).status).toBe(401);
  });

  it('is over thirty days after the last use', async () => {
    const viewer = await server.signIn('viewer@brackenmoor.example');
    server.passes(31 * 86_400_000);
    expect((await viewer.get(session)).status).toBe(401);
  });
});

describe('changing the password', () => {
  const path = '/api/v1/account/password';

  it('ends every other session and goes on with this one; only the new password fits then', async () => {
    const here = await server.signIn('designer@brackenmoor.example');
    const there = await server.signIn('designer@brackenmoor.example');
    const newPassword = 'a longer wick burns on';
    expect((await here.put(path, { currentPassword: demoPassword, newPassword })).status).toBe(204);
    expect((await here.get(session)).status).toBe(200);
    expect((await there.get(session)).status).toBe(401);
    const old = await server.nobody().post(session, { email: 'designer@brackenmoor.example', password: demoPassword });
    expect(old.status).toBe(401);
    const back = await server.signIn('designer@brackenmoor.example', newPassword);
    expect((await back.put(path, { currentPassword: newPassword, newPassword: demoPassword })).status).toBe(204);
  });

  it.each([
    [
      'the wrong present password',
      { currentPassword: 'guess', newPassword: 'a longer wick burns on' },
      '/currentPassword',
    ],
    ['a short one', { currentPassword: demoPassword, newPassword: 'short' }, '/newPassword'],
    ['more than 72 bytes', { currentPassword: demoPassword, newPassword: 'ö'.repeat(37) }, '/newPassword'],
  ])('refuses %s beside its field', async (_, body, field) => {
    const answer = await (await server.as('viewer')).put(path, body);
    expect(answer.status).toBe(422);
    expect(answer.body).toMatchObject({ errors: [{ path: field }] });
  });
});

describe('what is kept', () => {
  it('holds neither passwords nor tokens', async () => {
    const viewer = await server.signIn('viewer@brackenmoor.example');
    const secret = viewer.cookies.get(refresh)?.split('.')[1] ?? '';
    expect(secret.length).toBeGreaterThan(40);
    const rows = JSON.stringify([
      await server.owner.query('SELECT * FROM sessions'),
      await server.owner.query('SELECT * FROM users'),
      await server.owner.query('SELECT * FROM sign_in_failures'),
    ]);
    expect(rows).not.toContain(secret);
    expect(rows).not.toContain(demoPassword);
  });

  it('and what is logged neither', () => {
    const log = server.logged.join('');
    expect(log).toContain('/api/v1/session');
    expect(log).not.toContain(demoPassword);
    expect(log).not.toContain(access);
    expect(log).not.toMatch(/set-cookie/i);
  });
});
