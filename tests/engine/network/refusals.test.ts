import { describe, expect, it } from 'vitest';
import { networkDocumentSchema, type NetworkDocumentInput } from '../../../shared/schemas/network.js';
import { EngineError } from '../../../server/engine/errors.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { network, resistor } from './documents.js';

const amb = { id: 'amb', fixedC: 20 };
const led = { kind: 'led', voltageV: 3, atCurrentA: 0.3, atC: 25, efficiency: 0.3 } as const;

function refusal(input: Omit<NetworkDocumentInput, 'format'>): EngineError {
  try {
    solveNetwork(network(input));
  } catch (error) {
    if (error instanceof EngineError) return error;
    throw error;
  }
  throw new Error('It was not refused');
}

describe('A network is refused by name', () => {
  const a = { id: 'a', heatW: 1 };
  const fine = [resistor('a', 'amb', 1)];
  it.each<[string, Omit<NetworkDocumentInput, 'format'>, string, string]>([
    [
      'a link to a node that is not there',
      { nodes: [amb, a], links: [resistor('a', 'b', 1)] },
      'unknown-reference',
      '/links/0/to',
    ],
    ['two nodes of one id', { nodes: [amb, a, a], links: fine }, 'duplicate-id', '/nodes/2/id'],
    [
      'two links of one id, given or by position',
      { nodes: [amb, a], links: [...fine, { ...resistor('a', 'amb', 2), id: 'link-1' }] },
      'duplicate-id',
      '/links/1/id',
    ],
    ['a node without a path to a fixed temperature', { nodes: [amb, a], links: [] }, 'no-path-to-fixed', '/nodes/1'],
    [
      'a path that carries nothing: an area of zero',
      { nodes: [amb, a], links: [{ kind: 'film', from: 'a', to: 'amb', coefficientWPerM2K: 5, areaM2: 0 }] },
      'no-path-to-fixed',
      '/nodes/1',
    ],
    [
      'a path that carries nothing: an emissivity of zero',
      { nodes: [amb, a], links: [{ kind: 'radiation', from: 'a', to: 'amb', emissivity: 0, areaM2: 1 }] },
      'no-path-to-fixed',
      '/nodes/1',
    ],
    [
      'a path that carries nothing: an opening of zero',
      {
        nodes: [amb, a],
        links: [{ kind: 'ventilation', from: 'a', to: 'amb', inletAreaM2: 0, outletAreaM2: 1e-4, heightM: 0.1 }],
      },
      'no-path-to-fixed',
      '/nodes/1',
    ],
    [
      'an inclined plate without its tilt',
      {
        nodes: [amb, a],
        links: [{ kind: 'convection', from: 'a', to: 'amb', shape: 'inclined-plate', areaM2: 0.01, lengthM: 0.1 }],
      },
      'invalid-document',
      '/links/0/tiltDeg',
    ],
    [
      'a vertical cylinder without its diameter',
      {
        nodes: [amb, a],
        links: [{ kind: 'convection', from: 'a', to: 'amb', shape: 'vertical-cylinder', areaM2: 0.01, lengthM: 0.1 }],
      },
      'invalid-document',
      '/links/0/diameterM',
    ],
    [
      'fins that leave no gap',
      {
        nodes: [amb, a],
        links: [
          {
            kind: 'fin-array',
            from: 'a',
            to: 'amb',
            baseWidthM: 0.05,
            baseHeightM: 0.1,
            finHeightM: 0.02,
            finThicknessM: 0.005,
            finCount: 10,
            conductivityWPerMK: 200,
          },
        ],
      },
      'invalid-document',
      '/links/0/finCount',
    ],
    [
      'fins that lean more than 45°',
      {
        nodes: [amb, a],
        links: [
          {
            kind: 'fin-array',
            from: 'a',
            to: 'amb',
            baseWidthM: 0.05,
            baseHeightM: 0.1,
            finHeightM: 0.02,
            finThicknessM: 0.001,
            finCount: 10,
            conductivityWPerMK: 200,
            tiltDeg: 60,
          },
        ],
      },
      'invalid-document',
      '/links/0/tiltDeg',
    ],
    [
      'ventilation without a height',
      {
        nodes: [amb, a],
        links: [{ kind: 'ventilation', from: 'a', to: 'amb', inletAreaM2: 1e-4, outletAreaM2: 1e-4 }],
      },
      'invalid-document',
      '/links/0/heightM',
    ],
    [
      'a grid that touches nothing',
      {
        nodes: [amb, a],
        links: fine,
        grids: [
          { id: 'g', sizeM: [0.1, 0.1], layers: [{ thicknessM: 0.002, inPlaneWPerMK: 200, throughWPerMK: 200 }] },
        ],
      },
      'no-path-to-fixed',
      '/grids/0',
    ],
    [
      'a patch that hangs over its grid',
      {
        nodes: [amb, a],
        links: fine,
        grids: [
          {
            id: 'g',
            sizeM: [0.1, 0.1],
            layers: [{ thicknessM: 0.002, inPlaneWPerMK: 200, throughWPerMK: 200 }],
            patches: [{ node: 'a', side: 'near', xM: 0.09, yM: 0.01, sizeM: [0.02, 0.02] }],
          },
        ],
      },
      'invalid-document',
      '/grids/0/patches/0',
    ],
    ['heat into a fixed node', { nodes: [{ ...amb, heatW: 1 }, a], links: fine }, 'heat-into-fixed', '/nodes/0/heatW'],
    [
      'light on a fixed node',
      {
        nodes: [amb, { id: 'a', source: { ...led, currentA: 0.3, light: [{ node: 'amb', share: 0.5 }] } }],
        links: fine,
      },
      'heat-into-fixed',
      '/nodes/1/source/light/0/node',
    ],
    [
      'more light than there is',
      {
        nodes: [
          amb,
          {
            id: 'a',
            source: {
              ...led,
              currentA: 0.3,
              light: [
                { node: 'a', share: 0.6 },
                { node: 'a', share: 0.6 },
              ],
            },
          },
        ],
        links: fine,
      },
      'invalid-document',
      '/nodes/1/source/light',
    ],
    [
      'a source without a current',
      { nodes: [amb, { id: 'a', source: led }], links: fine },
      'invalid-document',
      '/nodes/1/source/currentA',
    ],
    [
      'a supply that is not there',
      { nodes: [amb, { id: 'a', source: { ...led, supply: 'x' } }], links: fine },
      'unknown-reference',
      '/nodes/1/source/supply',
    ],
    [
      'a correlation of another shape',
      {
        nodes: [amb, a],
        links: [
          {
            kind: 'convection',
            shape: 'vertical-plate',
            from: 'a',
            to: 'amb',
            areaM2: 1,
            lengthM: 1,
            correlation: 'mcadams',
          },
        ],
      },
      'unknown-reference',
      '/links/0/correlation',
    ],
    [
      'a view that breaks reciprocity',
      {
        nodes: [amb, a],
        links: [
          { kind: 'radiation', from: 'a', to: 'amb', areaM2: 2, areaToM2: 1, emissivity: 0.9, emissivityTo: 0.9 },
        ],
      },
      'invalid-document',
      '/links/0/areaToM2',
    ],
    [
      'a limit on a node that is not there',
      { nodes: [amb, a], links: fine, limits: [{ id: 'l', node: 'b', maxC: 80 }] },
      'unknown-reference',
      '/limits/0/node',
    ],
    [
      'a link from a node to itself',
      { nodes: [amb, a], links: [...fine, resistor('a', 'a', 1)] },
      'invalid-document',
      '/links/1/to',
    ],
  ])('%s', (_, input, code, path) => {
    const error = refusal(input);
    expect(error.code).toBe(code);
    expect(error.errors[0]?.path).toBe(path);
  });

  it('where a resistor runs away, with the highest drive that holds', () => {
    const error = refusal({
      nodes: [amb, { id: 'a', source: { kind: 'resistor', resistanceOhm: 10, perK: 0.004, atC: 20, currentA: 2 } }],
      links: [resistor('a', 'amb', 10)],
    });
    expect(error.code).toBe('runaway');
    expect(error.errors[0]?.node).toBe('a');
    expect(error.message).toMatch(/up to \d+(\.\d+)? %/);
  });

  it('where a cooler takes more than can reach it', () => {
    const error = refusal({ nodes: [amb, { id: 'a', heatW: -10 }], links: [resistor('a', 'amb', 100)] });
    expect(error.errors[0]?.node).toBe('a');
    expect(error.message).toContain('takes away more heat');
  });

  it('by the schema: numbers that are none, negative or absurd', () => {
    const parse = (nodes: unknown, links: unknown = fine) =>
      networkDocumentSchema.safeParse({ format: 'trimwick-network/1', nodes, links });
    expect(parse([amb, { id: 'a', heatW: Infinity }]).error?.issues[0]?.path).toEqual(['nodes', 1, 'heatW']);
    expect(parse([amb, { id: 'a', heatW: 1e9 }]).error?.issues[0]?.path).toEqual(['nodes', 1, 'heatW']);
    expect(parse([amb, a], [resistor('a', 'amb', 0)]).error?.issues[0]?.path).toEqual(['links', 0, 'resistanceKPerW']);
    expect(parse([amb, a], [resistor('a', 'amb', -1)]).success).toBe(false);
    expect(parse([amb, a], [resistor('a', 'amb', Number.NaN)]).success).toBe(false);
  });
});

