/**
 * G. D. Raithby, K. G. T. Hollands, “Natural convection”, Handbook of Heat Transfer, 3rd ed. (1998), ch. 4: vertical plate, plate facing
 * up, plate facing down. Formulas from memory; here computed a second time, as text, with fifty digits.
 */
import { describe, expect, it } from 'vitest';
import { nusseltPlateFacingDownRaithbyHollands } from '../../../server/engine/convection/plate-facing-down.js';
import { nusseltPlateFacingUpRaithbyHollands } from '../../../server/engine/convection/plate-facing-up.js';
import {
  nusseltVerticalPlateChurchillChu,
  nusseltVerticalPlateRaithbyHollands,
} from '../../../server/engine/convection/vertical-plate.js';
import { agreesWith, nusselt } from '../correlation-check.js';

const cl = '(0.671 / (1 + (0.492 / pr)^(9/16))^(4/9))';

describe('Raithby and Hollands', () => {
  it('vertical plate agrees with its formula from Ra 1 to 10¹²', () => {
    const laminar = `(2 / log(1 + 2 / (${cl} * ra^(1/4))))`;
    const turbulent = '(0.13 * pr^0.22 / (1 + 0.61 * pr^0.81)^0.42 * ra^(1/3) / (1 + 1.4e9 * pr / ra))';
    const formula = `(${laminar}^6 + ${turbulent}^6)^(1/6)`;
    agreesWith(nusseltVerticalPlateRaithbyHollands, formula, [1, 1e3, 1e5, 1e7, 1e9, 1e10, 1e12]);
  });

  it('plate facing up agrees with its formula from Ra 1 to 10¹¹', () => {
    const formula = `((1.4 / log(1 + 1.4 / (0.835 * ${cl} * ra^(1/4))))^10 + (0.14 * ra^(1/3))^10)^(1/10)`;
    agreesWith(nusseltPlateFacingUpRaithbyHollands, formula, [1, 1e2, 1e4, 1e6, 1e8, 1e11]);
  });

  it('plate facing down agrees with its formula from Ra 10 to 10¹⁰', () => {
    const thin = '(0.527 * ra^(1/5) / (1 + (1.9 / pr)^0.9)^(2/9))';
    agreesWith(nusseltPlateFacingDownRaithbyHollands, `2.45 / log(1 + 2.45 / ${thin})`, [10, 1e3, 1e5, 1e7, 1e10]);
  });

  it('stays within a quarter of Churchill and Chu’s vertical plate from 10⁴ to 10¹⁰, as two published methods do', () => {
    for (const ra of [1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10]) {
      const ratio =
        nusselt(nusseltVerticalPlateRaithbyHollands, ra, 0.71).nu /
        nusselt(nusseltVerticalPlateChurchillChu, ra, 0.71).nu;
      expect(Math.abs(ratio - 1)).toBeLessThan(0.25);
    }
  });

  it('goes to zero with the temperature difference, without a division by zero', () => {
    for (const law of [
      nusseltVerticalPlateRaithbyHollands,
      nusseltPlateFacingUpRaithbyHollands,
      nusseltPlateFacingDownRaithbyHollands,
    ]) {
      expect(nusselt(law, 0, 0.71)).toEqual({ nu: 0, byLogRa: 0, byPr: 0 });
    }
  });
});
