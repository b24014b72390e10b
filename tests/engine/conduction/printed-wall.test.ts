import { describe, expect, it } from 'vitest';
import {
  cellAirConductivity,
  coreConductivity,
  coreThickness,
  hashinShtrikmanLower,
  hashinShtrikmanUpper,
  printedWallConductivity,
  type PrintedWall,
} from '../../../server/engine/conduction/printed-wall.js';

const wall: PrintedWall = {
  thickness: 0.0024,
  perimeters: 3,
  lineWidth: 0.00045,
  layerHeight: 0.0002,
  closedLayers: 4,
  infillShare: 0.2,
  pattern: 'cells',
  parallelToBed: false,
  alongLayers: 0.21,
  throughLayers: 0.17,
};

describe('A printed wall', () => {
  it('is solid at 2.4 mm with three 0.45 mm perimeters', () => {
    expect(coreThickness(wall)).toBe(0);
    expect(printedWallConductivity(wall, 'mid').through).toBeCloseTo(0.21, 12);
    expect(printedWallConductivity(wall, 'low')).toEqual(printedWallConductivity(wall, 'high'));
  });

  it('has no core where the perimeters just meet, in spite of rounding', () => {
    expect(coreThickness({ ...wall, lineWidth: 0.0004 })).toBe(0);
  });

  it('is closed by layers, not by perimeters, where it lay parallel to the bed', () => {
    expect(coreThickness({ ...wall, parallelToBed: true })).toBeCloseTo(0.0008, 12);
  });

  it('conducts through a core as the skins and the core in series', () => {
    const cored = { ...wall, thickness: 0.004 };
    const core = 0.004 - 6 * 0.00045;
    const k = coreConductivity(cored, 'mid');
    const byHand = 0.004 / ((0.004 - core) / 0.21 + core / k);
    expect(printedWallConductivity(cored, 'mid').through).toBeCloseTo(byHand, 12);
  });

  it('keeps its band in order: low ≤ mid ≤ high, all between air and polymer', () => {
    const cored = { ...wall, thickness: 0.004 };
    for (const pattern of ['cells', 'ribs'] as const) {
      const [low, mid, high] = (['low', 'mid', 'high'] as const).map((band) =>
        coreConductivity({ ...cored, pattern }, band),
      );
      expect(low).toBeGreaterThan(cellAirConductivity);
      expect(mid).toBeGreaterThan(low ?? Infinity);
      expect(high).toBeGreaterThan(mid ?? Infinity);
      expect(high).toBeLessThan(0.21);
    }
  });

  it('conducts better with ribs that run from side to side, up to the parallel bound', () => {
    const ribs = coreConductivity({ ...wall, pattern: 'ribs' }, 'high');
    expect(ribs).toBeCloseTo(0.8 * cellAirConductivity + 0.2 * 0.21, 12);
    expect(ribs).toBeGreaterThan(coreConductivity(wall, 'high'));
  });
});

describe('The Hashin–Shtrikman bounds', () => {
  it('meet the pure materials at both ends', () => {
    expect(hashinShtrikmanLower(0.21, 0.027, 0)).toBeCloseTo(0.027, 12);
    expect(hashinShtrikmanUpper(0.21, 0.027, 0)).toBeCloseTo(0.027, 12);
    expect(hashinShtrikmanLower(0.21, 0.027, 1)).toBeCloseTo(0.21, 12);
    expect(hashinShtrikmanUpper(0.21, 0.027, 1)).toBeCloseTo(0.21, 12);
    expect(hashinShtrikmanLower(0.2, 0.2, 0.5)).toBe(0.2);
  });

  it('lie inside the series and the parallel bound', () => {
    for (const f of [0.1, 0.2, 0.5, 0.9]) {
      const series = 1 / (f / 0.21 + (1 - f) / 0.027);
      const parallel = f * 0.21 + (1 - f) * 0.027;
      expect(hashinShtrikmanLower(0.21, 0.027, f)).toBeGreaterThan(series);
      expect(hashinShtrikmanUpper(0.21, 0.027, f)).toBeLessThan(parallel);
    }
  });

  it('equal Maxwell’s mixture formula: the lower bound is spheres of the better conductor in the poorer', () => {
    // J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), art. 314: k/k₂ = (k₁ + 2k₂ + 2f(k₁ − k₂))/(k₁ + 2k₂ − f(k₁ − k₂)).
    const maxwell = (k1: number, k2: number, f: number) =>
      (k2 * (k1 + 2 * k2 + 2 * f * (k1 - k2))) / (k1 + 2 * k2 - f * (k1 - k2));
    for (const f of [0.05, 0.2, 0.6]) {
      expect(hashinShtrikmanLower(0.21, 0.027, f)).toBeCloseTo(maxwell(0.21, 0.027, f), 12);
      expect(hashinShtrikmanUpper(0.21, 0.027, f)).toBeCloseTo(maxwell(0.027, 0.21, 1 - f), 12);
    }
  });
});
