import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { NetworkDocument } from '../../../shared/schemas/network.js';
import { EngineError } from '../../../server/engine/errors.js';
import { linkLaw } from '../../../server/engine/network/link-laws.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { randomNetwork } from './random-networks.js';

/** Solves, or passes over a network that honestly runs away: heat through radiation and poor links beyond 1500 K. */
function solve(document: NetworkDocument) {
  try {
    return solveNetwork(document);
  } catch (error) {
    if (error instanceof EngineError && error.code === 'runaway') return null;
    throw error;
  }
}

function withHeat(document: NetworkDocument, change: (heatW: number, index: number) => number): NetworkDocument {
  let index = -1;
  return {
    ...document,
    nodes: document.nodes.map((node) =>
      node.heatW === undefined ? node : { ...node, heatW: change(node.heatW, ++index) },
    ),
  };
}

/**
 * How far apart two answers may lie [K] beyond 1e-9: what the solver leaves of a balance, 10⁻¹¹ of the heat, and what rounding takes from a flow
 * (a link of conductance G cannot tell it more finely than the last digit of G T), over the weakest link between a node and the room. Natural
 * convection between nearly equal temperatures hardly conducts: there the heat flows are what is checked.
 */
function leftOpenK(document: NetworkDocument, temperaturesC: Record<string, number>, heatW: number): number {
  const out = { flow: 0, byFrom: 0, byTo: 0, film: 0 };
  const links = document.links.map((link) => {
    const from = (temperaturesC[link.from] ?? NaN) + 273.15;
    linkLaw(link, document).evaluate(from, (temperaturesC[link.to] ?? NaN) + 273.15, out);
    return { conductance: Math.min(out.byFrom, -out.byTo), lost: Number.EPSILON * out.byFrom * from };
  });
  // The first links are the tree that hangs on the room: one for each node that is not fixed.
  const tree = links.slice(0, document.nodes.length - 1);
  const weakest = Math.min(...tree.map(({ conductance }) => conductance));
  return (1e-11 * heatW + Math.hypot(...links.map(({ lost }) => lost))) / Math.max(weakest, 0);
}

describe('Thousands of random networks', () => {
  it('lose exactly the heat that is put in, to 1e-9 of it', () => {
    let solved = 0;
    fc.assert(
      fc.property(randomNetwork(), (document) => {
        const answer = solve(document);
        fc.pre(answer !== null);
        solved++;
        const { inW, outW } = answer.heatBalance;
        // Flows of 100 W/K between temperatures near 300 K cannot be told more finely than 10⁻¹⁰ W in double precision.
        fc.pre(inW > 0.3);
        expect(Math.abs(inW - outW)).toBeLessThanOrEqual(1e-9 * Math.max(inW, outW));
      }),
      { numRuns: 2500, seed: 4310 },
    );
    expect(solved).toBeGreaterThan(2000);
  });

  it('do not care in which order nodes and links are written, to 1e-9 K or what the solver leaves open', () => {
    let solved = 0;
    let within = 0;
    fc.assert(
      fc.property(randomNetwork(), (document) => {
        const answer = solve(document);
        fc.pre(answer !== null);
        const turned = solve({
          ...document,
          nodes: [...document.nodes].reverse(),
          links: [...document.links].reverse(),
        });
        const heatW = Math.max(answer.heatBalance.inW, 0.1);
        const allowed = 1e-9 + leftOpenK(document, answer.temperaturesC, heatW);
        let largest = 0;
        for (const [id, value] of Object.entries(answer.temperaturesC)) {
          const difference = Math.abs((turned?.temperaturesC[id] ?? NaN) - value);
          expect(difference).toBeLessThan(allowed);
          largest = Math.max(largest, difference);
        }
        for (const [id, flow] of Object.entries(answer.flowsW)) {
          expect(Math.abs((turned?.flowsW[id] ?? NaN) - flow)).toBeLessThan(1e-9 * Math.max(heatW, 1));
        }
        solved++;
        if (largest < 1e-9) within++;
      }),
      { numRuns: 800, seed: 4311 },
    );
    expect(within / solved).toBeGreaterThan(0.95);
  });

  it('cool nowhere when a source is raised', () => {
    fc.assert(
      fc.property(randomNetwork(), fc.nat(13), (document, which) => {
        const before = solve(document);
        const count = document.nodes.length - 1;
        const after = solve(withHeat(document, (heatW, i) => (i === which % count ? heatW + 0.5 : heatW)));
        fc.pre(before !== null && after !== null);
        for (const [id, value] of Object.entries(before.temperaturesC)) {
          expect((after.temperaturesC[id] ?? NaN) - value).toBeGreaterThan(-1e-6);
        }
      }),
      { numRuns: 500, seed: 4312 },
    );
  });

  it('superpose and are reciprocal where they are linear', () => {
    const rise = (document: NetworkDocument, heats: Record<string, number>): Record<string, number> => {
      const nodes = document.nodes.map((node) =>
        node.fixedC === undefined ? { id: node.id, heatW: heats[node.id] ?? 0 } : node,
      );
      const { temperaturesC } = solveNetwork({ ...document, nodes });
      const room = temperaturesC.room ?? NaN;
      return Object.fromEntries(Object.entries(temperaturesC).map(([id, value]) => [id, value - room]));
    };
    fc.assert(
      fc.property(randomNetwork({ linear: true }), (document) => {
        const a = rise(document, { n0: 0.01 });
        const b = rise(document, { n1: 0.01 });
        const both = rise(document, { n0: 0.02, n1: 0.03 });
        const scale = Math.max(...Object.values(both).map(Math.abs), 1);
        expect(Math.abs((a.n1 ?? NaN) - (b.n0 ?? NaN))).toBeLessThan(1e-8 * scale);
        for (const id of Object.keys(both)) {
          expect(Math.abs((both[id] ?? NaN) - 2 * (a[id] ?? NaN) - 3 * (b[id] ?? NaN))).toBeLessThan(1e-8 * scale);
        }
      }),
      { numRuns: 300, seed: 4313 },
    );
  });
});
