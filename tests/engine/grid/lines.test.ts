import { describe, expect, it } from 'vitest';
import { gridLines } from '../../../server/engine/grid/lines.js';
import { choosePlanes } from '../../../server/engine/grid/layers.js';

const free: [number, number] = [Infinity, Infinity];

describe('The lines of a grid', () => {
  const source = { from: 0.05, to: 0.07, cell: 0.002, source: true };
  const lines = Array.from(gridLines(0.12, [source], free));

  it('rise from one end to the other, through both ends of a source', () => {
    expect(lines[0]).toBe(0);
    expect(lines.at(-1)).toBe(0.12);
    expect(lines).toEqual([...lines].sort((a, b) => a - b));
    for (const end of [0.05, 0.07]) expect(Math.min(...lines.map((x) => Math.abs(x - end)))).toBeLessThan(1e-12);
  });

  it('have an odd number of cells, five at least, under a source: its middle is a cell’s middle', () => {
    const inside = lines.filter((x) => x > 0.0499 && x < 0.0701).length - 1;
    expect(inside).toBeGreaterThanOrEqual(5);
    expect(inside % 2).toBe(1);
  });

  it('grow by no more than a ratio of 1.7 from cell to cell', () => {
    const sizes = lines.slice(1).map((x, i) => x - (lines[i] as number));
    sizes.slice(1).forEach((size, i) => {
      const ratio = size / (sizes[i] as number);
      expect(Math.max(ratio, 1 / ratio)).toBeLessThan(1.75);
    });
  });

  it('stay small between a source and a near edge', () => {
    const near = Array.from(gridLines(0.12, [{ ...source, from: 0.012, to: 0.032 }], free)).filter((x) => x < 0.012);
    expect(near.length).toBeGreaterThan(2);
  });

  it('are taken from what lies there, where it has lines of its own', () => {
    const own = Float64Array.from([0.03, 0.035, 0.05, 0.07, 0.085, 0.09]);
    const shared = gridLines(0.12, [{ from: 0.03, to: 0.09, cell: 0.004, source: false, lines: own }], free);
    for (const x of shared) if (x > 0.0301 && x < 0.0899) expect(Array.from(own)).toContain(x);
  });

  it('are divided on request', () => {
    expect(gridLines(0.12, [source], free, 3)).toHaveLength(3 * (lines.length - 1) + 1);
  });
});

describe('The planes through a plate', () => {
  const metal = { thicknessM: 0.002, inPlaneWPerMK: 200, throughWPerMK: 200 };
  const polymer = { thicknessM: 0.0024, inPlaneWPerMK: 0.2, throughWPerMK: 0.2 };

  it('are one in thin metal, two in a thin wall that conducts poorly, more where it is thick against its source', () => {
    expect(choosePlanes([metal], 0.02).count).toBe(1);
    expect(choosePlanes([polymer], 0.02).count).toBe(2);
    expect(choosePlanes([polymer], 0.004).count).toBeGreaterThan(2);
  });

  it('carry copper where it lies: foils on both sides of a board add to its two surfaces', () => {
    const foil = { thicknessM: 35e-6, inPlaneWPerMK: 390, throughWPerMK: 390 };
    const board = choosePlanes([foil, { ...polymer, thicknessM: 0.0015 }, foil], 0.02);
    expect(board.count).toBe(2);
    expect(board.carried[0]).toContainEqual({ layer: 0, share: 1 });
    expect(board.carried[1]).toContainEqual({ layer: 2, share: 1 });
  });
});
