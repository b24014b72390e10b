import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { CeilingAnswer, SolveAnswer } from '../../shared/schemas/network-answers.js';
import type { Estimate } from '../../shared/schemas/estimate.js';
import { changed, demoDocument, rodNetwork, type Json } from './support/documents.js';
import type { Person } from './support/person.js';
import { TestServer } from './support/server.js';

let server: TestServer;
let viewer: Person;
beforeAll(async () => {
  server = await TestServer.start();
  viewer = await server.as('viewer');
});
afterAll(() => server.stop());

const pathsOf = (body: unknown) => (body as { errors: { path: string }[] }).errors.map(({ path }) => path);

describe('/networks/solve', () => {
  it('answers a rod to a room by ohm’s law of heat, with links named by position', async () => {
    const network = changed(rodNetwork(), '/links/0/id', undefined);
    const answer = (await viewer.post('/api/v1/networks/solve', network)).body as SolveAnswer;
    expect(answer.temperaturesC.heater).toBeCloseTo(45, 9);
    expect(answer.flowsW['link-1']).toBeCloseTo(10, 9);
    expect(answer.limits[0]).toMatchObject({ id: 'top', value: 45, limit: 65, margin: 20 });
    expect(answer.heatBalance.inW).toBeCloseTo(answer.heatBalance.outW, 9);
    expect(answer.compared).toBeUndefined();
  });

  it('adds the second correlation when asked to compare', async () => {
    const network = rodNetwork();
    network.links = [
      { kind: 'convection', from: 'heater', to: 'room', shape: 'vertical-plate', areaM2: 0.02, lengthM: 0.1 },
    ];
    const plain = (await viewer.post('/api/v1/networks/solve', network)).body as SolveAnswer;
    const both = (await viewer.post('/api/v1/networks/solve?compare=true', network)).body as SolveAnswer;
    expect(both.temperaturesC).toEqual(plain.temperaturesC);
    expect(both.compared?.temperaturesC.heater).toBeGreaterThan(25);
    expect(both.compared?.temperaturesC.heater).not.toBe(plain.temperaturesC.heater);
  });

  it.each([
    ['/nodes/0/heatW', 1e9],
    ['/nodes/0/heatW', '10'],
    ['/nodes/0/heatW', null],
    ['/links/0/resistanceKPerW', 0],
    ['/links/0/resistanceKPerW', -2],
    ['/links/0/resistanceKPerW', '0,5'],
    ['/links/0/to', 'nowhere'],
    ['/links/0/kind', 'hope'],
    ['/links/0/colour', 'red'],
    ['/limits/0/node', 'nowhere'],
    ['/nodes/1/id', 'heater'],
    ['/format', 'something/2'],
    ['/nodes', []],
    ['/nodes', undefined],
    ['/pressurePa', -1],
  ])('refuses at %s the value %j', async (pointer, value) => {
    const answer = await viewer.post('/api/v1/networks/solve', changed(rodNetwork(), pointer, value));
    expect(answer.status).toBe(422);
    expect(pathsOf(answer.body).some((path) => path === pointer || pointer.startsWith(`${path}/`))).toBe(true);
  });

  it('names the node that has no path to a fixed temperature', async () => {
    const answer = await viewer.post('/api/v1/networks/solve', changed(rodNetwork(), '/links', []));
    expect(answer.status).toBe(422);
    expect(answer.body).toMatchObject({ errors: [{ node: 'heater' }] });
  });
});

describe('/networks/ceiling', () => {
  it('finds the scale at which the limit is reached: 40 K over 2 K/W is 20 W, twice the present 10 W', async () => {
    const body = { document: rodNetwork(), drive: { sources: ['heater'] } };
    const answer = (await viewer.post('/api/v1/networks/ceiling', body)).body as CeilingAnswer;
    expect(answer.status).toBe('found');
    expect(answer.scale).toBeCloseTo(2, 6);
    expect(answer.heatW).toBeCloseTo(20, 5);
    expect(answer.binds).toMatchObject({ id: 'top', node: 'heater' });
  });

  it('takes further limits, and names what is wrong by where it stands in the request', async () => {
    const body = { document: rodNetwork(), drive: { sources: ['heater'] } };
    const lower = await viewer.post('/api/v1/networks/ceiling', { ...body, limits: [{ node: 'heater', maxC: 35 }] });
    expect((lower.body as CeilingAnswer).scale).toBeCloseTo(0.5, 6);
    const badDrive = await viewer.post('/api/v1/networks/ceiling', { ...body, drive: { sources: ['nowhere'] } });
    expect(badDrive.status).toBe(422);
    expect(pathsOf(badDrive.body)[0]).toMatch(/^\/drive/);
    const badNode = await viewer.post('/api/v1/networks/ceiling', {
      ...body,
      document: changed(rodNetwork(), '/links/0/to', 'nowhere'),
    });
    expect(pathsOf(badNode.body)).toEqual(['/document/links/0/to']);
    const badLimit = await viewer.post('/api/v1/networks/ceiling', { ...body, limits: [{ node: 'no', maxC: 35 }] });
    expect(badLimit.status).toBe(422);
    expect(pathsOf(badLimit.body)).toEqual(['/limits/0/node']);
  });
});

