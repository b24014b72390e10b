import { faceNames, type FaceName } from '../../../shared/schemas/assembly.js';
import { printedWallConductivity, type WallBand } from '../conduction/printed-wall.js';
import type { NetworkBuilder } from './builder.js';
import { edges, faceSize, innerSize, outsideFacing, turned, verticalExtent } from './geometry.js';
import { lookUp } from '../tables.js';
import { wallReferenceC } from './resolve-housing.js';
import type { ResolvedAssembly, ResolvedFace } from './resolved.js';
import { convectionLink, type Surface } from './surfaces.js';

export type ResolvedScenario = ResolvedAssembly['scenarios'][number];

export interface FaceModel {
  face: ResolvedFace;
  /** Conductivities of the wall as made [W/(m K)]. */
  through: number;
  inPlane: number;
  innerSizeM: [number, number];
  innerAreaM2: number;
  outerAreaM2: number;
}

/** “top”, as a reader names it. */
export function faceLabel(face: FaceName): string {
  return `${face.charAt(0).toUpperCase()}${face.slice(1)} face`;
}

export function wallConductivity(face: ResolvedFace, band: WallBand): { through: number; inPlane: number } {
  if (face.printed) return printedWallConductivity(face.printed, band);
  const along = lookUp(face.material.conductivityWPerMK.value, wallReferenceC);
  return { through: along, inPlane: along };
}

export function faceModels(assembly: ResolvedAssembly, band: WallBand): Record<FaceName, FaceModel> {
  const { faces, document } = assembly;
  const { outerM } = document.housing;
  const wallM = Object.fromEntries(faceNames.map((name) => [name, faces[name].wallM])) as Record<FaceName, number>;
  const inner = innerSize(outerM, wallM);
  return Object.fromEntries(
    faceNames.map((name) => {
      const innerSizeM = faceSize(name, inner);
      const [u, v] = faceSize(name, outerM);
      const model: FaceModel = {
        face: faces[name],
        ...wallConductivity(faces[name], band),
        innerSizeM,
        innerAreaM2: innerSizeM[0] * innerSizeM[1],
        outerAreaM2: u * v,
      };
      return [name, model];
    }),
  ) as Record<FaceName, FaceModel>;
}

/**
 * Share of a face’s extent, from the edge, over which the mean of its temperature stands for heat that comes over that
 * edge and is lost evenly: one third (a fin that loses heat evenly: T_edge − T_mean = q l/(3 k t w)).
 */
const edgeShare = 1 / 3;

/** Nodes of the six faces, their walls, their outsides and the conduction round the edges. */
export function compileHousing(
  builder: NetworkBuilder,
  assembly: ResolvedAssembly,
  scenario: ResolvedScenario,
  models: Record<FaceName, FaceModel>,
): void {
  const { outerM, pose } = assembly.document.housing;
  builder.node('ambient', 'ambient', 'Room air', { fixedC: scenario.airC });
  builder.node('surroundings', 'surroundings', 'Surroundings', { fixedC: scenario.surroundingsC });
  for (const name of faceNames) {
    const model = models[name];
    const { face } = model;
    const conductionArea = Math.sqrt(model.innerAreaM2 * model.outerAreaM2);
    const half =
      (conductionArea * face.wallM * face.material.densityKgPerM3.value * face.material.specificHeatJPerKgK.value) / 2;
    builder.node(`face.${name}.inner`, 'face', `${faceLabel(name)}, inside`, { capacityJPerK: half });
    builder.node(`face.${name}.outer`, 'face', `${faceLabel(name)}, outside`, { capacityJPerK: half });
    builder.link({
      id: `face.${name}.wall`,
      kind: 'conduction',
      from: `face.${name}.inner`,
      to: `face.${name}.outer`,
      conductivityWPerMK: model.through,
      areaM2: conductionArea,
      lengthM: face.wallM,
    });
    if (!face.open) continue;
    const size = faceSize(name, outerM);
    const outside: Surface = {
      id: `face.${name}.outside`,
      node: `face.${name}.outer`,
      areaM2: model.outerAreaM2,
      facing: outsideFacing(name, pose.up),
      sizeM: size,
      verticalM: verticalExtent(name, pose.up, size),
      emissivity: face.emissivityOutside,
    };
    builder.link(convectionLink(outside, 'ambient'));
    builder.link({
      id: `face.${name}.outside.radiation`,
      kind: 'radiation',
      from: outside.node,
      to: 'surroundings',
      areaM2: outside.areaM2,
      emissivity: outside.emissivity,
    });
  }
  compileEdges(builder, assembly, models);
  compileSun(builder, scenario, models);
}

/** Conduction round the twelve edges, half of it between the insides and half between the outsides. */
function compileEdges(builder: NetworkBuilder, assembly: ResolvedAssembly, models: Record<FaceName, FaceModel>): void {
  for (const edge of edges(assembly.document.housing.outerM)) {
    const a = models[edge.a];
    const b = models[edge.b];
    const resistance =
      (edge.acrossA * edgeShare) / (a.inPlane * a.face.wallM * edge.lengthM) +
      (edge.acrossB * edgeShare) / (b.inPlane * b.face.wallM * edge.lengthM);
    for (const side of ['inner', 'outer'] as const) {
      builder.resistance(
        `edge.${edge.a}-${edge.b}.${side}`,
        `face.${edge.a}.${side}`,
        `face.${edge.b}.${side}`,
        2 * resistance,
      );
    }
  }
}

/** Sun on one face, met squarely: α G τ A into its outside. */
function compileSun(builder: NetworkBuilder, scenario: ResolvedScenario, models: Record<FaceName, FaceModel>): void {
  const { sun } = scenario;
  if (sun === null) return;
  const absorbed = (name: FaceName) =>
    models[name].face.open
      ? models[name].face.solarAbsorptance * models[name].outerAreaM2 * sun.irradianceWPerM2 * sun.glazingTransmittance
      : 0;
  const onto =
    sun.onto === 'worst'
      ? faceNames.reduce((best, name) => (absorbed(name) > absorbed(best) ? name : best), 'top')
      : sun.onto;
  if (absorbed(onto) > 0) builder.addHeat(`face.${onto}.outer`, absorbed(onto));
}

/** The free inside of each face: what plates, parts and close boards leave of it. */
export function interiorFaces(
  assembly: ResolvedAssembly,
  models: Record<FaceName, FaceModel>,
  coveredM2: Record<FaceName, number>,
): Surface[] {
  const { up } = assembly.document.housing.pose;
  return faceNames.flatMap((name) => {
    const model = models[name];
    const areaM2 = model.innerAreaM2 - coveredM2[name];
    if (areaM2 <= 1e-9) return [];
    return [
      {
        id: `face.${name}.inside`,
        node: `face.${name}.inner`,
        areaM2,
        facing: turned(outsideFacing(name, up)),
        sizeM: model.innerSizeM,
        verticalM: verticalExtent(name, up, model.innerSizeM),
        emissivity: model.face.emissivityInside,
      },
    ];
  });
}
