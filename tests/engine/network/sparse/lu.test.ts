import { lusolve, type Matrix } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { minimumDegree } from '../../../../server/engine/network/sparse/minimum-degree.js';
import { SparseLu } from '../../../../server/engine/network/sparse/lu.js';
import { seeded } from '../../convection/seeded.js';

/** Pairs of neighbours of an m × m grid. */
function gridPairs(m: number): number[] {
  const pairs: number[] = [];
  for (let y = 0; y < m; y++) {
    for (let x = 0; x < m; x++) {
      if (x + 1 < m) pairs.push(y * m + x, y * m + x + 1);
      if (y + 1 < m) pairs.push(y * m + x, (y + 1) * m + x);
    }
  }
  return pairs;
}

describe('The sparse factors', () => {
  it('solve what a dense elimination solves: random unsymmetric systems of symmetric structure', () => {
    const random = seeded(3);
    for (let trial = 0; trial < 60; trial++) {
      const n = 3 + Math.floor(random() * 25);
      const pairs: number[] = [];
      for (let e = 0; e < 2 * n; e++) {
        const i = Math.floor(random() * n);
        const j = Math.floor(random() * n);
        if (i !== j) pairs.push(i, j);
      }
      const lu = new SparseLu(n, Int32Array.from(pairs), trial % 3 === 0 ? [0, 2] : []);
      const dense = Array.from({ length: n }, () => new Array<number>(n).fill(0));
      for (let p = 0; p < pairs.length / 2; p++) {
        const i = pairs[2 * p] as number;
        const j = pairs[2 * p + 1] as number;
        for (const [row, column, slot] of [
          [i, j, lu.pairSlots[2 * p]],
          [j, i, lu.pairSlots[2 * p + 1]],
        ] as const) {
          const value = -random();
          lu.offDiagonal[slot as number] = value;
          (dense[row] as number[])[column] = value;
        }
      }
      for (let i = 0; i < n; i++) {
        const value = 0.1 + (dense[i] as number[]).reduce((sum, entry) => sum + Math.abs(entry), 0);
        lu.diagonal[i] = value;
        (dense[i] as number[])[i] = value;
      }
      const b = Float64Array.from({ length: n }, () => random() - 0.5);
      const x = Float64Array.from(b);
      lu.factor();
      lu.solve(x);
      const exact = lusolve(dense, Array.from(b)) as unknown as Matrix | number[][] as number[][];
      exact.forEach(([value], i) => {
        expect(x[i]).toBeCloseTo(value as number, 9);
      });
    }
  });

  it('of a grid stay sparse: their fill grows little faster than the grid', () => {
    const fill = (m: number) => new SparseLu(m * m, Int32Array.from(gridPairs(m))).fill / (m * m);
    // An order row by row fills 2 m per node: 80 at m = 40.
    expect(fill(40)).toBeLessThan(28);
    expect(fill(40) / fill(20)).toBeLessThan(1.6);
  });

  it('put what is to be last at the end, and what has very many neighbours just before', () => {
    const n = 400;
    const pairs = gridPairs(20);
    const start = new Int32Array(n + 2);
    const rows: number[][] = Array.from({ length: n + 1 }, () => []);
    for (let p = 0; p < pairs.length; p += 2) {
      rows[pairs[p] as number]?.push(pairs[p + 1] as number);
      rows[pairs[p + 1] as number]?.push(pairs[p] as number);
    }
    for (let i = 0; i < n; i++) {
      rows[i]?.push(n);
      rows[n]?.push(i);
    }
    rows.forEach((row, i) => (start[i + 1] = (start[i] as number) + row.length));
    const order = minimumDegree({ n: n + 1, start, adjacent: Int32Array.from(rows.flat()) }, [7]);
    expect(Array.from(order.slice(-2))).toEqual([n, 7]);
    expect(new Set(order).size).toBe(n + 1);
  });
});
