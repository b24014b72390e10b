/** Raithby & Hollands, Handbook of Heat Transfer, 3rd ed. (1998), ch. 4: a vertical cylinder as a curved plate; from memory. */
import { describe, expect, it } from 'vitest';
import { nusseltVerticalCylinderRaithbyHollands } from '../../../server/engine/convection/vertical-cylinder.js';
import { nusseltVerticalPlateRaithbyHollands } from '../../../server/engine/convection/vertical-plate.js';
import { exactly, nusselt } from '../correlation-check.js';

const thin = '0.671 / (1 + (0.492 / pr)^(9/16))^(4/9) * ra^(1/4)';

describe('A vertical cylinder', () => {
  it.each([
    [1e4, 2],
    [1e5, 5],
    [1e6, 10],
    [1e7, 20],
    [1e9, 3],
    [1e11, 1],
  ])('at Ra = %d and L/D = %d is its plate times ζ/ln(1 + ζ)', (ra, ratio) => {
    const plate = nusselt(nusseltVerticalPlateRaithbyHollands, ra, 0.71).nu;
    const factor = exactly(
      `(1.8 * ${String(ratio)} / (${thin})) / log(1 + 1.8 * ${String(ratio)} / (${thin}))`,
      ra,
      0.71,
    );
    const law = (r: number, pr: number, out: Parameters<typeof nusseltVerticalCylinderRaithbyHollands>[2]) => {
      nusseltVerticalCylinderRaithbyHollands(r, pr, out, ratio);
    };
    expect(nusselt(law, ra, 0.71).nu / (plate * factor)).toBeCloseTo(1, 4);
  });

  it('of great diameter is its plate', () => {
    const out = { nu: 0, byLogRa: 0, byPr: 0 };
    nusseltVerticalCylinderRaithbyHollands(1e7, 0.71, out, 1e-4);
    expect(out.nu / nusselt(nusseltVerticalPlateRaithbyHollands, 1e7, 0.71).nu).toBeCloseTo(1, 5);
  });
});
