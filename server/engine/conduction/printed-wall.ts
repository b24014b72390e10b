/**
 * Conduction through printed walls. SI units; conductivities in W/(m K), lengths in m.
 */

/** Still air in the cells of an infill, near 40 °C. Sutherland’s law gives 0.0271 W/(m K) at 313 K. */
export const cellAirConductivity = 0.027;

export interface PrintedWall {
  /** Wall thickness t [m]. */
  thickness: number;
  /** Perimeters n on each side of the core. */
  perimeters: number;
  /** Extruded line width w [m]. */
  lineWidth: number;
  layerHeight: number;
  /** Closed layers on each side, for a face parallel to the print bed. */
  closedLayers: number;
  /** Solid share f of the core, 0 … 1. */
  infillShare: number;
  /** `cells`: closed or meandering cells; `ribs`: walls of plastic that run from side to side. */
  pattern: 'cells' | 'ribs';
  /** True when the face lay parallel to the print bed. */
  parallelToBed: boolean;
  /** Conductivity of the solid polymer along the layers, and across them. */
  alongLayers: number;
  throughLayers: number;
}

/** Which end of the band of what is not known: `low` and `high` bound the core, `mid` serves the nominal answer. */
export type WallBand = 'low' | 'mid' | 'high';

/**
 * Lower Hashin–Shtrikman bound of the conductivity of a two-phase mixture whose matrix is the poorer conductor.
 *
 * k = k₂ + f / (1/(k₁ − k₂) + (1 − f)/(3 k₂))
 *
 * @param better k₁ [W/(m K)], the better conductor, volume share f
 * @param poorer k₂ [W/(m K)]
 * @param betterShare f, 0 … 1
 * @returns [W/(m K)]
 *
 * **Valid for** isotropic mixtures, any share.
 * **Source** Z. Hashin, S. Shtrikman, J. Appl. Phys. 33 (1962) 3125–3131.
 * **Checked against** both ends (f = 0, 1) and the parallel bound above it, tests/engine/conduction.
 */
export function hashinShtrikmanLower(better: number, poorer: number, betterShare: number): number {
  if (better === poorer) return better;
  return poorer + betterShare / (1 / (better - poorer) + (1 - betterShare) / (3 * poorer));
}

/**
 * Upper Hashin–Shtrikman bound: the matrix is the better conductor.
 *
 * k = k₁ + (1 − f) / (1/(k₂ − k₁) + f/(3 k₁))
 *
 * Arguments, validity and source as `hashinShtrikmanLower`.
 */
export function hashinShtrikmanUpper(better: number, poorer: number, betterShare: number): number {
  if (better === poorer) return better;
  return better + (1 - betterShare) / (1 / (poorer - better) + betterShare / (3 * better));
}

/** Core thickness [m]: what the perimeters (or the closed layers of a face parallel to the bed) leave between them. */
export function coreThickness(wall: PrintedWall): number {
  const closed = wall.parallelToBed ? wall.closedLayers * wall.layerHeight : wall.perimeters * wall.lineWidth;
  // Closed to within rounding: a 2.4 mm wall of 2 × 3 lines of 0.4 mm has no core.
  const core = wall.thickness - 2 * closed;
  return core > 1e-9 ? core : 0;
}

/** Conductivity of the core [W/(m K)] at one end, or in the middle, of its band. */
export function coreConductivity(wall: PrintedWall, band: WallBand): number {
  const solid = wall.parallelToBed ? wall.throughLayers : wall.alongLayers;
  const low = hashinShtrikmanLower(solid, cellAirConductivity, wall.infillShare);
  const high =
    wall.pattern === 'ribs'
      ? (1 - wall.infillShare) * cellAirConductivity + wall.infillShare * solid
      : hashinShtrikmanUpper(solid, cellAirConductivity, wall.infillShare);
  if (band === 'low') return low;
  return band === 'high' ? high : (low + high) / 2;
}

/**
 * Effective conductivities of a printed wall, through it and in its plane: skins of solid polymer on both sides of a
 * core, in series for heat through the wall and in parallel for heat along it.
 *
 * @returns `through` and `inPlane` [W/(m K)], over the whole thickness
 *
 * **Valid for** walls much wider than thick.
 * **Source** series and parallel conduction; the core after Hashin & Shtrikman (1962).
 * **Checked against** three 0.45 mm perimeters make a 2.4 mm wall solid, tests/engine/conduction.
 */
export function printedWallConductivity(wall: PrintedWall, band: WallBand): { through: number; inPlane: number } {
  const core = coreThickness(wall);
  const skin = wall.thickness - core;
  const solid = wall.parallelToBed ? wall.throughLayers : wall.alongLayers;
  const inCore = coreConductivity(wall, band);
  return {
    through: wall.thickness / (skin / solid + (core > 0 ? core / inCore : 0)),
    inPlane: (skin * wall.alongLayers + core * inCore) / wall.thickness,
  };
}
