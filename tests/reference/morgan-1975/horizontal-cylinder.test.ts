/** V. T. Morgan, Advances in Heat Transfer 11 (1975) 199–264, coefficients as textbooks print them; from memory. */
import { describe, expect, it } from 'vitest';
import { nusseltHorizontalCylinderMorgan } from '../../../server/engine/convection/horizontal-cylinder.js';
import { agreesWith, exactly, nusselt } from '../correlation-check.js';

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

  it('passes its joints without a jump, within 5 % of the published piece, and is it exactly beyond a factor 3', () => {
    for (const [i, joint] of [1e-2, 1e2, 1e4, 1e7].entries()) {
      const [below, above] = [pieces[i], pieces[i + 1]];
      if (!below || !above) throw new Error('no pieces at this joint');
      const at = (ra: number) => nusselt(nusseltHorizontalCylinderMorgan, ra, 0.7).nu;
      for (let x = -1.5; x <= 1.5; x += 0.05) {
        const ra = joint * Math.exp(x);
        const published = exactly((x <= 0 ? below : above).formula, ra, 0.7);
        expect(Math.abs(at(ra) / published - 1)).toBeLessThan(Math.abs(x) < Math.log(3) ? 0.05 : 1e-9);
        // A step of 10⁻⁴ in Ra may move Nu by a third of it and by what the blend adds.
        expect(Math.abs(at(ra * 1.0001) / at(ra) - 1)).toBeLessThan(1e-4);
      }
    }
  });
});