describe('A network is answered', () => {
  it('where every node is fixed, with its flows', () => {
    const { flowsW } = solveNetwork(
      network({ nodes: [amb, { id: 'b', fixedC: 30 }], links: [resistor('b', 'amb', 2)] }),
    );
    expect(flowsW['link-1']).toBeCloseTo(5, 12);
  });

  it('where nothing is heated and only convection leads out: all as warm as the room', () => {
    const { temperaturesC } = solveNetwork(
      network({
        nodes: [amb, { id: 'a' }],
        links: [{ kind: 'convection', shape: 'plate-facing-down', from: 'a', to: 'amb', areaM2: 0.01, lengthM: 0.02 }],
      }),
    );
    expect(temperaturesC.a).toBeCloseTo(20, 6);
  });

  it('with resistances from 1e-6 to 1e6 K/W in one', () => {
    const { temperaturesC, heatBalance } = solveNetwork(
      network({
        nodes: [amb, { id: 'a', heatW: 2 }, { id: 'b' }, { id: 'c' }],
        links: [resistor('a', 'b', 1e-6), resistor('b', 'amb', 10), resistor('c', 'b', 1e6), resistor('c', 'amb', 1e6)],
      }),
    );
    expect(temperaturesC.b).toBeCloseTo(40, 3);
    expect(temperaturesC.c).toBeCloseTo(30, 3);
    expect(Math.abs(heatBalance.inW - heatBalance.outW)).toBeLessThan(1e-7);
  });
});
