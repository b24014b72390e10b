import { describe, expect, it } from 'vitest';
import { boardLayerConductivities, withVias } from '../../../server/engine/conduction/board.js';
import { copperResistivity, leadConduction, leadGroundShare } from '../../../server/engine/conduction/lead.js';

describe('A lead', () => {
  const lead = { crossSection: 1e-6, diameter: 0.002, filmCoefficient: 15 };

  it('that is short cools over its whole surface, h π d L', () => {
    const { conductance } = leadConduction({ ...lead, length: 0.001 });
    expect(conductance / (15 * Math.PI * 0.002 * 0.001)).toBeCloseTo(1, 3);
  });

  it('that is long cools as an endless fin, √(h p k A)', () => {
    const { conductance } = leadConduction({ ...lead, length: 10 });
    expect(conductance).toBeCloseTo(Math.sqrt(15 * Math.PI * 0.002 * 390 * 1e-6), 9);
  });

  it('brings all of its own heat when short and a part of it when long', () => {
    expect(leadGroundShare(1e-9)).toBe(1);
    expect(leadGroundShare(2)).toBeCloseTo(Math.tanh(2) / 2, 12);
  });

  it('of annealed copper has 1.7241·10⁻⁸ Ω m at 20 °C (IEC 60028, from memory)', () => {
    expect(copperResistivity(20)).toBeCloseTo(1.7241e-8, 14);
    expect(copperResistivity(120) / copperResistivity(20)).toBeCloseTo(1.393, 3);
  });
});

describe('A board’s layers', () => {
  const foil = { along: 390, through: 390, thickness: 35e-6, coverage: 0.5 };
  const core = { along: 0.8, through: 0.3, thickness: 1.5e-3, coverage: 1 };
  const layers = boardLayerConductivities([foil, core, foil]);

  it('conduct along themselves by their coverage, through themselves as laminate where there is no copper', () => {
    expect(layers.map(({ inPlaneWPerMK }) => inPlaneWPerMK)).toEqual([195, 0.8, 195]);
    expect(layers[0]?.throughWPerMK).toBeCloseTo(0.5 * 390 + 0.5 * 0.3, 9);
  });

  it('with a field of vias conduct as copper and laminate side by side', () => {
    // 25 vias, 0.3 mm drilled, 25 µm plated, over 1 cm²: 25 π (0.3 − 0.025) 0.025 mm² of 100 mm² is copper.
    const copper = (25 * Math.PI * 0.275 * 0.025) / 100;
    const [, inner] = withVias(layers, { count: 25, drillM: 0.0003, platingM: 0.000025 }, 1e-4);
    expect(inner?.throughWPerMK).toBeCloseTo(0.3 + copper * 350, 9);
  });
});
