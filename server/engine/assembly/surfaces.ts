import type { NetworkLink } from '../../../shared/schemas/network.js';
import type { NetworkBuilder } from './builder.js';

/** A plane surface that meets air: of a node, or one side of a grid. */
export interface Surface {
  /** Its links are named after it. */
  id: string;
  /** A node, or a side of a grid, whose free area it then is. */
  of: { node: string } | { grid: string; side: 'near' | 'far' };
  areaM2: number;
  /** Which way it looks [°]: 0 up, 90 sideways, 180 down. */
  tiltDeg: number;
  /** Extents of the whole plane along its slope and across it, for its characteristic length [m]. */
  slopeM: readonly [number, number];
  emissivity: number;
  /** Share that lies in potting or foam instead of air. */
  buriedShare?: number;
}

/** A surface within this of level or upright counts as level or upright [°]. */
const level = 0.5;

/**
 * Convection of a plane surface by the way it looks: its height for an upright one, area ÷ perimeter for a level one, both blended
 * for one between (Raithby & Hollands by default). Moving air adds forced convection along the longer side.
 */
export function convectionOf(
  { tiltDeg, slopeM }: Pick<Surface, 'tiltDeg' | 'slopeM'>,
  airSpeedMPerS = 0,
): Pick<Extract<NetworkLink, { kind: 'convection' }>, 'shape' | 'lengthM'> & {
  tiltDeg?: number;
  airSpeedMPerS?: number;
  flowLengthM?: number;
} {
  const [along, across] = slopeM;
  const moving = airSpeedMPerS > 0 ? { airSpeedMPerS, flowLengthM: Math.max(along, across) } : {};
  if (Math.abs(tiltDeg - 90) < level) return { shape: 'vertical-plate', lengthM: along, ...moving };
  if (tiltDeg < level || tiltDeg > 180 - level) {
    const shape = tiltDeg < 90 ? 'plate-facing-up' : 'plate-facing-down';
    return { shape, lengthM: (along * across) / (2 * (along + across)), ...moving };
  }
  return { shape: 'inclined-plate', lengthM: along, tiltDeg, ...moving };
}

/** Joins a surface to its air. */
export function meetAir(builder: NetworkBuilder, surface: Surface, air: string, airSpeedMPerS = 0): void {
  const bare = 1 - (surface.buriedShare ?? 0);
  if (bare <= 0) return;
  const law = convectionOf(surface, airSpeedMPerS);
  const id = `${surface.id}.convection`;
  if ('grid' in surface.of) {
    const { grid, side } = surface.of;
    const widthM = law.shape === 'inclined-plate' ? { widthM: surface.slopeM[1] } : {};
    builder.gridOf(grid).surfaces.push({ id, side, to: air, kind: 'convection', ...law, ...widthM, scale: bare });
    return;
  }
  builder.link({
    id,
    kind: 'convection',
    from: surface.of.node,
    to: air,
    areaM2: surface.areaM2 * bare,
    scale: 1,
    ...law,
  });
}

/** Radiation of a surface to a node, over `areaFactor` times its area. */
export function radiateTo(
  builder: NetworkBuilder,
  surface: Surface,
  to: string,
  options: { emissivity?: number; areaFactor?: number; id?: string } = {},
): void {
  const areaFactor = (options.areaFactor ?? 1) * (1 - (surface.buriedShare ?? 0));
  const emissivity = options.emissivity ?? surface.emissivity;
  if (areaFactor <= 0 || emissivity <= 0) return;
  const id = options.id ?? `${surface.id}.radiation`;
  if ('grid' in surface.of) {
    const { grid, side } = surface.of;
    builder.gridOf(grid).surfaces.push({ id, side, to, kind: 'radiation', emissivity, areaFactor });
    return;
  }
  builder.link({ id, kind: 'radiation', from: surface.of.node, to, areaM2: surface.areaM2 * areaFactor, emissivity });
}

/** A given conductance per area from a surface to a node [W/(m² K)]. */
export function conductTo(
  builder: NetworkBuilder,
  surface: Surface,
  to: string,
  coefficientWPerM2K: number,
  id: string,
): void {
  if (coefficientWPerM2K <= 0) return;
  if ('grid' in surface.of) {
    const { grid, side } = surface.of;
    builder.gridOf(grid).surfaces.push({ id, side, to, kind: 'film', coefficientWPerM2K });
    return;
  }
  builder.link({ id, kind: 'film', from: surface.of.node, to, coefficientWPerM2K, areaM2: surface.areaM2 });
}

/**
 * View correction of each surface towards the mean radiant node: F_i = 1/(1 − A_i F_i / Σ A_j F_j), by iteration.
 *
 * @param areas A_i [m²]
 * @returns F_i ≥ 1
 *
 * **Valid for** enclosures of convex surfaces of comparable size (no surface over half of the whole).
 * **Source** J. A. Carroll, “An ‘MRT method’ of computing radiant energy exchange in rooms”, 2nd Systems Simulation
 * and Economic Analysis Conf., 1980; recalled, to be verified.
 * **Checked against** a cube, F = 6/5, tests/engine/assembly.
 */
export function meanRadiantFactors(areas: readonly number[]): number[] {
  let factors = areas.map(() => 1);
  for (let pass = 0; pass < 60; pass++) {
    const sum = areas.reduce((total, area, i) => total + area * (factors[i] ?? 1), 0);
    // A surface that is more than half of the whole has no solution of its own: held at what a half would have.
    factors = areas.map((area, i) => 1 / (1 - Math.min(0.5, (area * (factors[i] ?? 1)) / sum)));
  }
  return factors;
}

/**
 * Radiation inside a box: every surface exchanges with one mean radiant node, through its own surface resistance
 * (1 − ε)/(ε A) and its space resistance 1/(A F). In the network this is a radiation link of area A F and emissivity
 * 1/(1 + F (1 − ε)/ε).
 */
export function interiorRadiation(builder: NetworkBuilder, surfaces: readonly Surface[], radiantNode: string): void {
  const bareArea = (surface: Surface) => surface.areaM2 * (1 - (surface.buriedShare ?? 0));
  const lit = surfaces.filter((surface) => bareArea(surface) > 1e-12 && surface.emissivity > 0);
  const factors = meanRadiantFactors(lit.map(bareArea));
  lit.forEach((surface, i) => {
    const factor = factors[i] ?? 1;
    radiateTo(builder, surface, radiantNode, {
      emissivity: 1 / (1 + (factor * (1 - surface.emissivity)) / surface.emissivity),
      areaFactor: factor,
    });
  });
}
