import type { GridLayer } from '../../../shared/schemas/network-grid.js';

/** One layer of a board: conductivity k [W/(m K)], thickness t [m], filled share φ (copper coverage; laminate 1). */
export interface BoardLayer {
  conductivity: number;
  thickness: number;
  coverage: number;
}

/**
 * Conductivities of a layered board, in its plane and through it.
 *
 * in plane k = Σ k t φ / Σ t; through k = Σ t / Σ (t / k_layer), a partly filled copper layer passing heat as the
 * laminate around it would where it is not filled: k_layer = φ k + (1 − φ) k_poorest.
 *
 * @returns `inPlane` and `through` [W/(m K)] over the whole thickness, `thickness` [m]
 *
 * **Valid for** layers thin against the features they carry; no plated vias.
 * **Source** parallel and series conduction.
 * **Checked against** a four-layer board by hand, tests/engine/conduction.
 */
export function boardConductivity(layers: readonly BoardLayer[]): {
  inPlane: number;
  through: number;
  thickness: number;
} {
  const poorest = Math.min(...layers.map((layer) => layer.conductivity));
  let thickness = 0;
  let sheet = 0;
  let series = 0;
  for (const { conductivity, thickness: t, coverage } of layers) {
    thickness += t;
    sheet += conductivity * t * coverage;
    series += t / (coverage * conductivity + (1 - coverage) * poorest);
  }
  return { inPlane: sheet / thickness, through: thickness / series, thickness };
}

/** Thickness under which a layer far better than the rest is a foil [m]. */
const foilThickness = 2.5e-4;

/**
 * The layers of a board one by one, each with what it conducts along and through itself: a partly filled copper layer φ k along, and
 * through itself as `boardConductivity` has it.
 *
 * @param layers conductivities along and through the solid material [W/(m K)], thickness [m], filled share φ
 */
export function boardLayerConductivities(
  layers: readonly { along: number; through: number; thickness: number; coverage: number }[],
): GridLayer[] {
  const poorest = Math.min(...layers.map(({ through }) => through));
  return layers.map(({ along, through, thickness, coverage }) => ({
    thicknessM: thickness,
    inPlaneWPerMK: Math.max(coverage * along, 1e-4),
    throughWPerMK: coverage * through + (1 - coverage) * poorest,
  }));
}

/** Conductivity of plated copper [W/(m K)], common practice: a little under that of the bulk metal. */
const platedCopper = 350;

/**
 * The same layers with a field of plated vias in parallel with what lies between the foils.
 *
 * k = k_laminate + n π (d − s) s k_copper/A, d the drilled and s the plated thickness, over the area A of the field.
 *
 * **Valid for** many vias over the field, open or filled with something that conducts little.
 * **Source** parallel conduction; conductivity of plated copper common practice.
 * **Checked against** a hand calculation, tests/engine/conduction.
 */
export function withVias(
  layers: readonly GridLayer[],
  vias: { count: number; drillM: number; platingM: number },
  areaM2: number,
): GridLayer[] {
  const plating = Math.min(vias.platingM, vias.drillM / 2);
  const copper = (vias.count * Math.PI * (vias.drillM - plating) * plating) / areaM2;
  return layers.map((layer) =>
    layer.thicknessM < foilThickness && layer.throughWPerMK > platedCopper / 4
      ? layer
      : { ...layer, throughWPerMK: layer.throughWPerMK + Math.min(copper, 1) * platedCopper },
  );
}
