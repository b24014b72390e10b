import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findCeiling } from '../../../server/engine/answers/ceiling.js';
import { EngineError } from '../../../server/engine/errors.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { network, resistor } from '../network/documents.js';
import { randomNetwork } from '../network/random-networks.js';

const amb = { id: 'amb', fixedC: 20 };

describe('The drive ceiling', () => {
  it('of a heater through a resistance is (limit − room)/R, exactly', () => {
    const document = network({
      nodes: [amb, { id: 'a', heatW: 2 }],
      links: [resistor('a', 'amb', 8)],
      limits: [{ id: 'hot', node: 'a', maxC: 100 }],
    });
    const ceiling = findCeiling(document, { sources: ['a'] });
    expect(ceiling).toMatchObject({ status: 'found', binds: { kind: 'temperature', id: 'hot', node: 'a' } });
    expect(ceiling.scale).toBeCloseTo(5, 5);
    expect(ceiling.heatW).toBeCloseTo(10, 4);
  });

  it('of a resistor on a supply is where I² R (1 + α ΔT) R_θ reaches the limit', () => {
    const document = network({
      supplies: [{ id: 'drive', currentA: 0.5 }],
      nodes: [
        { id: 'amb', fixedC: 25 },
        { id: 'a', source: { kind: 'resistor', supply: 'drive', resistanceOhm: 2, perK: 0.004 } },
      ],
      links: [resistor('a', 'amb', 8)],
      limits: [{ id: 'hot', node: 'a', maxC: 125 }],
    });
    const expected = Math.sqrt(100 / 8 / (2 * (1 + 0.004 * 100)));
    const bySupply = findCeiling(document, { supply: 'drive' });
    expect(bySupply.currentA).toBeCloseTo(expected, 5);
    expect(bySupply.scale).toBeCloseTo(expected / 0.5, 5);
    // Driving the source drives its supply.
    expect(findCeiling(document, { sources: ['a'] }).scale).toBeCloseTo(bySupply.scale, 6);
  });

  it('of a derated resistor is where its line meets the curve', () => {
    // 10 W to 70 °C, nothing at 155 °C; body at 20 + 8 P: P = 10 (155 − 20 − 8 P)/85.
    const document = network({
      supplies: [{ id: 'drive', currentA: 1 }],
      nodes: [amb, { id: 'a', source: { kind: 'resistor', supply: 'drive', resistanceOhm: 1, atC: 25 } }],
      links: [resistor('a', 'amb', 8)],
      limits: [
        {
          id: 'curve',
          node: 'a',
          maxW: 10,
          derating: {
            referenceNode: 'a',
            points: [
              [70, 1],
              [155, 0],
            ],
          },
        },
      ],
    });
    const power = 1350 / (85 + 80);
    const ceiling = findCeiling(document, { supply: 'drive' });
    expect(ceiling.currentA).toBeCloseTo(Math.sqrt(power), 5);
    expect(ceiling.binds).toMatchObject({ kind: 'power', id: 'curve' });
  });

  it('never exceeds the least rating on its supply', () => {
    const document = network({
      supplies: [{ id: 'drive', currentA: 1 }],
      nodes: [amb, { id: 'a', source: { kind: 'resistor', supply: 'drive', resistanceOhm: 0.1 } }],
      links: [resistor('a', 'amb', 1)],
      limits: [
        { id: 'supply', supply: 'drive', maxA: 3 },
        { id: 'device', node: 'a', maxA: 2 },
        { id: 'hot', node: 'a', maxC: 200 },
      ],
    });
    const ceiling = findCeiling(document, { supply: 'drive' });
    expect(ceiling.currentA).toBeCloseTo(2, 5);
    expect(ceiling.perLimit.map(({ scale }) => Number((scale ?? NaN).toFixed(4)))).toEqual([
      3,
      2,
      Number(Math.sqrt(1800).toFixed(4)),
    ]);
  });

  it('says when a limit is exceeded with no drive at all', () => {
    const document = network({
      nodes: [
        { id: 'amb', fixedC: 90 },
        { id: 'a', heatW: 1 },
      ],
      links: [resistor('a', 'amb', 1)],
      limits: [{ id: 'hot', node: 'a', maxC: 80 }],
    });
    expect(findCeiling(document, { sources: ['a'] })).toMatchObject({
      status: 'exceeded-at-zero',
      scale: 0,
      binds: { id: 'hot' },
    });
  });

  it('says when nothing limits within its range, and what the range is', () => {
    const document = network({ nodes: [amb, { id: 'a', heatW: 0.1 }], links: [resistor('a', 'amb', 0.1)] });
    expect(findCeiling(document, { sources: ['a'] })).toMatchObject({
      status: 'no-limit-within-range',
      binds: null,
      range: [0, 100],
    });
  });

  it('finds the runaway of a resistor where it would pass 1500 K', () => {
    const document = network({
      supplies: [{ id: 'drive', currentA: 0.3 }],
      nodes: [amb, { id: 'a', source: { kind: 'resistor', supply: 'drive', resistanceOhm: 10, perK: 0.004, atC: 20 } }],
      links: [resistor('a', 'amb', 10)],
    });
    const ceiling = findCeiling(document, { supply: 'drive' });
    // 1500 K = 1226.85 °C is a rise of 1206.85 K: 100 I² (1 + 0.004 · 1206.85) = 1206.85.
    expect(ceiling.status).toBe('runaway');
    expect(ceiling.runaway?.node).toBe('a');
    expect(ceiling.currentA).toBeCloseTo(Math.sqrt(1206.85 / (100 * (1 + 0.004 * 1206.85))), 3);
  });

  it('counts in amperes where the present drive is zero', () => {
    const document = network({
      supplies: [{ id: 'drive', currentA: 0 }],
      nodes: [amb, { id: 'a', source: { kind: 'resistor', supply: 'drive', resistanceOhm: 1 } }],
      links: [resistor('a', 'amb', 5)],
      limits: [{ id: 'hot', node: 'a', maxC: 65 }],
    });
    expect(findCeiling(document, { supply: 'drive' }).currentA).toBeCloseTo(3, 5);
  });

  it('refuses a drive that is not there', () => {
    const document = network({ nodes: [amb], links: [] });
    expect(() => findCeiling(document, { supply: 'x' })).toThrow(EngineError);
    expect(() => findCeiling(document, { sources: ['x'] })).toThrow('There is no node “x”');
  });

  it('× 1.001 breaks a limit and × 0.999 breaks none, in random networks', () => {
    fc.assert(
      fc.property(randomNetwork(), fc.double({ min: 15, max: 90, noNaN: true }), (document, above) => {
        const heated = document.nodes.filter(({ heatW }) => (heatW ?? 0) > 0).map(({ id }) => id);
        fc.pre(heated.length > 0);
        const room = document.nodes[0]?.fixedC ?? 0;
        const limits = document.nodes.slice(1).map(({ id }) => ({ id, node: id, maxC: room + above }));
        const ceiling = findCeiling({ ...document, limits }, { sources: heated });
        fc.pre(ceiling.status === 'found');
        const worst = (factor: number) => {
          const nodes = document.nodes.map((node) =>
            (node.heatW ?? 0) > 0 ? { ...node, heatW: (node.heatW ?? 0) * ceiling.scale * factor } : node,
          );
          return Math.min(...solveNetwork({ ...document, nodes, limits }).limits.map(({ margin }) => margin));
        };
        expect(worst(1.001)).toBeLessThan(0);
        expect(worst(0.999)).toBeGreaterThan(0);
      }),
      { numRuns: 150, seed: 4314 },
    );
  });
});
