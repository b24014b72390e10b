/** Networks whose answers are exact: circuit laws, and closed forms of radiation. */
import { describe, expect, it } from 'vitest';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { network, resistor } from '../../engine/network/documents.js';

const ambient = { id: 'amb', fixedC: 20 };

describe('Networks with exact answers', () => {
  it('resistances in series add', () => {
    const { temperaturesC } = solveNetwork(
      network({
        nodes: [ambient, { id: 'a' }, { id: 'b', heatW: 4 }],
        links: [resistor('b', 'a', 2.5), resistor('a', 'amb', 1.5)],
      }),
    );
    expect(temperaturesC.a).toBeCloseTo(26, 9);
    expect(temperaturesC.b).toBeCloseTo(36, 9);
  });

  it('resistances in parallel share the heat by their conductances', () => {
    const { temperaturesC, flowsW } = solveNetwork(
      network({ nodes: [ambient, { id: 'a', heatW: 3 }], links: [resistor('a', 'amb', 6), resistor('a', 'amb', 3)] }),
    );
    expect(temperaturesC.a).toBeCloseTo(26, 9);
    expect(flowsW['link-1']).toBeCloseTo(1, 9);
    expect(flowsW['link-2']).toBeCloseTo(2, 9);
  });

  it('a balanced Wheatstone bridge carries nothing across; an unbalanced one as mesh analysis says', () => {
    const bridge = (r4: number) =>
      solveNetwork(
        network({
          nodes: [ambient, { id: 'hot', fixedC: 120 }, { id: 'l' }, { id: 'r' }],
          links: [
            resistor('hot', 'l', 1),
            resistor('l', 'amb', 2),
            resistor('hot', 'r', 3),
            resistor('r', 'amb', r4),
            { ...resistor('l', 'r', 5), id: 'across' },
          ],
        }),
      );
    expect(bridge(6).flowsW.across).toBeCloseTo(0, 9);
    // Thevenin: l at 120 − 100/3, r at 20 + 100·9/12; source resistances 2/3 and 27/12.
    const expected = (20 + 200 / 3 - (20 + 75)) / (2 / 3 + 27 / 12 + 5);
    expect(bridge(9).flowsW.across).toBeCloseTo(expected, 9);
  });

  it('an endless ladder’s input resistance is the golden ratio', () => {
    const rungs = 40;
    const nodes = Array.from({ length: rungs }, (_, i) => ({ id: `n${String(i)}`, ...(i === 0 ? { heatW: 1 } : {}) }));
    const links = nodes.flatMap((_, i) => [
      ...(i + 1 < rungs ? [resistor(`n${String(i)}`, `n${String(i + 1)}`, 1)] : []),
      resistor(`n${String(i)}`, 'amb', 1),
    ]);
    const { temperaturesC } = solveNetwork(network({ nodes: [ambient, ...nodes], links }));
    // Shunt first, then series: x = 1 ∥ (1 + x), so x = (√5 − 1)/2.
    expect((temperaturesC.n0 ?? NaN) - 20).toBeCloseTo((Math.sqrt(5) - 1) / 2, 9);
  });

  it('a body that only radiates has the temperature of the fourth-power law', () => {
    const { temperaturesC } = solveNetwork(
      network({
        nodes: [ambient, { id: 'a', heatW: 5 }],
        links: [{ kind: 'radiation', from: 'a', to: 'amb', areaM2: 0.01, emissivity: 0.8 }],
      }),
    );
    const kelvin = (5 / (5.670374419e-8 * 0.8 * 0.01) + 293.15 ** 4) ** 0.25;
    expect(temperaturesC.a).toBeCloseTo(kelvin - 273.15, 8);
  });

  it('two grey plates exchange by 1/(1/ε₁ + 1/ε₂ − 1)', () => {
    const { flowsW } = solveNetwork(
      network({
        nodes: [ambient, { id: 'hot', fixedC: 80 }],
        links: [
          { id: 'gap', kind: 'radiation', from: 'hot', to: 'amb', areaM2: 1, emissivity: 0.9, emissivityTo: 0.1 },
        ],
      }),
    );
    const expected = (5.670374419e-8 * (353.15 ** 4 - 293.15 ** 4)) / (1 / 0.9 + 1 / 0.1 - 1);
    expect(flowsW.gap).toBeCloseTo(expected, 8);
  });

  it('a conductivity linear in temperature gives the exact integral (Kirchhoff’s transform)', () => {
    const { flowsW } = solveNetwork(
      network({
        nodes: [ambient, { id: 'hot', fixedC: 120 }],
        links: [
          {
            id: 'bar',
            kind: 'conduction',
            from: 'hot',
            to: 'amb',
            areaM2: 0.01,
            lengthM: 0.1,
            conductivityWPerMK: [
              [0, 1],
              [200, 3],
            ],
          },
        ],
      }),
    );
    // ∫ k dT from 20 to 120 °C with k = 1 + T/100: 100 + (120² − 20²)/200.
    expect(flowsW.bar).toBeCloseTo((0.01 / 0.1) * (100 + (120 ** 2 - 20 ** 2) / 200), 9);
  });

  it('a resistor with a temperature coefficient settles where I² R (1 + α ΔT) meets ΔT/R_θ', () => {
    const { temperaturesC, devices } = solveNetwork(
      network({
        nodes: [
          { id: 'amb', fixedC: 25 },
          { id: 'a', source: { kind: 'resistor', resistanceOhm: 2, perK: 0.004, atC: 25, currentA: 1.5 } },
        ],
        links: [resistor('a', 'amb', 8)],
      }),
    );
    const p = 1.5 ** 2 * 2;
    const rise = (p * 8) / (1 - p * 8 * 0.004);
    expect(temperaturesC.a).toBeCloseTo(25 + rise, 8);
    expect(devices.a?.heatW).toBeCloseTo(rise / 8, 9);
  });

  it('ten 10 Ω resistors in parallel are 1 Ω, in series 100 Ω', () => {
    const heat = (arrangement: 'parallel' | 'series') =>
      solveNetwork(
        network({
          nodes: [
            { id: 'amb', fixedC: 25 },
            { id: 'a', source: { kind: 'resistor', resistanceOhm: 10, count: 10, arrangement, currentA: 0.2 } },
          ],
          links: [resistor('a', 'amb', 1)],
        }),
      ).devices.a?.heatW;
    expect(heat('parallel')).toBeCloseTo(0.04, 12);
    expect(heat('series')).toBeCloseTo(4, 12);
  });
});
