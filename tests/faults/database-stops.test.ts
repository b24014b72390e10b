import { mkdtempSync, chmodSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { freePort, PrivateCluster } from '../../server/setup/postgres.mjs';
import { demoDocument } from '../api/support/documents.js';
import { Caller, TestProcess, waitForHealth } from './web-process.js';

const password = 'trim-the-wick-4310';
let home: string;
let cluster: PrivateCluster;
let web: TestProcess;
let environment: Record<string, string>;
let base: string;
let engineer: Caller;
let assemblyId: string;

async function startWeb(): Promise<void> {
  web = new TestProcess('main', environment);
  await waitForHealth(base, 200, web);
}

beforeAll(async () => {
  home = mkdtempSync(path.join(process.env.TRIMWICK_TEST_FOLDER ?? os.tmpdir(), 'faults-'));
  // The database server’s account must be able to enter it.
  chmodSync(home, 0o755);
  // As people run it: what is committed is on disk.
  cluster = new PrivateCluster(path.join(home, 'cluster'));
  await cluster.start();
  const port = await freePort();
  base = `http://127.0.0.1:${String(port)}`;
  environment = {
    DATABASE_URL: cluster.applicationUrl,
    DATABASE_OWNER_URL: cluster.ownerUrl,
    PORT: String(port),
    TRIMWICK_HOME: home,
    TRIMWICK_DEMO: '1',
  };
  const migration = new TestProcess('migrate', environment);
  expect(await migration.exit(), migration.output).toBe(0);
  await startWeb();
  engineer = new Caller(base);
  const signedIn = await engineer.send('POST', '/api/v1/session', { email: 'engineer@brackenmoor.example', password });
  expect(signedIn.status).toBe(200);
  const made = await engineer.send('POST', '/api/v1/assemblies', { document: demoDocument() });
  assemblyId = (made.body as { id: string }).id;
});

afterAll(async () => {
  await web.kill();
  await cluster.remove();
  rmSync(home, { recursive: true, force: true });
});

interface Draft {
  version: number;
  document: { note?: string };
}
const readDraft = async () =>
  ((await engineer.send('GET', `/api/v1/assemblies/${assemblyId}`)).body as { draft: Draft }).draft;
const save = (expectedVersion: number, note: string) =>
  engineer.send('PUT', `/api/v1/assemblies/${assemblyId}/draft`, {
    expectedVersion,
    document: { ...demoDocument(), note },
  });

const crash = () => cluster.program('pg_ctl', ['-D', cluster.data, '-w', '-m', 'immediate', 'stop']);

describe('while the database is stopped', () => {
  it('every request gets a 503 problem that says so, and the process lives on', async () => {
    const { version } = await readDraft();
    await cluster.stop();
    const health = (await waitForHealth(base, 503, web)) as { code: string; health: { database: string } };
    expect(health).toMatchObject({ code: 'database-down', health: { database: 'down' } });
    const answers = [
      await engineer.send('GET', '/api/v1/session'),
      await engineer.send('GET', '/api/v1/assemblies'),
      await save(version, 'while it is down'),
      await new Caller(base).send('POST', '/api/v1/session', { email: 'viewer@brackenmoor.example', password }),
    ];
    for (const answer of answers) {
      expect(answer.status).toBe(503);
      expect(answer.type).toContain('application/problem+json');
      expect(answer.body).toMatchObject({ code: 'database-down' });
    }
    expect(web.isRunning).toBe(true);
    await cluster.start(cluster.port);
    await waitForHealth(base, 200, web);
    expect(await readDraft()).toMatchObject({ version });
    expect((await save(version, 'after it')).status).toBe(200);
    expect((await readDraft()).document.note).toBe('after it');
  });
});

describe.each([
  ['stopped and started', () => cluster.stop()],
  ['crashed and started', crash],
])('a database %s under somebody who saves all the time', (_, stop) => {
  it('loses no save that was answered, and never answers one that failed', async () => {
    let { version } = await readDraft();
    let typed = '';
    let acknowledged = 0;
    let failures = 0;
    let over = false;
    const typing = (async () => {
      for (let i = 0; !over || acknowledged < 10; i++) {
        typed = `keystroke ${String(i)}`;
        // As the sheet does: the same save again until it is answered.
        for (;;) {
          const answer = await save(version, typed);
          if (answer.status === 200) {
            version = (answer.body as Draft).version;
            acknowledged++;
            break;
          }
          expect(answer.status).toBe(503);
          failures++;
          await new Promise((resolve) => setTimeout(resolve, 20));
        }
      }
    })();
    await stop();
    await waitForHealth(base, 503, web);
    await cluster.start(cluster.port);
    await waitForHealth(base, 200, web);
    over = true;
    await typing;
    expect(failures).toBeGreaterThan(0);
    expect(await readDraft()).toMatchObject({ version, document: { note: typed } });
    expect(web.isRunning).toBe(true);
  });
});

describe('a web process killed without notice', () => {
  it('has kept what it answered, and the session goes on with the next process', async () => {
    const { version } = await readDraft();
    expect((await save(version, 'the last words')).status).toBe(200);
    await web.kill('SIGKILL');
    await startWeb();
    expect((await readDraft()).document.note).toBe('the last words');
  });
});

describe('what is logged meanwhile', () => {
  it('holds no cookie and no password', async () => {
    await cluster.stop();
    await waitForHealth(base, 503, web);
    await engineer.send('GET', '/api/v1/session');
    await cluster.start(cluster.port);
    await waitForHealth(base, 200, web);
    expect(web.output).toContain('request failed');
    for (const secret of [...engineer.secrets, password]) expect(web.output).not.toContain(secret);
  });
});
