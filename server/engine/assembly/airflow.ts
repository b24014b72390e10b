import { faceNames, type Housing } from '../../../shared/schemas/assembly.js';
import type { NetworkBuilder } from './builder.js';
import type { BoxModel } from './box.js';
import { dot, normalOf, type Vector } from './pose.js';
import type { ResolvedScenario } from './resolved.js';

/** Openings nearer in height than this draw no air through each other [m]. */
const leastHeight = 1e-4;

interface Opening {
  /** Discharge coefficient × free area [m²]. */
  effectiveM2: number;
  /** Height of its middle over the middle of the box, in the pose of use [m]. */
  heightM: number;
}

/** All openings that lead to the room’s air, by their height in the pose of use. */
function openings(box: BoxModel, up: Vector): { open: Opening[]; blocked: string[] } {
  const { housing } = box.assembly.box as { housing: Housing };
  const open: Opening[] = [];
  const blocked: string[] = [];
  for (const name of faceNames) {
    const { exposure, vents } = housing.faces[name];
    if (vents.length === 0) continue;
    if (exposure.kind !== 'open' && exposure.kind !== 'near') {
      blocked.push(name);
      continue;
    }
    const normal = normalOf(name);
    for (const vent of vents) {
      const middle = [0, 1, 2].map((axis) => ((normal[axis] as number) * (box.outerM[axis] as number)) / 2);
      // In a side face the vent’s height is drawn over the lower edge; in top and bottom it lies in the middle.
      if (normal[2] === 0) middle[2] = vent.heightM - box.outerM[2] / 2;
      open.push({
        effectiveM2: vent.dischargeCoefficient * vent.freeAreaM2 * vent.screenShare,
        heightM: dot(middle as unknown as Vector, up),
      });
    }
  }
  return { open, blocked };
}

/**
 * Openings at any heights as one pair that draws the same flow: between them lies the level at which no air passes, below it air comes
 * in and above it goes out. V̇ = Σ_above C_d A √(2 g (z − z₀) ΔT/T) = Σ_below …, so the shape of the sum fixes z₀.
 *
 * @returns effective area A_eff with V̇ = A_eff √(2 g H ΔT/T) over the height H between the lowest and the highest, or `null`
 *
 * **Source** the neutral level of buoyancy ventilation, as in any text on natural ventilation; common practice.
 * **Checked against** the closed form of two openings, 1/A_eff² = 1/A_in² + 1/A_out², tests/engine/assembly.
 */
export function equivalentPair(open: readonly Opening[]): { effectiveM2: number; heightM: number } | null {
  const heights = open.map(({ heightM }) => heightM);
  const lowest = Math.min(...heights);
  const highest = Math.max(...heights);
  const heightM = highest - lowest;
  if (!(heightM > leastHeight)) return null;
  const through = (level: number, above: boolean) =>
    open.reduce((sum, opening) => {
      const over = above ? opening.heightM - level : level - opening.heightM;
      return over > 0 ? sum + opening.effectiveM2 * Math.sqrt(over) : sum;
    }, 0);
  let low = lowest;
  let high = highest;
  for (let i = 0; i < 60; i++) {
    const level = (low + high) / 2;
    if (through(level, true) > through(level, false)) low = level;
    else high = level;
  }
  return { effectiveM2: through((low + high) / 2, true) / Math.sqrt(heightM), heightM };
}

/** Air exchange of the inside with the room, by a fan or by buoyancy. */
export function compileAirExchange(builder: NetworkBuilder, box: BoxModel, scenario: ResolvedScenario): void {
  const { housing } = box.assembly.box as { housing: Housing };
  const { open, blocked } = openings(box, scenario.up);
  for (const name of blocked) {
    builder.warnings.push({
      code: 'vents-blocked',
      node: `face.${name}.outer`,
      message: `The vents of the ${name} face open onto what lies before it: they are taken as closed`,
    });
  }
  const total = open.reduce((sum, { effectiveM2 }) => sum + effectiveM2, 0);
  if (total <= 0) return;
  const common = { id: 'air.exchange', kind: 'ventilation' as const, from: 'air.inside', to: 'ambient' };
  if (housing.fan) {
    const { flowM3PerS, curve } = housing.fan;
    if (flowM3PerS !== undefined) builder.link({ ...common, flowM3PerS, dischargeCoefficient: 1 });
    else if (curve) {
      // In through one half of the openings, out through the fan: they stand before it all together.
      builder.link({ ...common, fanCurve: curve, inletAreaM2: total, dischargeCoefficient: 1 });
    }
    return;
  }
  const pair = equivalentPair(open);
  if (pair === null) {
    builder.warnings.push({
      code: 'no-draught',
      node: 'air.inside',
      message: 'All openings lie at one height in this pose: no draught passes through the housing',
    });
    return;
  }
  // Two equal openings of this area have the effective area A/√2.
  const area = pair.effectiveM2 * Math.SQRT2;
  builder.link({ ...common, inletAreaM2: area, outletAreaM2: area, heightM: pair.heightM, dischargeCoefficient: 1 });
}
