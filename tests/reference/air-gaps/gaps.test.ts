/**
 * Closed gaps of air: S. M. ElSherbiny, G. D. Raithby, K. G. T. Hollands, J. Heat Transfer 104 (1982) 96; K. G. T. Hollands et al.,
 * J. Heat Transfer 98 (1976) 189. Formulas from memory.
 */
import { describe, expect, it } from 'vitest';
import { nusseltGap, nusseltGapElSherbiny, nusseltGapHollands } from '../../../server/engine/convection/air-gap.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { network } from '../../engine/network/documents.js';
import { agreesWith, exactly } from '../correlation-check.js';

const out = { nu: 0, byLogRa: 0, byPr: 0 };

const upright = {
  first: '0.0605 * ra^(1/3)',
  second: '(1 + (0.104 * ra^0.293 / (1 + (6310 / ra)^1.36))^3)^(1/3)',
  third: (ratio: number) => `0.242 * (ra / ${String(ratio)})^0.272`,
};

function elsherbiny(ra: number, ratio: number): number {
  return exactly(`max(${upright.first}, ${upright.second}, ${upright.third(ratio)})`, ra, 0.7);
}

function hollands(ra: number, degrees: number): number {
  const c = `cos(${String(degrees)} * pi / 180)`;
  const s = `sin(1.8 * ${String(degrees)} * pi / 180)^1.6`;
  return exactly(
    `1 + 1.44 * max(0, 1 - 1708 / (ra * ${c})) * (1 - 1708 * ${s} / (ra * ${c})) + max(0, (ra * ${c} / 5830)^(1/3) - 1)`,
    ra,
    0.7,
  );
}

describe('An upright gap', () => {
  it.each([5, 20, 60, 110])('of height/gap %d follows ElSherbiny within 0.6 %, where two laws meet too', (ratio) => {
    for (const ra of [1e2, 1e3, 5e3, 2e4, 1e5, 1e6, 1e7]) {
      nusseltGapElSherbiny(ra, ratio, out);
      // Our blend of the greatest: (1 + 1)^(1/128) at worst.
      expect(Math.abs(out.nu / elsherbiny(ra, ratio) - 1)).toBeLessThan(0.006);
    }
  });

  it.each([5, 20, 60, 110])('of height/gap %d is the blend of the three laws, and its slope', (ratio) => {
    const blend = `((${upright.first})^128 + (${upright.second})^128 + (${upright.third(ratio)})^128)^(1/128)`;
    agreesWith(
      (ra, _pr, at) => {
        nusseltGapElSherbiny(ra, ratio, at);
      },
      blend,
      [1e2, 1e3, 5e3, 8e3, 2e4, 1e5, 1e6, 2e7],
      [0.7],
    );
  });

  it('lets each of the three laws rule where it is the greatest, to 1e-8', () => {
    for (const [ra, ratio, formula] of [
      [2e7, 110, upright.first],
      [1e3, 110, upright.second],
      [2e4, 5, upright.third(5)],
    ] as const) {
      nusseltGapElSherbiny(ra, ratio, out);
      expect(Math.abs(out.nu / exactly(formula, ra, 0.7) - 1)).toBeLessThan(1e-8);
    }
  });

  it('of a double-glazed window carries k Nu A ΔT/gap, by the formula and a handbook’s air at 7 °C', () => {
    const { flowsW } = solveNetwork(
      network({
        nodes: [
          { id: 'inner', fixedC: 12 },
          { id: 'outer', fixedC: 2 },
        ],
        links: [
          {
            id: 'gap',
            kind: 'air-gap',
            from: 'inner',
            to: 'outer',
            areaM2: 1.6,
            gapM: 0.02,
            heightM: 0.8,
            tiltDeg: 90,
          },
        ],
      }),
    );
    // Çengel, Heat Transfer, table of air (from memory): ν = 1.4·10⁻⁵ m²/s, Pr = 0.7344, k = 0.02416 W/(m K), which is 2 % under other tables.
    const ra = ((9.81 / 280) * 10 * 0.02 ** 3 * 0.7344) / 1.4e-5 ** 2;
    expect(Math.abs((flowsW.gap ?? NaN) / (((elsherbiny(ra, 40) * 0.02416) / 0.02) * 1.6 * 10) - 1)).toBeLessThan(0.03);
  });
});

describe('A gap heated from below', () => {
  it.each([0, 20, 45, 60])('at %d° follows Hollands away from the corners of its brackets', (degrees) => {
    for (const ra of [500, 5000, 1.2e4, 5e4, 1e5]) {
      nusseltGapHollands(ra, (degrees * Math.PI) / 180, out);
      const exact = hollands(ra, degrees);
      const x = ra * Math.cos((degrees * Math.PI) / 180);
      const nearCorner = Math.abs(1 - 1708 / x) < 0.12 || Math.abs(Math.cbrt(x / 5830) - 1) < 0.12;
      expect(Math.abs(out.nu / exact - 1)).toBeLessThan(nearCorner ? 0.05 : 1e-9);
    }
  });

  it('conducts only, below the critical Rayleigh number 1708', () => {
    nusseltGapHollands(1500, 0, out);
    expect(out.nu).toBe(1);
  });
});

describe('A leaning gap', () => {
  it('lies on a straight line between 60° and 90°, and falls to conduction at 180°', () => {
    const at = (tilt: number) => {
      nusseltGap(5e4, tilt, 20, out);
      return out.nu;
    };
    expect(at(75)).toBeCloseTo((at(60) + at(90)) / 2, 9);
    expect(at(120)).toBeCloseTo(1 + (at(90) - 1) * Math.sin((Math.PI / 3) * 2), 9);
    expect(at(180)).toBeCloseTo(1, 9);
  });
});
