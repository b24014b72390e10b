import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type z } from 'zod';
import type { Assembly } from '../../shared/schemas/assembly-records.js';
import { allRoutes } from '../../server/routes/all.js';
import { changed, demoDocument, type Json } from './support/documents.js';
import type { Person } from './support/person.js';
import { demoPassword, TestServer } from './support/server.js';

let server: TestServer;
let engineer: Person;
let assembly: Assembly;
beforeAll(async () => {
  server = await TestServer.start();
  engineer = await server.as('engineer');
  assembly = (await engineer.post('/api/v1/assemblies', { document: demoDocument() })).body as Assembly;
  await server.owner.query(
    `UPDATE memberships SET roles = ARRAY['engineer','reviewer','admin'] WHERE user_id =
     (SELECT id FROM users WHERE email = 'engineer@brackenmoor.example')`,
  );
});
afterAll(() => server.stop());

const errorsOf = (body: unknown) => (body as { errors: { path: string; message: string }[] }).errors;
const pathsOf = (body: unknown) => errorsOf(body).map(({ path }) => path);

describe('an assembly document', () => {
  const estimate = (assembly: unknown) => engineer.post('/api/v1/estimates', { assembly });

  it.each<[string, string, unknown]>([
    ['zero wall', '/housing/faces/top/wallM', 0],
    ['negative wall', '/housing/faces/left/wallM', -0.002],
    ['wall as pasted text', '/housing/faces/top/wallM', '12 mm'],
    ['wall with a decimal comma', '/housing/faces/top/wallM', '0,5'],
    ['wall of a kilometre', '/housing/faces/top/wallM', 1000],
    ['box without size', '/housing/outerM', []],
    ['negative width', '/housing/outerM/0', -1],
    ['absurd heat', '/parts/0/heatW', 1e9],
    ['negative heat', '/parts/0/heatW', -5],
    ['heat as text', '/parts/0/heatW', 'plenty'],
    ['half a part', '/parts/0/count', 0.5],
    ['no parts', '/parts', []],
    ['no scenarios', '/scenarios', []],
    ['part on a missing carrier', '/parts/0/mount/on', 'nowhere'],
    ['part on a missing face', '/parts/0/mount/on', 'face.sideways'],
    ['part without a mount', '/parts/0/mount', undefined],
    ['part without a type', '/parts/0/type', undefined],
    ['part on a supply that is not there', '/parts/0/supply', 'nowhere'],
    ['absurd current', '/supplies/0/currentA', 1e9],
    ['negative current', '/supplies/0/currentA', -1],
    ['air hotter than iron melts', '/scenarios/0/airC', 1e9],
    ['air as text', '/scenarios/0/airC', 'warm'],
    ['scenario without a name', '/scenarios/0/name', ''],
    ['name of 10,000 characters', '/name', 'x'.repeat(10_000)],
    ['note of 10,000 characters', '/note', 'x'.repeat(10_000)],
    ['note that is a number', '/note', 7],
    ['field that does not exist', '/housing/colour', 'red'],
    ['air that moves backwards', '/scenarios/0/airSpeedMPerS', -3],
    ['a vent without an area', '/housing/faces/top/vents', [{}]],
    ['a vent of no area', '/housing/faces/top/vents', [{ freeAreaM2: 0 }]],
    ['a tilt beyond level', '/housing/pose/tiltDeg', 120],
    ['a fault, which is not computed', '/scenarios/0/fault', 'fan-stopped'],
    ['cut-outs, which are not computed', '/cutOuts', [{ id: 'k1' }]],
    ['another format', '/format', 'trimwick-assembly/9'],
  ])('with %s is refused at %s', async (_, pointer, value) => {
    const answer = await estimate(changed(demoDocument(), pointer, value));
    expect(answer.status).toBe(422);
    const wanted = `/assembly${pointer}`;
    expect(pathsOf(answer.body).some((path) => path === wanted || path.startsWith(`${wanted}/`))).toBe(true);
    for (const { message } of errorsOf(answer.body)) expect(message).not.toMatch(/^Invalid input: expected|undefined/);
  });

  it.each([[null], [42], ['text'], [[]], [{}]])('that is %j is refused', async (value) => {
    expect((await estimate(value)).status).toBe(422);
  });

  it('keeps what was typed, for every one of these, as a draft', async () => {
    let { version } = assembly.draft;
    for (const value of [0, -1, '12 mm', '0,5', 1e9, null, 'x'.repeat(10_000)]) {
      const document = changed(demoDocument(), '/housing/faces/top/wallM', value);
      const saved = await engineer.put(`/api/v1/assemblies/${assembly.id}/draft`, {
        expectedVersion: version,
        document,
      });
      expect(saved.status).toBe(200);
      version = (saved.body as { version: number }).version;
      const { draft } = (await engineer.get(`/api/v1/assemblies/${assembly.id}`)).body as Assembly;
      expect(draft.document).toEqual(document);
    }
  });
});

