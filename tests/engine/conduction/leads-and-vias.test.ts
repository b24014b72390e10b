/**
 * Leads, board layers and vias by hand: the straight fin with an adiabatic end of any heat-transfer text, parallel and series conduction.
 */
import { describe, expect, it } from 'vitest';
import { boardConductivity, boardLayerConductivities, withVias } from '../../../server/engine/conduction/board.js';
import { copperResistivity, leadConduction, leadGroundShare } from '../../../server/engine/conduction/lead.js';

/**
 * Heat that enters a fin at its beginning [W], by finite volumes: the beginning at `excess` [K] over the room, the end adiabatic, `perMetre`
 * [W/m] made evenly along it.
 */
function fin(lead: { ka: number; hp: number; length: number }, excess: number, perMetre: number): number {
  const { ka, hp, length } = lead;
  const n = 20_000;
  const dx = length / n;
  const along = ka / dx;
  const across = hp * dx;
  // Cells from the end to the beginning: flow into each from its neighbour before is `slope` θ_before − `given`.
  let slope = 0;
  let given = 0;
  for (let i = 0; i < n; i++) {
    const g = i < n - 1 ? along : 2 * along;
    const sum = g + across + slope;
    const lossSlope = slope + across;
    const lossGiven = given + perMetre * dx;
    slope = (g * lossSlope) / sum;
    given = (g * lossGiven) / sum;
  }
  return slope * excess - given;
}

describe('A lead', () => {
  const lead = { crossSection: 1e-6, diameter: 0.002, filmCoefficient: 15 };
  const ka = 390 * 1e-6;
  const hp = 15 * Math.PI * 0.002;

  it('that is short cools over its whole surface, h π d L', () => {
    const { conductance } = leadConduction({ ...lead, length: 0.001 });
    // tanh(x)/x = 1 − x²/3: within 10⁻⁴ here.
    expect(conductance / (hp * 0.001)).toBeCloseTo(1, 3);
  });

  it('that is long cools as an endless fin, √(h p k A)', () => {
    const { conductance } = leadConduction({ ...lead, length: 10 });
    expect(conductance).toBeCloseTo(Math.sqrt(hp * ka), 12);
  });

  it.each([0.02, 0.1, 0.3, 1])('of %d m conducts as a fin cut into twenty thousand pieces', (length) => {
    const { conductance, conductivity } = leadConduction({ ...lead, length });
    expect(conductivity).toBe(390);
    expect(conductance / fin({ ka, hp, length }, 1, 0)).toBeCloseTo(1, 6);
  });

  it.each([0.02, 0.1, 0.3, 1])('of %d m with heat of its own brings tanh(mL)/(mL) of it to its beginning', (length) => {
    const { slenderness } = leadConduction({ ...lead, length });
    // With its beginning held at the room’s temperature, what flows out there is the share that counts as made there.
    const atBeginning = -fin({ ka, hp, length }, 0, 0.7);
    expect(leadGroundShare(slenderness) / (atBeginning / (0.7 * length))).toBeCloseTo(1, 6);
  });

  it('brings all of its own heat when it has no length to cool over', () => {
    expect(leadGroundShare(1e-9)).toBe(1);
    expect(leadGroundShare(1.0001e-6)).toBeCloseTo(1, 11);
  });

  it('of annealed copper has 1.7241·10⁻⁸ Ω m at 20 °C (IEC 60028, from memory), 0.393 % more for each kelvin', () => {
    expect(copperResistivity(20) / 1.7241e-8).toBeCloseTo(1, 12);
    expect(copperResistivity(120) / copperResistivity(20)).toBeCloseTo(1.393, 12);
    // 0.5 mm² and 1 m at 20 °C: 34.5 mΩ, as wire tables have it (common practice: 34 to 39 mΩ/m).
    expect(copperResistivity(20) / 0.5e-6).toBeCloseTo(0.0345, 4);
  });
});

describe('A board’s layers', () => {
  const foil = { along: 390, through: 390, thickness: 35e-6, coverage: 0.5 };
  const core = { along: 0.8, through: 0.3, thickness: 1.5e-3, coverage: 1 };
  const stack = [foil, core, { ...foil, coverage: 0 }, { ...foil, coverage: 1 }];
  const layers = boardLayerConductivities(stack);

  it('conduct along themselves by their coverage, through themselves as laminate where there is no copper', () => {
    expect(layers.map(({ inPlaneWPerMK }) => inPlaneWPerMK)).toEqual([195, 0.8, 1e-4, 390]);
    // 0.5 · 390 + 0.5 · 0.3; laminate; nothing of copper; all of copper.
    const through = [195.15, 0.3, 0.3, 390];
    layers.forEach(({ throughWPerMK }, i) => {
      expect(throughWPerMK).toBeCloseTo(through[i] ?? NaN, 9);
    });
    expect(layers.map(({ thicknessM }) => thicknessM)).toEqual([35e-6, 1.5e-3, 35e-6, 35e-6]);
  });

  it('one by one conduct in series what the board as a whole does', () => {
    const isotropic = stack.map((layer) => ({ ...layer, conductivity: layer.through }));
    const whole = boardConductivity(isotropic);
    const series = layers.reduce((sum, { thicknessM, throughWPerMK }) => sum + thicknessM / throughWPerMK, 0);
    expect(whole.thickness / whole.through / series).toBeCloseTo(1, 12);
  });

  // 25 vias, 0.3 mm drilled, 25 µm plated, over 1 cm²: 25 π (0.3 − 0.025) 0.025 mm² of 100 mm² is copper.
  const vias = { count: 25, drillM: 0.0003, platingM: 0.000025 };
  const copper = (25 * Math.PI * 0.275 * 0.025) / 100;

  it('with a field of vias conduct through the laminate as copper and laminate side by side', () => {
    const [top, inner, empty, bottom] = withVias(layers, vias, 1e-4);
    expect(inner?.throughWPerMK).toBeCloseTo(0.3 + copper * 350, 9);
    // An inner layer without copper is laminate too.
    expect(empty?.throughWPerMK).toBeCloseTo(0.3 + copper * 350, 9);
    // Foils are as they were, and nothing changes along the board.
    expect(top).toEqual(layers[0]);
    expect(bottom).toEqual(layers[3]);
    expect(inner?.inPlaneWPerMK).toBe(0.8);
  });

  it('with vias plated full count the whole hole, and no more copper than there is room', () => {
    const [, inner] = withVias(layers, { ...vias, platingM: 0.001 }, 1e-4);
    expect(inner?.throughWPerMK).toBeCloseTo(0.3 + (25 * Math.PI * 0.15 ** 2 * 350) / 100, 9);
    const [, crowded] = withVias(layers, { ...vias, count: 1e6 }, 1e-4);
    expect(crowded?.throughWPerMK).toBeLessThanOrEqual(0.3 + 350);
  });

  it('with vias carry heat as twenty-five copper tubes would', () => {
    // Conductance of the field through 1.5 mm, over that of the laminate alone: 25 k A_tube/t.
    const [, inner] = withVias(layers, vias, 1e-4);
    const tube = Math.PI * (0.00015 ** 2 - 0.000125 ** 2);
    const added = (((inner?.throughWPerMK ?? NaN) - 0.3) * 1e-4) / 1.5e-3;
    expect(added / ((25 * 350 * tube) / 1.5e-3)).toBeCloseTo(1, 9);
  });
});
