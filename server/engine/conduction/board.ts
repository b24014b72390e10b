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
