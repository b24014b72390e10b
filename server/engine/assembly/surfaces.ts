import type { NetworkLink } from '../../../shared/schemas/network.js';
import type { NetworkBuilder } from './builder.js';
import type { Facing } from './geometry.js';

/** A plane surface that meets air. */
export interface Surface {
  /** Its links are named after it. */
  id: string;
  node: string;
  areaM2: number;
  facing: Facing;
  /** Length and width of the whole plane, for its characteristic length [m]. */
  sizeM: readonly [number, number];
  /** Vertical extent of a sideways surface [m]. */
  verticalM: number;
  emissivity: number;
}

/**
 * Natural convection of a plane surface by the way it looks: height for a vertical one, area ÷ perimeter for a
 * horizontal one (Raithby & Hollands by default).
 */
export function convectionLink(surface: Surface, air: string): NetworkLink {
  const [u, v] = surface.sizeM;
  const horizontal = (u * v) / (2 * (u + v));
  const shape =
    surface.facing === 'sideways'
      ? ('vertical-plate' as const)
      : surface.facing === 'up'
        ? ('plate-facing-up' as const)
        : ('plate-facing-down' as const);
  return {
    id: `${surface.id}.convection`,
    kind: 'convection',
    from: surface.node,
    to: air,
    shape,
    areaM2: surface.areaM2,
    lengthM: surface.facing === 'sideways' ? surface.verticalM : horizontal,
    scale: 1,
  };
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
  const lit = surfaces.filter((surface) => surface.areaM2 > 0 && surface.emissivity > 0);
  const factors = meanRadiantFactors(lit.map((surface) => surface.areaM2));
  lit.forEach((surface, i) => {
    const factor = factors[i] ?? 1;
    builder.link({
      id: `${surface.id}.radiation`,
      kind: 'radiation',
      from: surface.node,
      to: radiantNode,
      areaM2: surface.areaM2 * factor,
      emissivity: 1 / (1 + (factor * (1 - surface.emissivity)) / surface.emissivity),
    });
  });
}
