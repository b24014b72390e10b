/**
 * Forced flow: the laminar plate (Pohlhausen) and the mixed law of textbooks; S. W. Churchill, M. Bernstein, J. Heat Transfer 99 (1977) 300;
 * S. Whitaker, AIChE J. 18 (1972) 361. Formulas from memory.
 */
import { describe, expect, it } from 'vitest';
import {
  nusseltCylinderChurchillBernstein,
  nusseltFlatPlateForced,
  nusseltSphereWhitaker,
} from '../../../server/engine/convection/forced.js';
import { agreesWith } from '../correlation-check.js';

type Forced = typeof nusseltFlatPlateForced;

/** A forced law in the clothes of a natural one, for the same check. */
function dressed(law: Forced): Parameters<typeof agreesWith>[0] {
  return (re, pr, out) => {
    const forced = { nu: 0, byLogRe: 0, byPr: 0 };
    law(re, pr, forced);
    out.nu = forced.nu;
    out.byLogRa = forced.byLogRe;
    out.byPr = forced.byPr;
  };
}

describe('Forced flow', () => {
  it('along a plate is laminar below the transition', () => {
    agreesWith(dressed(nusseltFlatPlateForced), '0.664 * ra^(1/2) * pr^(1/3)', [1e3, 1e4, 1e5, 3e5], [0.7, 7]);
  });

  it('along a plate is mixed above it', () => {
    agreesWith(dressed(nusseltFlatPlateForced), '(0.037 * ra^(4/5) - 871) * pr^(1/3)', [7e5, 1e6, 1e7, 1e8], [0.7, 7]);
  });

  it('across the transition stays within 5 % of the published piece', () => {
    const out = { nu: 0, byLogRe: 0, byPr: 0 };
    for (let re = 3.5e5; re < 7e5; re *= 1.01) {
      nusseltFlatPlateForced(re, 0.7, out);
      const piece = (re <= 5e5 ? 0.664 * Math.sqrt(re) : 0.037 * re ** 0.8 - 871) * Math.cbrt(0.7);
      expect(Math.abs(out.nu / piece - 1)).toBeLessThan(0.05);
    }
  });

  it('across a cylinder follows Churchill and Bernstein', () => {
    const formula = '0.3 + 0.62 * ra^(1/2) * pr^(1/3) / (1 + (0.4 / pr)^(2/3))^(1/4) * (1 + (ra / 282000)^(5/8))^(4/5)';
    agreesWith(dressed(nusseltCylinderChurchillBernstein), formula, [1, 1e2, 1e4, 1e5, 1e6, 1e7], [0.7, 7]);
  });

  it('past a sphere follows Whitaker', () => {
    const formula = '(0.4 * ra^(1/2) + 0.06 * ra^(2/3)) * pr^0.4';
    agreesWith(dressed(nusseltSphereWhitaker), formula, [4, 1e2, 1e3, 1e4, 7e4], [0.71, 7]);
  });
});
