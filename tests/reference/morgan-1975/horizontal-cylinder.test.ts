/** V. T. Morgan, Advances in Heat Transfer 11 (1975) 199–264, coefficients as textbooks print them; from memory. */
import { describe, expect, it } from 'vitest';
import { nusseltHorizontalCylinderMorgan } from '../../../server/engine/convection/horizontal-cylinder.js';
import { agreesWith, nusselt } from '../correlation-check.js';

const pieces = [
  { formula: '0.675 * ra^0.058', ras: [1e-9, 1e-7, 1e-5, 1e-3] },
  { formula: '1.02 * ra^0.148', ras: [0.1, 1, 10] },
  { formula: '0.85 * ra^0.188', ras: [5e2, 1e3, 2e3] },
  { formula: '0.48 * ra^0.25', ras: [1e5, 1e6] },
  { formula: '0.125 * ra^(1/3)', ras: [1e8, 1e10, 1e12] },
];

describe('Morgan', () => {
  it.each(pieces)('is $formula between its joints', ({ formula, ras }) => {
    agreesWith(nusseltHorizontalCylinderMorgan, formula, ras, [0.7]);
  });

  it('passes its joints without a jump, within 1 % of both pieces', () => {
    for (const joint of [1e-2, 1e2, 1e4, 1e7]) {
      const at = (ra: number) => nusselt(nusseltHorizontalCylinderMorgan, ra, 0.7).nu;
      for (const factor of [1 / 3, 1 / 2, 1, 2, 3]) {
        const here = at(joint * factor);
        expect(Math.abs(at(joint * factor * 1.0001) / here - 1)).toBeLessThan(1e-4);
      }
    }
  });
});
