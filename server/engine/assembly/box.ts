import { faceNames, type FaceName } from '../../../shared/schemas/assembly.js';
import { printedWallConductivity, type WallBand } from '../conduction/printed-wall.js';
import { lookUp } from '../tables.js';
import { faceSize, innerSize } from './geometry.js';
import { normalOf, slopeExtents, tiltOf } from './pose.js';
import { wallReferenceC } from './resolve-housing.js';
import type { Faces, ResolvedAssembly, ResolvedFace, ResolvedScenario } from './resolved.js';
import type { Surface } from './surfaces.js';

export interface FaceModel {
  face: ResolvedFace;
  /** Conductivities of the wall as made [W/(m K)]. */
  through: number;
  inPlane: number;
  innerSizeM: [number, number];
  innerAreaM2: number;
  outerAreaM2: number;
  /** True where something that makes or brings heat is joined to it: then it is divided into cells. */
  gridded: boolean;
}

export type FaceModels = Record<FaceName, FaceModel>;

/** A box with its walls as made. */
export interface BoxModel {
  assembly: ResolvedAssembly;
  outerM: [number, number, number];
  innerM: [number, number, number];
  faces: Faces;
  models: FaceModels;
}

/** “top”, as a reader names it. */
export function faceLabel(face: FaceName): string {
  return `${face.charAt(0).toUpperCase()}${face.slice(1)} face`;
}

export function gridOfFace(face: FaceName): string {
  return `face.${face}`;
}

export function wallConductivity(face: ResolvedFace, band: WallBand): { through: number; inPlane: number } {
  if (face.printed) return printedWallConductivity(face.printed, band);
  const along = lookUp(face.material.conductivityWPerMK.value, wallReferenceC);
  return { through: along, inPlane: along };
}

/** `null` for an open assembly. */
export function boxModel(assembly: ResolvedAssembly, band: WallBand): BoxModel | null {
  const { box } = assembly;
  if (!box) return null;
  const { faces, housing } = box;
  const wallM = Object.fromEntries(faceNames.map((name) => [name, faces[name].wallM])) as Record<FaceName, number>;
  const innerM = innerSize(housing.outerM, wallM);
  const models = Object.fromEntries(
    faceNames.map((name) => {
      const innerSizeM = faceSize(name, innerM);
      const [u, v] = faceSize(name, housing.outerM);
      const model: FaceModel = {
        face: faces[name],
        ...wallConductivity(faces[name], band),
        innerSizeM,
        innerAreaM2: innerSizeM[0] * innerSizeM[1],
        outerAreaM2: u * v,
        gridded:
          assembly.parts.some(({ on }) => on.kind === 'face' && on.face === name) ||
          assembly.carriers.some(({ face, kind }) => face === name && kind !== 'board'),
      };
      return [name, model];
    }),
  ) as FaceModels;
  return { assembly, outerM: housing.outerM, innerM, faces, models };
}

/** The inside and the outside of a face as surfaces. */
export function faceSurface(
  box: BoxModel,
  name: FaceName,
  side: 'inside' | 'outside',
  scenario: ResolvedScenario,
): Surface {
  const model = box.models[name];
  const inside = side === 'inside';
  const tilt = tiltOf(normalOf(name), scenario.up);
  return {
    id: `face.${name}.${side}`,
    of: model.gridded
      ? { grid: gridOfFace(name), side: inside ? 'near' : 'far' }
      : { node: `face.${name}.${inside ? 'inner' : 'outer'}` },
    areaM2: inside ? model.innerAreaM2 : model.outerAreaM2,
    tiltDeg: inside ? 180 - tilt : tilt,
    slopeM: slopeExtents(name, scenario.up, inside ? model.innerSizeM : faceSize(name, box.outerM)),
    emissivity: inside ? model.face.emissivityInside : model.face.emissivityOutside,
  };
}
