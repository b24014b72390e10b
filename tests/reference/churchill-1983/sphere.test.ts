/** S. W. Churchill, Heat Exchanger Design Handbook (1983), short form, as textbooks print it; from memory. */
import { describe, expect, it } from 'vitest';
import { nusseltSphereChurchill } from '../../../server/engine/convection/sphere.js';
import { agreesWith, nusselt } from '../correlation-check.js';

describe('Churchill, sphere', () => {
  it('agrees with its formula', () => {
    agreesWith(
      nusseltSphereChurchill,
      '2 + 0.589 * ra^(1/4) / (1 + (0.469 / pr)^(9/16))^(4/9)',
      [1, 1e3, 1e5, 1e8, 1e11],
    );
  });

  it('conducts into still air as a sphere does: Nu = 2 without any buoyancy', () => {
    expect(nusselt(nusseltSphereChurchill, 0, 0.71).nu).toBe(2);
  });
});
