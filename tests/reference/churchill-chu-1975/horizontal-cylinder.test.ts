/** S. W. Churchill, H. H. S. Chu, Int. J. Heat Mass Transfer 18 (1975) 1049–1053; formula from memory. */
import { describe, it } from 'vitest';
import { nusseltHorizontalCylinderChurchillChu } from '../../../server/engine/convection/horizontal-cylinder.js';
import { agreesWith } from '../correlation-check.js';

describe('Churchill and Chu, horizontal cylinder', () => {
  it('agree with their formula for all Ra', () => {
    const formula = '(0.6 + 0.387 * ra^(1/6) / (1 + (0.559 / pr)^(9/16))^(8/27))^2';
    agreesWith(nusseltHorizontalCylinderChurchillChu, formula, [1e-5, 1e-1, 1e2, 1e5, 1e8, 1e12]);
  });
});
