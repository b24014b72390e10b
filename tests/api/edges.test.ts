import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { allRoutes } from '../../server/routes/all.js';
import { rodNetwork } from './support/documents.js';
import { TestServer } from './support/server.js';

let server: TestServer;
beforeAll(async () => {
  server = await TestServer.start();
});
afterAll(() => server.stop());

const solve = '/api/v1/networks/solve';
const signInAddress = '/api/v1/session';

/** A raw send with the viewer’s cookies. */
async function raw(body: string, headers: Record<string, string>) {
  const viewer = await server.as('viewer');
  const cookie = [...viewer.cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  return request(server.http)
    .post(solve)
    .set({ Cookie: cookie, ...headers })
    .send(body);
}

describe('requests of other sites', () => {
  const json = { 'Content-Type': 'application/json' };
  it.each([
    ['another origin', { Origin: 'https://elsewhere.example' }],
    ['an opaque origin', { Origin: 'null' }],
    ['a browser that says cross-site', { 'Sec-Fetch-Site': 'cross-site' }],
    ['a sibling site', { 'Sec-Fetch-Site': 'same-site' }],
  ])('with cookies are refused: %s', async (_, headers) => {
    const answer = await raw(JSON.stringify(rodNetwork()), { ...json, ...headers });
    expect(answer.status).toBe(403);
    expect(answer.body).toMatchObject({ code: 'foreign-origin' });
  });

  it('cannot sign a visitor in as somebody else either', async () => {
    const body = { email: 'viewer@brackenmoor.example', password: 'trim-the-wick-4310' };
    const answer = await server.nobody().send('post', signInAddress, body, { Origin: 'https://elsewhere.example' });
    expect(answer.status).toBe(403);
    expect(answer.headers['set-cookie']).toBeUndefined();
  });

  it('are told from the own page and from scripts, which pass', async () => {
    const { port } = server.http.address() as { port: number };
    const own = { Origin: `http://127.0.0.1:${String(port)}`, 'Sec-Fetch-Site': 'same-origin' };
    expect((await raw(JSON.stringify(rodNetwork()), { ...json, ...own })).status).toBe(200);
    expect((await raw(JSON.stringify(rodNetwork()), json)).status).toBe(200);
  });

  it.each(['application/x-www-form-urlencoded', 'text/plain', 'multipart/form-data; boundary=x'])(
    'cannot pass a form off as JSON: %s is 415',
    async (type) => {
      const answer = await raw(JSON.stringify(rodNetwork()), { 'Content-Type': type });
      expect(answer.status).toBe(415);
    },
  );
});

describe('bodies', () => {
  const json = { 'Content-Type': 'application/json' };
  it.each([
    ['not JSON', '{"nodes": [', 400],
    ['a bare word', '"nodes"', 400],
    ['nothing', '', 422],
    ['a list', '[]', 422],
    ['larger than 5 MB', JSON.stringify({ text: 'x'.repeat(5_300_000) }), 413],
  ])('that are %s answer a problem', async (_, body, status) => {
    const answer = await raw(body, json);
    expect(answer.status).toBe(status);
    expect(answer.type).toBe('application/problem+json');
    expect((answer.body as { detail: string }).detail).not.toMatch(/undefined|at .*\.js/);
  });

  it.each([
    ['a NUL', 'a\u0000b'],
    ['half of a surrogate pair', 'a\ud83d'],
  ])('with text that no database keeps – %s – are refused with the path', async (_, text) => {
    const engineer = await server.as('engineer');
    const answer = await engineer.post('/api/v1/assemblies', { document: { name: 'x', deep: [{ note: text }] } });
    expect(answer.status).toBe(422);
    expect(answer.body).toMatchObject({ errors: [{ path: '/document/deep/0/note' }] });
    const named = await engineer.post('/api/v1/assemblies', { document: { [text]: 1 } });
    expect(named.body).toMatchObject({ errors: [{ path: '/document' }] });
  });

  it('nested a thousand levels deep are refused, not tripped over', async () => {
    const engineer = await server.as('engineer');
    let document: unknown = 1;
    for (let i = 0; i < 1000; i++) document = { x: document };
    const answer = await engineer.post('/api/v1/assemblies', { document });
    expect(answer.status).toBe(422);
    expect((answer.body as { detail: string }).detail).toMatch(/levels deep/);
  });

  it('with names of the language’s own insides change nothing but themselves', async () => {
    const viewer = await server.as('viewer');
    const answer = await raw('{"__proto__":{"nodes":[]},"constructor":1}', json);
    expect(answer.status).toBe(422);
    expect((await viewer.post(solve, rodNetwork())).status).toBe(200);
  });
});

describe('queries and addresses', () => {
  it.each([
    ['/api/v1/assemblies?page=0', '/page'],
    ['/api/v1/assemblies?pageSize=100000', '/pageSize'],
    ['/api/v1/assemblies?archived=perhaps', '/archived'],
    ['/api/v1/decisions?state=lost', '/state'],
    ['/api/v1/materials?search=%00', '/search'],
    ['/api/v1/materials?sort=colour', '/sort'],
    ['/api/v1/assemblies?sort=constructor', '/sort'],
    ['/api/v1/decisions?sort=-number%20DESC;--', '/sort'],
    [`/api/v1/materials?search=${'x'.repeat(201)}`, '/search'],
  ])('%s is refused at %s', async (address, field) => {
    const answer = await (await server.as('viewer')).get(address);
    expect(answer.status).toBe(422);
    expect(answer.body).toMatchObject({ errors: [{ path: field }] });
  });

  it('take % and _ and quotes in a search as themselves', async () => {
    const viewer = await server.as('viewer');
    for (const search of ['%', '_', `';--`, '\\']) {
      const answer = await viewer.get(`/api/v1/materials?search=${encodeURIComponent(search)}`);
      expect(answer.status).toBe(200);
      const { items, total } = answer.body as { items: { content: { name: string } }[]; total: number };
      expect(items.filter(({ content }) => !content.name.includes(search))).toEqual([]);
      expect(total).toBe(items.length);
    }
  });

  it.each(['/api/v1/nothing', '/api/nothing', '/api/v1/assemblies/not-an-id', '/api/v1/materials/%00'])(
    '%s is a problem, not a page',
    async (address) => {
      expect((await (await server.as('viewer')).get(address)).status).toBe(404);
    },
  );

  it('that cannot be decoded are the caller’s fault', async () => {
    const answer = await (await server.as('viewer')).get('/api/v1/materials/%c0%af');
    expect(answer.status).toBe(400);
  });
});

describe('headers', () => {
  it('carry a policy without inline scripts, and none of the program’s name', async () => {
    const answer = await request(server.http).get('/api/v1/health');
    const policy = answer.headers['content-security-policy'] ?? '';
    expect(policy).toContain("script-src 'self';");
    expect(policy).toContain("img-src 'self' data: blob:");
    expect(policy).toContain("frame-ancestors 'none'");
    expect(policy).not.toMatch(/script-src[^;]*unsafe/);
    expect(answer.headers['x-powered-by']).toBeUndefined();
    expect(answer.headers['x-content-type-options']).toBe('nosniff');
    expect(answer.headers['cache-control']).toBe('no-store');
  });

  it('compress what is long', async () => {
    const viewer = await server.as('viewer');
    const answer = await viewer.send('get', '/api/v1/materials', undefined, { 'Accept-Encoding': 'gzip' });
    expect(answer.headers['content-encoding']).toBe('gzip');
  });
});

describe('the published description', () => {
  it('is OpenAPI 3.1 with every route, its roles, body and answers', async () => {
    const answer = await request(server.http).get('/api/openapi.json');
    const document = answer.body as {
      openapi: string;
      paths: Record<string, Record<string, { responses: Record<string, unknown>; security: unknown[] }>>;
      components: { schemas: Record<string, unknown> };
    };
    expect(document.openapi).toBe('3.1.0');
    const described = Object.entries(document.paths).flatMap(([path, methods]) =>
      Object.keys(methods).map((method) => `${method} ${path.replace(/\{(\w+)\}/g, ':$1')}`),
    );
    expect(described.sort()).toEqual(allRoutes.map(({ method, path }) => `${method} /api/v1${path}`).sort());
    expect(Object.keys(document.components.schemas)).toEqual(
      expect.arrayContaining(['Assembly', 'Decision', 'Estimate', 'NetworkDocument', 'Problem']),
    );
    const solving = document.paths[solve]?.post;
    expect(Object.keys(solving?.responses ?? {})).toEqual(expect.arrayContaining(['200', '400', '401', '403', '422']));
  });

  it('names every schema that it refers to', async () => {
    const { text } = await request(server.http).get('/api/openapi.json');
    const { components } = JSON.parse(text) as { components: { schemas: Record<string, unknown> } };
    const named = [...text.matchAll(/#\/components\/schemas\/(\w+)/g)].map(([, name]) => name ?? '');
    expect(named.length).toBeGreaterThan(20);
    expect([...new Set(named)].filter((name) => !(name in components.schemas))).toEqual([]);
  });

  it('is readable at /api/docs without a request to anywhere else', async () => {
    const page = await request(server.http).get('/api/docs/');
    expect(page.status).toBe(200);
    const sources = [...page.text.matchAll(/(?:src|href)="([^"]+)"/g)].map(([, source]) => source ?? '');
    expect(sources.length).toBeGreaterThan(3);
    expect(sources.filter((source) => /^(https?:)?\/\//.test(source))).toEqual([]);
    expect(page.text).not.toMatch(/<script[^>]*>[^<\s]/);
    const start = await request(server.http).get('/api/docs/swagger-initializer.js');
    expect(start.text).toContain("url: '/api/openapi.json'");
    expect(start.text).not.toContain('petstore');
  });
});
