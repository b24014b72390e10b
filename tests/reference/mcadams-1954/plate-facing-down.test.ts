/** W. H. McAdams, Heat Transmission, 3rd ed. (1954), and the fifth-power law of recent textbooks; from memory. */
import { describe, expect, it } from 'vitest';
import {
  nusseltPlateFacingDownFifthPower,
  nusseltPlateFacingDownMcAdams,
} from '../../../server/engine/convection/plate-facing-down.js';
import { coldCorrelation, correlations } from '../../../server/engine/convection/registry.js';
import { agreesWith } from '../correlation-check.js';

describe('Plates facing down', () => {
  it('agree with 0.27 Ra^¼', () => {
    agreesWith(nusseltPlateFacingDownMcAdams, '0.27 * ra^(1/4)', [1e5, 1e6, 1e7, 1e8, 1e10]);
  });

  it('agree with 0.52 Ra^⅕', () => {
    agreesWith(nusseltPlateFacingDownFifthPower, '0.52 * ra^(1/5)', [1e4, 1e5, 1e6, 1e7, 1e9]);
  });

  it('change places with plates facing up where the surface is colder, and the chosen law with its mate', () => {
    const law = (shape: 'plate-facing-up' | 'plate-facing-down', id: string) => {
      const found = correlations[shape].find((entry) => entry.id === id);
      if (!found) throw new Error(`no ${id}`);
      return coldCorrelation(shape, found);
    };
    expect(law('plate-facing-up', 'lloyd-moran')).toMatchObject({ shape: 'plate-facing-down', id: 'mcadams' });
    expect(law('plate-facing-down', 'mcadams')).toMatchObject({ shape: 'plate-facing-up', id: 'lloyd-moran' });
    expect(law('plate-facing-down', 'raithby-hollands')).toMatchObject({
      shape: 'plate-facing-up',
      id: 'raithby-hollands',
    });
  });
});
