/** J. R. Lloyd, W. R. Moran, J. Heat Transfer 96 (1974) 443–447, as given in textbooks; from memory. */
import { describe, expect, it } from 'vitest';
import { nusseltPlateFacingUpLloydMoran } from '../../../server/engine/convection/plate-facing-up.js';
import { agreesWith, nusselt } from '../correlation-check.js';

describe('Lloyd and Moran', () => {
  it('agree with 0.54 Ra^¼ below the joint and 0.15 Ra^⅓ above it, outside a factor of three', () => {
    agreesWith(nusseltPlateFacingUpLloydMoran, '0.54 * ra^(1/4)', [1e3, 1e4, 1e5, 1e6, 3e6]);
    agreesWith(nusseltPlateFacingUpLloydMoran, '0.15 * ra^(1/3)', [3.1e7, 1e8, 1e9, 1e10, 1e11]);
  });

  it('blend within 5 % of the published piece inside a factor of three of the joint, rising all the way', () => {
    let last = 0;
    for (let ra = 1e7 / 3; ra <= 3e7; ra *= 1.02) {
      const { nu } = nusselt(nusseltPlateFacingUpLloydMoran, ra, 0.71);
      const published = ra <= 1e7 ? 0.54 * ra ** 0.25 : 0.15 * Math.cbrt(ra);
      expect(Math.abs(nu / published - 1)).toBeLessThan(0.05);
      expect(nu).toBeGreaterThan(last);
      last = nu;
    }
  });

  it('have a slope without a jump across the blend', () => {
    for (const ra of [1e7 / 3, 1e7, 3e7]) {
      const below = nusselt(nusseltPlateFacingUpLloydMoran, ra * (1 - 1e-9), 0.71).byLogRa;
      const above = nusselt(nusseltPlateFacingUpLloydMoran, ra * (1 + 1e-9), 0.71).byLogRa;
      expect(above / below).toBeCloseTo(1, 6);
    }
  });
});
