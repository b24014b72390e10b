import { faceNames, type FaceName, type Housing } from '../../../shared/schemas/assembly.js';
import { lookUp } from '../tables.js';
import type { NetworkBuilder } from './builder.js';
import type { BoxModel } from './box.js';
import { normalAxis, opposite } from './geometry.js';
import { contentOf } from './inline-values.js';
import { normalOf, tiltOf } from './pose.js';
import { wallReferenceC } from './resolve-housing.js';
import type { ResolvedAssembly, ResolvedCarrier, ResolvedScenario } from './resolved.js';
import { conductTo, interiorRadiation, meetAir, type Surface } from './surfaces.js';

type Solid = Exclude<Housing['fill'], { kind: 'air' }>;

/** How deep the fill stands over the face that it was poured on, and over everything: foam has no depth, it is everywhere. */
function depthOf(fill: Solid, box: BoxModel): number {
  return fill.kind === 'foam' ? Infinity : Math.min(fill.heightM, box.innerM[normalAxis[fill.onFace]]);
}

/** True where potting reaches the wall opposite to the one that it was poured on. */
export function fillsAll(box: BoxModel, fill: Extract<Solid, { kind: 'potting' }>): boolean {
  return fill.heightM >= box.innerM[normalAxis[fill.onFace]] - 1e-6;
}

/** Share of a length that lies below the surface of the fill, from `from` to `to` over the face that it was poured on. */
function shareBelow(depth: number, from: number, to: number): number {
  if (depth <= from) return 0;
  return depth >= to ? 1 : (depth - from) / (to - from);
}

/** Height of a carrier’s near side over its face [m]. */
function heightOf(carrier: ResolvedCarrier): number {
  return carrier.standOffM + carrier.thicknessM;
}

/** Share of a thing on a face, between two heights over that face, that the fill covers. */
function buried(fill: Solid, box: BoxModel, face: FaceName, from: number, to: number): number {
  const depth = depthOf(fill, box);
  if (depth === Infinity || fill.kind === 'foam') return 1;
  const room = box.innerM[normalAxis[fill.onFace]];
  if (face === fill.onFace) return shareBelow(depth, from, to);
  if (face === opposite[fill.onFace]) return shareBelow(depth, room - to, room - from);
  return depth / room;
}

/** How much of each surface the fill covers. */
export function bury(surfaces: readonly Surface[], assembly: ResolvedAssembly, box: BoxModel, fill: Solid): Surface[] {
  const faceOf = (on: ResolvedAssembly['parts'][number]['on']) =>
    on.kind === 'face'
      ? { face: on.face, base: 0 }
      : (() => {
          const carrier = assembly.carriers.find(({ id }) => id === on.carrier);
          return { face: carrier?.face ?? fillFace(fill), base: carrier ? heightOf(carrier) : 0 };
        })();
  return surfaces.map((surface) => {
    const face = /^face\.(\w+)\.inside$/.exec(surface.id)?.[1] as FaceName | undefined;
    if (face) return { ...surface, buriedShare: buried(fill, box, face, 0, 1e-9) };
    const carrier = assembly.carriers.find(
      ({ id }) => surface.id === `carrier.${id}.free` || surface.id === `carrier.${id}.back`,
    );
    if (carrier?.face) {
      const at = surface.id.endsWith('.free') ? heightOf(carrier) : carrier.standOffM;
      return { ...surface, buriedShare: buried(fill, box, carrier.face, at, at + 1e-9) };
    }
    const part = assembly.parts.find(({ id }) => surface.id.startsWith(`part.${id}.`));
    if (!part) return surface;
    const { face: under, base } = faceOf(part.on);
    const height = Math.max(part.type.heightM.value, 1e-6);
    const top = surface.id.endsWith('.top');
    return { ...surface, buriedShare: buried(fill, box, under, top ? base + height : base, base + height + 1e-9) };
  });
}

function fillFace(fill: Solid): FaceName {
  return fill.kind === 'potting' ? fill.onFace : 'bottom';
}

/**
 * Conduction through potting or foam, in place of convection and radiation: one node in its middle. A wall reaches it through half of the
 * fill’s extent before it; a body in the fill by the shape factor of a half sphere of its own area, √(2 π A), as in a half space.
 *
 * @param surfaces the insides with the share of each that is buried
 */
export function conductThroughFill(
  builder: NetworkBuilder,
  surfaces: readonly Surface[],
  box: BoxModel,
  fill: Solid,
  scenario: ResolvedScenario,
): void {
  const material = contentOf(fill.material, '/housing/fill/material');
  const k = lookUp(material.conductivityWPerMK.value, wallReferenceC);
  const base = fillFace(fill);
  const axis = normalAxis[base];
  const depth = Math.min(depthOf(fill, box), box.innerM[axis]);
  builder.node('fill.inside', 'air', fill.kind === 'foam' ? 'Foam, middle' : 'Potting, middle');
  for (const surface of surfaces) {
    const share = surface.buriedShare ?? 0;
    if (share <= 0) continue;
    const face = faceNames.find((name) => surface.id === `face.${name}.inside`);
    const reach = face ? (normalAxis[face] === axis ? depth : box.innerM[normalAxis[face]]) / 2 : 0;
    const area = Math.max(surface.areaM2, 1e-9) * share;
    const coefficient = face
      ? (k / reach) * share
      : (k * Math.sqrt(2 * Math.PI * area) * share) / Math.max(surface.areaM2, 1e-9);
    conductTo(builder, surface, 'fill.inside', coefficient, `${surface.id}.fill`);
  }
  if (fill.kind === 'foam' || fillsAll(box, fill)) return;
  // The open surface of the potting meets the air above it.
  const open = openSurface(box, base, scenario);
  builder.node('fill.surface', 'air', 'Potting, its open surface');
  builder.link({
    id: 'fill.above',
    kind: 'conduction',
    from: 'fill.inside',
    to: 'fill.surface',
    conductivityWPerMK: k,
    areaM2: open.areaM2,
    lengthM: depth / 2,
  });
}

/** The open surface of a potting, that air and mean radiant temperature meet. */
export function openSurface(box: BoxModel, base: FaceName, scenario: ResolvedScenario): Surface {
  const model = box.models[base];
  return {
    id: 'fill.surface',
    of: { node: 'fill.surface' },
    areaM2: model.innerAreaM2,
    tiltDeg: 180 - tiltOf(normalOf(base), scenario.up),
    slopeM: [Math.max(...model.innerSizeM), Math.min(...model.innerSizeM)],
    emissivity: 0.9,
  };
}

/** What lies in air inside a box: convection to the one air node, radiation to the mean radiant node. */
export function meetInsideAir(builder: NetworkBuilder, surfaces: readonly Surface[]): void {
  for (const surface of surfaces) meetAir(builder, surface, 'air.inside');
  interiorRadiation(builder, surfaces, 'radiant.inside');
}