describe('/estimates', () => {
  const estimate = (assembly: Json, more: Json = {}) => viewer.post('/api/v1/estimates', { assembly, ...more });

  it('keeps its heat balance, a guarded ceiling at or below the nominal one, and node ids as published', async () => {
    const body = (await estimate(demoDocument('stall-lantern'))).body as Estimate;
    expect(body.heatBalance.inW).toBeCloseTo(body.heatBalance.outW + body.heatBalance.lightOutW, 8);
    expect(body.guardedCeiling.scale).toBeLessThanOrEqual(body.ceiling.scale);
    const ids = body.nodes.map(({ id }) => id);
    expect(ids).toEqual(expect.arrayContaining(['air.inside', 'face.top.outer', 'face.top.inner']));
    expect(ids.filter((id) => /^part\..+\.junction$/.test(id)).length).toBeGreaterThan(0);
  });

  it('saves nothing', async () => {
    const count = async () => ((await viewer.get('/api/v1/assemblies')).body as { total: number }).total;
    const before = await count();
    await estimate(demoDocument());
    expect(await count()).toBe(before);
  });

  it('takes values by version as well as in place, with the same answer', async () => {
    const list = await viewer.get('/api/v1/assemblies?search=load');
    const [saved] = (list.body as { items: { id: string }[] }).items;
    const draft = (await viewer.get(`/api/v1/assemblies/${saved?.id ?? ''}`)).body as { draft: { document: Json } };
    expect(JSON.stringify(draft.draft.document)).toContain('"version"');
    const byVersion = (await estimate(draft.draft.document)).body as Estimate;
    const inPlace = (await estimate(demoDocument())).body as Estimate;
    expect(byVersion.verdict).toEqual(inPlace.verdict);
  });

  it('refuses a version that is not known, and one of another kind, at the field', async () => {
    const unknown = await estimate(changed(demoDocument(), '/parts/0/type', { version: randomUUID() }));
    expect(unknown.status).toBe(422);
    expect(pathsOf(unknown.body)).toEqual(['/assembly/parts/0/type/version']);
    const finish = (await viewer.get('/api/v1/finishes')).body as { items: { version: string }[] };
    const ref = { version: finish.items[0]?.version };
    const wrong = await estimate(changed(demoDocument(), '/housing/faces/top/material', ref));
    expect(wrong.status).toBe(422);
    expect(pathsOf(wrong.body)).toEqual(['/assembly/housing/faces/top/material/version']);
    const rules = await estimate(demoDocument(), { ruleSet: ref });
    expect(pathsOf(rules.body)).toEqual(['/ruleSet/version']);
  });

  it('refuses a scenario that is not there beside its field', async () => {
    const answer = await estimate(demoDocument(), { scenario: 'nowhere' });
    expect(answer.status).toBe(422);
    expect(pathsOf(answer.body)).toEqual(['/scenario']);
  });
});

describe('/assemblies/compile', () => {
  it('gives each scenario’s network, and solving that gives the estimate’s temperatures', async () => {
    const document = demoDocument();
    const compiled = (await viewer.post('/api/v1/assemblies/compile', document)).body as {
      networks: { scenario: string; network: Json }[];
    };
    expect(compiled.networks.map(({ scenario }) => scenario)).toEqual(
      (document.scenarios as { id: string }[]).map(({ id }) => id),
    );
    for (const { scenario, network } of compiled.networks) {
      const solved = (await viewer.post('/api/v1/networks/solve', network)).body as SolveAnswer;
      const estimated = (await viewer.post('/api/v1/estimates', { assembly: document, scenario })).body as Estimate;
      for (const { id, temperatureC } of estimated.nodes) expect(solved.temperaturesC[id]).toBeCloseTo(temperatureC, 6);
    }
  });
});

describe('/correlations', () => {
  it('lists every correlation with formula, range and source; a network may name each of its shape', async () => {
    const answer = await viewer.get('/api/v1/correlations');
    expect(answer.status).toBe(200);
    const { items, total } = answer.body as {
      items: { id: string; shape: string; regime: string; source: string }[];
      total: number;
    };
    expect(items).toHaveLength(total);
    expect(items.map(({ id }) => id)).toEqual(
      expect.arrayContaining([
        'raithby-hollands',
        'churchill-chu',
        'morgan',
        'whitaker',
        'elsherbiny',
        'hollands',
        'elenbaas',
      ]),
    );
    for (const { source } of items) expect(source.length).toBeGreaterThan(5);
    const cylinder = items.filter(({ shape }) => shape === 'horizontal-cylinder');
    for (const { id } of cylinder) {
      const solved = await viewer.post('/api/v1/networks/solve', {
        format: 'trimwick-network/1',
        nodes: [
          { id: 'room', fixedC: 20 },
          { id: 'pipe', heatW: 5 },
        ],
        links: [
          {
            kind: 'convection',
            from: 'pipe',
            to: 'room',
            shape: 'horizontal-cylinder',
            areaM2: 0.03,
            lengthM: 0.02,
            correlation: id,
          },
        ],
      });
      expect(solved.status).toBe(200);
    }
  });
});