/** Valid bodies of every form, and addresses to send them to. */
const covers = { product: 'Lamp', variant: '', file: '', fileSha256: '' };
const reason = 'a reason that is long enough';
const forms: Record<string, Json> = {
  'post /session': { email: 'engineer@brackenmoor.example', password: demoPassword },
  'post /session/team': { teamId: randomUUID() },
  'put /account/password': { currentPassword: demoPassword, newPassword: 'a longer wick burns on' },
  'put /members/:userId/roles': { roles: ['viewer'] },
  'post /assemblies': { document: {}, requestId: randomUUID() },
  'put /assemblies/:id/draft': { expectedVersion: 1, document: {} },
  'post /assemblies/:id/duplicate': { name: 'Copy' },
  'post /assemblies/:id/revisions': { expectedVersion: 1, note: '' },
  'post /assemblies/:id/estimates': { revision: 1, scenario: 'hot' },
  'post /decisions': { assemblyId: randomUUID(), expectedVersion: 1, statement: reason, covers },
  'post /decisions/self-check': { assemblyId: randomUUID(), expectedVersion: 1, statement: reason, covers },
  'post /decisions/:id/outcome': { expectedVersion: 1, outcome: 'declined', reason, conditions: [], flagsTaken: [] },
  'post /decisions/:id/withdraw': { expectedVersion: 1, reason },
};
/** Documents have their own table above and in the computing tests. */
const documentRoutes = ['/networks/solve', '/networks/ceiling', '/estimates', '/assemblies/compile'];

/** Values that no field of these forms takes. */
const absurd: [string, unknown][] = [
  ['null', null],
  ['a negative number', -1],
  ['1e9 and a half', 1e9 + 0.5],
  ['an object', { a: 1 }],
  ['text of a million characters', 'x'.repeat(1_000_000)],
];

const cases = Object.entries(forms).flatMap(([form, body]) => Object.keys(body).map((field) => ({ form, field })));

describe('every form', () => {
  it('is in the table', () => {
    const wanted = allRoutes
      .filter(({ body, path }) => body && !documentRoutes.includes(path))
      .map(({ method, path }) => `${method} ${path}`);
    expect(Object.keys(forms).sort()).toEqual(wanted.sort());
    for (const [form, body] of Object.entries(forms)) {
      const route = allRoutes.find(({ method, path }) => `${method} ${path}` === form);
      expect((route?.body as z.ZodType).safeParse(body).success, form).toBe(true);
    }
  });

  const send = (form: string, body: unknown) => {
    const [method, path] = form.split(' ') as ['post' | 'put', string];
    const address = `/api/v1${path.replace(/:\w+/, assembly.id)}`;
    return (form === 'post /session' ? server.nobody() : engineer).send(method, address, body);
  };

  it.each(Object.keys(forms))('%s refuses nothing at all and a field that it does not have', async (form) => {
    const isOptional = form === 'post /assemblies/:id/estimates';
    if (!isOptional) expect((await send(form, {})).status).toBe(422);
    const extra = await send(form, { ...forms[form], surprise: 1 });
    expect(extra.status).toBe(422);
    expect(pathsOf(extra.body)).toContain('/surprise');
  });

  it.each(cases)('$form refuses absurd values of $field at /$field', async ({ form, field }) => {
    for (const [what, value] of absurd) {
      // A draft is anything in braces.
      if (field === 'document' && what === 'an object') continue;
      const answer = await send(form, { ...forms[form], [field]: value });
      expect(answer.status, what).toBe(422);
      expect(
        pathsOf(answer.body).every((path) => path === `/${field}` || path.startsWith(`/${field}/`)),
        `${what}: ${pathsOf(answer.body).join()}`,
      ).toBe(true);
    }
  });
});

describe('long and short texts', () => {
  it.each([
    ['post', '/decisions', 'statement', 'short'],
    ['post', '/decisions', 'statement', ' '.repeat(40)],
    ['post', '/decisions', 'statement', 'x'.repeat(10_001)],
    ['post', '/decisions/:id/outcome', 'reason', 'x'.repeat(10_001)],
    ['post', '/decisions/:id/withdraw', 'reason', ''],
    ['post', '/assemblies/:id/duplicate', 'name', ' '],
    ['post', '/assemblies/:id/revisions', 'note', 'x'.repeat(10_000)],
  ] as const)('%s %s refuses %s', async (method, path, field, value) => {
    const body = { ...forms[`${method} ${path}`], [field]: value };
    const answer = await engineer.send(method, `/api/v1${path.replace(':id', assembly.id)}`, body);
    expect(answer.status).toBe(422);
    expect(pathsOf(answer.body)).toEqual([`/${field}`]);
  });
});
