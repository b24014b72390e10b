import type { GridLayer } from '../../../shared/schemas/network-grid.js';

/**
 * Planes of nodes through a plate: the first on the near surface, the last on the far one, so that surface temperatures are computed
 * and not extrapolated. A thin plate that conducts well through itself has one plane only.
 */
export interface Planes {
  count: number;
  /** Per gap between planes: which share of which layers lies in it is summed up by `through`. */
  gaps: { layer: number; share: number }[][];
  /** Per plane: layers, and the share of each, whose heat along the plate it carries. */
  carried: { layer: number; share: number }[][];
}

/** Foils: thinner than this and better than this conduct along themselves only, where they lie [m], [W/(m K)]. */
const foil = { thickness: 2.5e-4, conductivity: 5 };
/** Below this resistance through the thickness a plate’s two surfaces are one [K m²/W]. */
const onePlane = 3e-4;
const mostGaps = 6;

/**
 * Chooses the planes. Foils (copper layers) put their conduction into the plane where they lie; every other layer lies between planes
 * and gives half of its conduction to each; one thicker than a third of the smallest source’s side is divided, finely at the source’s side.
 *
 * @param layers from the near side to the far side
 * @param smallestSide smallest side of a source on it [m], `Infinity` without any
 */
export function choosePlanes(layers: readonly GridLayer[], smallestSide: number): Planes {
  const isFoil = (layer: GridLayer) =>
    layers.length > 1 && layer.thicknessM < foil.thickness && layer.inPlaneWPerMK > foil.conductivity;
  const resistance = layers.reduce((sum, layer) => sum + layer.thicknessM / layer.throughWPerMK, 0);
  const thickness = layers.reduce((sum, layer) => sum + layer.thicknessM, 0);
  if ((resistance < onePlane && thickness <= smallestSide / 3) || layers.every(isFoil)) {
    return { count: 1, gaps: [], carried: [layers.map((_, layer) => ({ layer, share: 1 }))] };
  }
  const gaps: Planes['gaps'] = [];
  const carried: Planes['carried'] = [[]];
  let fromNear = 0;
  layers.forEach((layer, l) => {
    const plane = carried.length - 1;
    if (isFoil(layer)) {
      (carried[plane] as { layer: number; share: number }[]).push({ layer: l, share: 1 });
      return;
    }
    // Stretched so that it conducts alike both ways.
    const stretched = layer.thicknessM * Math.sqrt(layer.inPlaneWPerMK / layer.throughWPerMK);
    const shares = divide(stretched, smallestSide, fromNear);
    fromNear += layer.thicknessM;
    for (const share of shares) {
      (carried.at(-1) as { layer: number; share: number }[]).push({ layer: l, share: share / 2 });
      gaps.push([{ layer: l, share }]);
      carried.push([{ layer: l, share: share / 2 }]);
    }
  });
  return { count: carried.length, gaps, carried };
}

/** Shares of a layer from its near side to its far side: one, or several that grow away from the sources. */
function divide(thickness: number, side: number, depth: number): number[] {
  if (thickness <= side / 3) return [1];
  const first = Math.max(side / 8, depth / 2);
  const sizes = [first];
  let sum = first;
  while (sum < thickness && sizes.length < mostGaps) {
    const next = (sizes.at(-1) as number) * 1.7;
    sizes.push(next);
    sum += next;
  }
  if (sizes.length === 1) return [1];
  if (sum < thickness) sizes[sizes.length - 1] = (sizes.at(-1) as number) + thickness - sum;
  const total = sizes.reduce((all, size) => all + size, 0);
  return sizes.map((size) => size / total);
}

/** Conductance along each plane, as sheet conductance k t [W/K], and through each gap per area [W/(m² K)]. */
export function planeConductances(
  planes: Planes,
  layers: readonly GridLayer[],
): { sheet: number[]; through: number[] } {
  const at = (layer: number) => layers[layer] as GridLayer;
  return {
    sheet: planes.carried.map((parts) =>
      parts.reduce((sum, { layer, share }) => sum + share * at(layer).thicknessM * at(layer).inPlaneWPerMK, 0),
    ),
    through: planes.gaps.map(
      (parts) =>
        1 / parts.reduce((sum, { layer, share }) => sum + (share * at(layer).thicknessM) / at(layer).throughWPerMK, 0),
    ),
  };
}
