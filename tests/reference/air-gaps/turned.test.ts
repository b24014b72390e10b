/**
 * Which side of a closed gap is the warmer decides which law holds: a level gap heated from above only conducts (Fourier’s law), heated from below
 * it turns over (Hollands et al. 1976, formula from memory).
 */
import { describe, expect, it } from 'vitest';
import { blankFilmAir, filmAir } from '../../../server/engine/air.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { network } from '../../engine/network/documents.js';
import { exactly } from '../correlation-check.js';

const gap = { areaM2: 0.5, gapM: 0.03, heightM: 0.6 };

function flow(fromC: number, toC: number, tiltDeg: number): number {
  const { flowsW } = solveNetwork(
    network({
      nodes: [
        { id: 'a', fixedC: fromC },
        { id: 'b', fixedC: toC },
      ],
      links: [{ id: 'gap', kind: 'air-gap', from: 'a', to: 'b', ...gap, tiltDeg }],
    }),
  );
  return flowsW.gap ?? NaN;
}

const air = blankFilmAir();
filmAir(35 + 273.15, 101325, 9.80665, air);
const conducted = (air.conductivity * 0.5 * 30) / 0.03;

describe('A closed gap', () => {
  it('that is level and heated from above conducts, whichever of its ends is the upper', () => {
    expect(flow(50, 20, 180) / conducted).toBeCloseTo(1, 9);
    expect(flow(20, 50, 0) / -conducted).toBeCloseTo(1, 9);
  });

  it('that is level and heated from below turns over, whichever of its ends is the lower', () => {
    const ra = air.rayleighFactor * 30 * 0.03 ** 3;
    const nu = exactly('1 + 1.44 * (1 - 1708 / ra) + (ra / 5830)^(1/3) - 1', ra, 0.7);
    expect(ra).toBeGreaterThan(4 * 5830);
    expect(flow(50, 20, 0) / (nu * conducted)).toBeCloseTo(1, 9);
    expect(flow(20, 50, 180) / (-nu * conducted)).toBeCloseTo(1, 9);
  });

  it.each([20, 60, 75, 90, 110, 150])('at %d° carries as much as the same gap named the other way round', (tiltDeg) => {
    expect(flow(20, 50, tiltDeg) / -flow(50, 20, 180 - tiltDeg)).toBeCloseTo(1, 12);
  });
});
