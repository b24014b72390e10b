import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Assembly, AssemblySummary } from '../../shared/schemas/assembly-records.js';
import type { Estimate } from '../../shared/schemas/estimate.js';
import { changed, demoDocument, type Json } from './support/documents.js';
import type { Person } from './support/person.js';
import { TestServer } from './support/server.js';

let server: TestServer;
let engineer: Person;
let designer: Person;
let viewer: Person;
beforeAll(async () => {
  server = await TestServer.start();
  [engineer, designer, viewer] = await Promise.all([server.as('engineer'), server.as('designer'), server.as('viewer')]);
});
afterAll(() => server.stop());

const address = '/api/v1/assemblies';
async function make(document: Json = demoDocument(), person = engineer): Promise<Assembly> {
  const answer = await person.post(address, { document });
  expect(answer.status).toBe(201);
  return answer.body as Assembly;
}
const read = async (id: string) => (await viewer.get(`${address}/${id}`)).body as Assembly;
const list = async (query: string) =>
  (await viewer.get(`${address}?${query}`)).body as { items: AssemblySummary[]; total: number; page: number };

describe('a draft', () => {
  it('is kept exactly as typed, however unfinished', async () => {
    const typed = {
      name: 'Half a lamp',
      housing: { outerM: ['12 mm', null, -1] },
      parts: 'later',
      extra: { 'ключ/~': '½' },
    };
    const made = await make(typed);
    expect((await read(made.id)).draft.document).toEqual(typed);
    expect(made.verdict).toBeNull();
    await server.settled();
    expect((await read(made.id)).verdict).toBeNull();
  });

  it('gets its verdict after the save, anew with each save', async () => {
    const made = await make();
    await server.settled();
    const first = (await read(made.id)).verdict;
    expect(first?.state).toBe('holds');
    const document = changed(demoDocument(), '/supplies/0/currentA', 5);
    expect((await engineer.put(`${address}/${made.id}/draft`, { expectedVersion: 1, document })).status).toBe(200);
    await server.settled();
    expect((await read(made.id)).verdict?.state).toBe('exceeds');
  });

  it('gets a new verdict when a list meets one of another engine', async () => {
    const made = await make();
    await server.settled();
    await server.owner.query(
      `UPDATE assembly_drafts SET verdict_engine = '0.0.0', verdict = NULL WHERE assembly_id = $1`,
      [made.id],
    );
    await list('');
    await server.settled();
    expect((await read(made.id)).verdict).not.toBeNull();
  });

  it('saved by two people from the same version: the second gets both versions, the first stays', async () => {
    const made = await make(demoDocument('load-box', 'Two tabs'));
    const mine = changed(made.draft.document, '/note', 'mine');
    const theirs = changed(made.draft.document, '/note', 'theirs');
    const path = `${address}/${made.id}/draft`;
    expect((await engineer.put(path, { expectedVersion: 1, document: mine })).body).toMatchObject({ version: 2 });
    const late = await designer.put(path, { expectedVersion: 1, document: theirs });
    expect(late.status).toBe(409);
    const problem = late.body as { current: Assembly['draft']; yours: Json; detail: string };
    expect(problem.current).toMatchObject({ version: 2, document: mine, updatedBy: { name: 'Edmund Peat' } });
    expect(problem.yours).toEqual(theirs);
    expect(problem.detail).toContain('Edmund Peat');
    expect((await read(made.id)).draft.document).toEqual(mine);
  });

  it('saved at the same moment ten times over: exactly one wins', async () => {
    const made = await make();
    const saves = Array.from({ length: 10 }, (_, i) =>
      (i % 2 ? engineer : designer).put(`${address}/${made.id}/draft`, {
        expectedVersion: 1,
        document: changed(made.draft.document, '/note', `save ${String(i)}`),
      }),
    );
    const statuses = (await Promise.all(saves)).map(({ status }) => status);
    expect(statuses.filter((status) => status === 200)).toHaveLength(1);
    expect(statuses.filter((status) => status === 409)).toHaveLength(9);
    expect((await read(made.id)).draft.version).toBe(2);
  });

  it('whose save is sent again, its answer lost on the way, is saved once', async () => {
    const made = await make();
    const body = { expectedVersion: 1, document: changed(made.draft.document, '/note', 'sent twice') };
    const first = await engineer.put(`${address}/${made.id}/draft`, body);
    const second = await engineer.put(`${address}/${made.id}/draft`, body);
    expect(second.status).toBe(200);
    expect(second.body).toEqual(first.body);
    expect((await designer.put(`${address}/${made.id}/draft`, body)).status).toBe(409);
  });

  it('made by two presses of one button is one assembly', async () => {
    const requestId = randomUUID();
    const body = { document: demoDocument('load-box', 'Pressed twice'), requestId };
    const answers = await Promise.all([1, 2, 3].map(() => engineer.post(address, body)));
    expect(new Set(answers.map(({ body: made }) => (made as Assembly).id)).size).toBe(1);
    expect((await list('search=Pressed')).total).toBe(1);
    const other = await designer.post(address, body);
    expect((other.body as Assembly).id).not.toBe((answers[0]?.body as Assembly).id);
  });
});

