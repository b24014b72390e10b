/**
 * The engine’s locally refined grids against a fine finite-volume model of the same plates in another language (SciPy, Debian’s
 * python3-scipy): three-dimensional conduction under even fluxes. Tolerances are those that the design sets: 5 % of the rise for hot spots,
 * 3 % for means of faces; the mean under a source, which carries the heat on, within 5 %.
 */
import { beforeAll, describe, expect, it } from 'vitest';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { gridOf } from './grids.js';
import { solvePlates, type PlateAnswer, type PlateCase } from './python.js';

type Source = PlateCase['sources'][number];

/** A rectangle by its corner. */
function at(x0: number, y0: number, lx: number, ly: number, heat: number): Source {
  return { x0, y0, lx, ly, heat };
}

const lid = { lx: 0.12, ly: 0.08, t: 0.003, kxy: 0.22, kz: 0.22, hNear: 0, hFar: 12 };
const wall = { lx: 0.12, ly: 0.08, t: 0.0024, kxy: 0.21, kz: 0.17, hNear: 0, hFar: 10 };
const spreader = { lx: 0.1, ly: 0.06, t: 0.003, kxy: 160, kz: 160, hNear: 0, hFar: 25 };
const board = { lx: 0.08, ly: 0.05, t: 0.0016, kxy: 20, kz: 0.35, hNear: 0, hFar: 20 };

const cases: Record<string, PlateCase> = {
  'a printed lid, source in the middle': { ...lid, sources: [at(0.05, 0.03, 0.02, 0.02, 1)] },
  'a printed lid, source in the corner': { ...lid, sources: [at(0, 0, 0.02, 0.015, 0.5)] },
  'a printed lid, source off the middle': { ...lid, sources: [at(0.013, 0.0207, 0.02, 0.015, 0.5)] },
  'a printed wall under a plate': { ...wall, sources: [at(0.03, 0.015, 0.06, 0.04, 3)] },
  'a printed lid, a chip': { ...lid, sources: [at(0.05, 0.03, 0.005, 0.005, 0.1)] },
  'a thick polymer block': { ...lid, ly: 0.1, lx: 0.1, t: 0.01, sources: [at(0.04, 0.04, 0.02, 0.02, 1)] },
  'an aluminium spreader, off the middle': { ...spreader, sources: [at(0.01, 0.03, 0.012, 0.02, 8)] },
  'an aluminium spreader, a chip': { ...spreader, sources: [at(0.05, 0.03, 0.003, 0.003, 3)] },
  'an aluminium spreader, source in the corner': { ...spreader, hFar: 12, sources: [at(0, 0, 0.01, 0.01, 3)] },
  'a steel block': {
    ...board,
    lx: 0.04,
    ly: 0.04,
    t: 0.02,
    kxy: 15,
    kz: 15,
    hFar: 200,
    sources: [at(0.018, 0.018, 0.004, 0.004, 3)],
  },
  'a board': { ...board, sources: [at(0.02, 0.01, 0.01, 0.01, 1)] },
  'a board, two sources': { ...board, sources: [at(0.02, 0.01, 0.01, 0.01, 1), at(0.06, 0.03, 0.006, 0.003, 0.5)] },
};

const names = Object.keys(cases);
const plateOf = (name: string) => cases[name] as PlateCase;
let fine: Map<string, PlateAnswer>;

beforeAll(async () => {
  const answers = await solvePlates(names.map(plateOf));
  fine = new Map(names.map((name, i) => [name, answers[i] as PlateAnswer]));
}, 120_000);

/** Share by which a value misses what it should be. */
function miss(value: number | undefined, expected: number): number {
  return Math.abs((value ?? NaN) / expected - 1);
}

describe('The grid of a plate', () => {
  it.each(names)('%s: hot spots, means under sources and means of faces', (name) => {
    const exact = fine.get(name) as PlateAnswer;
    const { temperaturesC } = solveNetwork(gridOf(plateOf(name)));
    exact.sources.forEach(({ peak, mean }, i) => {
      expect(miss(temperaturesC[`peak.${String(i)}`], peak)).toBeLessThan(0.05);
      expect(miss(temperaturesC[`source.${String(i)}`], mean)).toBeLessThan(0.05);
    });
    expect(miss(temperaturesC['far.peak'], exact.farPeak)).toBeLessThan(0.05);
    expect(miss(temperaturesC['far.mean'], exact.farMean)).toBeLessThan(0.03);
    expect(miss(temperaturesC['near.mean'], exact.nearMean)).toBeLessThan(0.03);
  });

  it('comes nearer with half the cells’ size', () => {
    const name = 'a printed lid, source off the middle';
    const { peak } = (fine.get(name) as PlateAnswer).sources[0] as { peak: number };
    const coarse = miss(solveNetwork(gridOf(plateOf(name))).temperaturesC['peak.0'], peak);
    const halved = miss(solveNetwork(gridOf(plateOf(name), 2)).temperaturesC['peak.0'], peak);
    expect(halved).toBeLessThan(Math.max(coarse, 0.015));
  });
});

describe('Moving a source by a fraction of a cell', () => {
  const rises = (x0: number) => {
    const { temperaturesC } = solveNetwork(gridOf({ ...lid, sources: [at(x0, 0.02, 0.02, 0.015, 0.5)] }));
    return [temperaturesC['peak.0'] ?? NaN, temperaturesC['source.0'] ?? NaN, temperaturesC['far.peak'] ?? NaN];
  };

  it('moves no checked value by more than 3 %', () => {
    // Steps of 0.3 mm where the smallest cells are 2.4 mm.
    for (let x = 0.02; x < 0.06; x += 0.0003) {
      const here = rises(x);
      rises(x + 0.0003).forEach((value, i) => {
        expect(miss(value, here[i] ?? NaN)).toBeLessThan(0.03);
      });
    }
  });
});

describe('Two sources on one plate', () => {
  const a = at(0.01, 0.01, 0.012, 0.02, 1);
  const b = at(0.06, 0.03, 0.02, 0.01, 1);
  const at2 = (heatA: number, heatB: number) =>
    solveNetwork(
      gridOf({
        ...spreader,
        sources: [
          { ...a, heat: heatA },
          { ...b, heat: heatB },
        ],
      }),
    ).temperaturesC;

  it('add up: the rise of both is the sum of the rises of each', () => {
    const both = at2(3, 5);
    const first = at2(3, 0);
    const second = at2(0, 5);
    for (const id of ['peak.0', 'peak.1', 'source.0', 'source.1', 'far.peak', 'near.mean']) {
      // Peaks are added only where both are highest in one cell, which a lone source’s neighbour need not be.
      if (id.startsWith('peak') || id === 'far.peak')
        expect(both[id]).toBeLessThanOrEqual((first[id] ?? NaN) + (second[id] ?? NaN) + 1e-9);
      else expect(both[id]).toBeCloseTo((first[id] ?? NaN) + (second[id] ?? NaN), 9);
    }
  });

  it('heat each other alike: a watt at one warms the other as a watt at the other warms the one', () => {
    expect(at2(1, 0)['source.1']).toBeCloseTo(at2(0, 1)['source.0'] ?? NaN, 9);
  });
});
