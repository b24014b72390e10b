import { describe, expect, it } from 'vitest';
import { boardConductivity } from '../../../server/engine/conduction/board.js';
import { stackSpecificResistance } from '../../../server/engine/conduction/contact.js';

describe('A board', () => {
  it('of 1.53 mm laminate between two 35 µm coppers conducts as the hand calculation', () => {
    const board = boardConductivity([
      { conductivity: 390, thickness: 35e-6, coverage: 0.4 },
      { conductivity: 0.3, thickness: 1.53e-3, coverage: 1 },
      { conductivity: 390, thickness: 35e-6, coverage: 0.9 },
    ]);
    // (390·35e-6·0.4 + 0.3·1.53e-3 + 390·35e-6·0.9) / 1.6e-3
    expect(board.inPlane).toBeCloseTo((390 * 35e-6 * 1.3 + 0.3 * 1.53e-3) / 1.6e-3, 10);
    expect(board.thickness).toBeCloseTo(1.6e-3, 12);
    // The laminate alone is 5.1e-3 K m²/W; the coppers add next to nothing.
    expect(board.thickness / board.through).toBeCloseTo(1.53e-3 / 0.3, 6);
  });
});

describe('An attachment', () => {
  it('adds its layers, each over its share of the contact', () => {
    const resistance = stackSpecificResistance([
      { thickness: 1e-4, conductivity: 1, specificResistance: 0, contactShare: 0.5 },
      { thickness: 2e-4, conductivity: 2, specificResistance: 1e-5, contactShare: 1 },
    ]);
    expect(resistance).toBeCloseTo(2e-4 + 1e-4 + 1e-5, 15);
  });

  it('of no layers at all has no resistance', () => {
    expect(stackSpecificResistance([])).toBe(0);
  });
});