describe('the list', () => {
  it('is searched, sorted and paged', async () => {
    for (const name of ['Zinc box', 'Amber box', 'Mossy box']) await make(demoDocument('load-box', name), designer);
    const names = async (query: string) => (await list(query)).items.map(({ name }) => name);
    expect(await names('search=y%20BOX')).toEqual(['Mossy box']);
    expect((await names('sort=name&search=box')).filter((n) => /^(Amber|Mossy|Zinc)/.test(n))).toEqual([
      'Amber box',
      'Mossy box',
      'Zinc box',
    ]);
    const all = await list('sort=-name&pageSize=500');
    const paged = [...(await names('sort=-name&pageSize=2&page=1')), ...(await names('sort=-name&pageSize=2&page=2'))];
    expect(paged).toEqual(all.items.slice(0, 4).map(({ name }) => name));
    expect((await list('pageSize=2&page=2')).page).toBe(2);
    expect((await list('page=9999')).items).toEqual([]);
  });

  it('puts the least headroom first when sorted so, and what has none last', async () => {
    await server.settled();
    const headrooms = (await list('sort=headroom&pageSize=500')).items.map(({ verdict }) => verdict?.headroom ?? null);
    const known = headrooms.filter((headroom) => headroom !== null);
    expect(known.length).toBeGreaterThan(2);
    expect(known).toEqual([...known].sort((a, b) => a - b));
    expect(headrooms.slice(0, known.length)).toEqual(known);
  });

  it('leaves out what is archived, and shows it when asked', async () => {
    const made = await make(demoDocument('load-box', 'Put away'));
    expect((await designer.post(`${address}/${made.id}/archive`, undefined)).body).toMatchObject({ archived: true });
    expect((await list('search=Put%20away')).total).toBe(0);
    expect((await list('search=Put%20away&archived=true')).total).toBe(1);
    await designer.post(`${address}/${made.id}/unarchive`, undefined);
    expect((await list('search=Put%20away')).total).toBe(1);
  });
});

describe('a duplicate', () => {
  it('has the draft under a new name and goes its own way', async () => {
    const made = await make();
    const copy = (await designer.post(`${address}/${made.id}/duplicate`, { name: 'The copy' })).body as Assembly;
    expect(copy.draft.document).toEqual({ ...made.draft.document, name: 'The copy' });
    await designer.put(`${address}/${copy.id}/draft`, { expectedVersion: 1, document: { name: 'Elsewhere' } });
    expect((await read(made.id)).draft.version).toBe(1);
  });
});

describe('a revision', () => {
  it('is an immutable numbered copy with its contributors', async () => {
    const made = await make();
    const later = changed(made.draft.document, '/note', 'by the designer');
    await designer.put(`${address}/${made.id}/draft`, { expectedVersion: 1, document: later });
    const answer = await engineer.post(`${address}/${made.id}/revisions`, { expectedVersion: 2, note: 'first' });
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({ number: 1, note: 'first', createdBy: { name: 'Edmund Peat' } });
    const people = (answer.body as { contributors: { name: string }[] }).contributors.map(({ name }) => name);
    expect(people).toEqual(['Dorrit Sedge', 'Edmund Peat']);
    expect((await read(made.id)).draftAhead).toBe(false);
    await engineer.put(`${address}/${made.id}/draft`, { expectedVersion: 2, document: { name: 'torn down' } });
    const kept = await viewer.get(`${address}/${made.id}/revisions/1`);
    expect((kept.body as { document: Json }).document.note).toBe('by the designer');
    expect((await read(made.id)).draftAhead).toBe(true);
  });

  it('made by two presses of one button is one', async () => {
    const made = await make();
    const body = { expectedVersion: 1, note: 'pressed twice' };
    const path = `${address}/${made.id}/revisions`;
    const answers = await Promise.all([engineer.post(path, body), engineer.post(path, body)]);
    expect(answers.map(({ status }) => status)).toEqual([201, 201]);
    expect((await read(made.id)).revisions).toHaveLength(1);
    await engineer.post(path, { ...body, note: 'meant' });
    expect((await read(made.id)).revisions).toHaveLength(2);
  });

  it('is refused for an unfinished draft, with the paths, and for one that has moved', async () => {
    const made = await make(changed(demoDocument(), '/housing/faces/top/wallM', 0));
    const unfinished = await engineer.post(`${address}/${made.id}/revisions`, { expectedVersion: 1 });
    expect(unfinished.status).toBe(422);
    expect(unfinished.body).toMatchObject({ errors: [{ path: '/housing/faces/top/wallM' }] });
    const moved = await engineer.post(`${address}/${made.id}/revisions`, { expectedVersion: 7 });
    expect(moved.status).toBe(409);
    expect(moved.body).toMatchObject({ current: { version: 1 } });
    expect((await viewer.get(`${address}/${made.id}/revisions/1`)).status).toBe(404);
  });
});

describe('saved estimates', () => {
  it('answer for the draft, for a revision and for a scenario', async () => {
    const made = await make();
    await engineer.post(`${address}/${made.id}/revisions`, { expectedVersion: 1 });
    const hotter = changed(made.draft.document, '/supplies/0/currentA', 0.9);
    await engineer.put(`${address}/${made.id}/draft`, { expectedVersion: 1, document: hotter });
    const estimate = async (body: Json) =>
      (await viewer.post(`${address}/${made.id}/estimates`, body)).body as Estimate;
    expect((await estimate({})).verdict.drive).toBe(0.9);
    expect((await estimate({ revision: 1 })).verdict.drive).toBe(0.75);
    const { scenarios } = await estimate({ revision: 1 });
    const other = scenarios.at(-1)?.scenario;
    expect((await estimate({ revision: 1, scenario: other })).scenario).toBe(other);
    const unknown = await viewer.post(`${address}/${made.id}/estimates`, { scenario: 'nowhere' });
    expect(unknown.status).toBe(422);
    expect(unknown.body).toMatchObject({ errors: [{ path: '/scenario' }] });
    expect((await viewer.post(`${address}/${made.id}/estimates`, { revision: 9 })).status).toBe(404);
  });
});
