/** Raithby & Hollands, Handbook of Heat Transfer, 3rd ed. (1998), ch. 4: a vertical cylinder as a curved plate; from memory. */
import { describe, expect, it } from 'vitest';
import type { Nusselt } from '../../../server/engine/convection/correlation.js';
import { nusseltVerticalCylinderRaithbyHollands } from '../../../server/engine/convection/vertical-cylinder.js';
import { nusseltVerticalPlateRaithbyHollands } from '../../../server/engine/convection/vertical-plate.js';
import { agreesWith, exactly, nusselt } from '../correlation-check.js';

const thin = '(0.671 / (1 + (0.492 / pr)^(9/16))^(4/9) * ra^(1/4))';
const laminar = `(2 / log(1 + 2 / ${thin}))`;
const turbulent = '(0.13 * pr^0.22 / (1 + 0.61 * pr^0.81)^0.42 * ra^(1/3) / (1 + 1.4e9 * pr / ra))';
const plate = `(${laminar}^6 + ${turbulent}^6)^(1/6)`;

/** The whole formula, with Nu_T in ζ as published, or rounded off as ours is. */
function formula(ratio: number, inZeta: string): string {
  const zeta = `(1.8 * ${String(ratio)} / ${inZeta})`;
  return `${plate} * ${zeta} / log(1 + ${zeta})`;
}

const law = (ratio: number) => (ra: number, pr: number, out: Nusselt) => {
  nusseltVerticalCylinderRaithbyHollands(ra, pr, out, ratio);
};

const points = [1, 1e2, 1e4, 1e6, 1e9, 1e11];

describe('A vertical cylinder', () => {
  it.each([0.5, 2, 10, 100])(
    'of L/D = %d is its plate times ζ/ln(1 + ζ), with Nu_T in ζ rounded off by 0.05',
    (ratio) => {
      agreesWith(law(ratio), formula(ratio, `sqrt(${thin}^2 + 0.05^2)`), points, [0.69, 0.72]);
    },
  );

  it.each([0.5, 2, 10, 100])('of L/D = %d keeps to the published formula within 0.5 % from Nu_T = 0.5', (ratio) => {
    for (const ra of [1, 10, ...points.slice(1)]) {
      const share = nusselt(law(ratio), ra, 0.71).nu / exactly(formula(ratio, thin), ra, 0.71) - 1;
      // The rounding changes ζ by 0.05²/(2 Nu_T²), and Nu by less.
      expect(Math.abs(share)).toBeLessThan(0.00126 / Math.sqrt(ra) / 0.26);
    }
  });

  it('of great diameter is its plate', () => {
    expect(nusselt(law(1e-4), 1e7, 0.71).nu / nusselt(nusseltVerticalPlateRaithbyHollands, 1e7, 0.71).nu).toBeCloseTo(
      1,
      5,
    );
  });
});
