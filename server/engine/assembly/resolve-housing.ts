import {
  faceNames,
  type AssemblyDocument,
  type FaceName,
  type Housing,
  type PrintSettings,
  type Wall,
} from '../../../shared/schemas/assembly.js';
import type { Material } from '../../../shared/schemas/material.js';
import type { PrintedWall } from '../conduction/printed-wall.js';
import type { Assumptions } from './assumptions.js';
import { defaults, typicalPolymer, unknownPolymer } from './defaults.js';
import { opposite } from './geometry.js';
import { lookUp } from '../tables.js';
import { contentOf } from './inline-values.js';
import type { Faces, ResolvedFace } from './resolved.js';

/** Temperature at which walls’ conductivities are taken [°C]. */
export const wallReferenceC = 50;

/** True for materials that soften rather than melt late. */
export function isPolymer(material: Material): boolean {
  return material.group === 'print-polymer' || material.group === 'moulding-polymer';
}

function solarPreset(material: Material) {
  return { ...defaults.solarAbsorptance, label: `Solar absorptance of ${material.name}` };
}

function emissivityPreset(material: Material) {
  if (isPolymer(material)) return defaults.emissivityPolymer;
  return material.group === 'metal' ? defaults.emissivityMetal : defaults.emissivityOther;
}

/** Emissivity of a surface whose finish may not be known. */
export function resolveEmissivity(
  finish: Wall['finishOutside'],
  material: Material,
  path: string,
  side: string,
  assumptions: Assumptions,
): number {
  const known = finish === null ? null : contentOf(finish, path).emissivity.value;
  const preset = emissivityPreset(material);
  return assumptions.fill(known, path, `${preset.label} ${side}`, { ...preset, label: `${preset.label}, ${side}` });
}

function resolvePrint(
  print: PrintSettings,
  face: FaceName,
  wallM: number,
  material: Material,
  path: string,
  assumptions: Assumptions,
): PrintedWall {
  const fill = <K extends 'perimeters' | 'lineWidthM' | 'layerHeightM' | 'closedLayers' | 'infillShare'>(key: K) =>
    assumptions.fill<number>(print[key], `${path}/${key}`, key, defaults[key]);
  const along = lookUp(material.conductivityWPerMK.value, wallReferenceC);
  const through = material.conductivityThroughLayersWPerMK
    ? lookUp(material.conductivityThroughLayersWPerMK.value, wallReferenceC)
    : along;
  const pattern = assumptions.fill<string>(print.pattern, `${path}/pattern`, 'pattern', defaults.pattern);
  const common = {
    thickness: wallM,
    perimeters: fill('perimeters'),
    lineWidth: fill('lineWidthM'),
    layerHeight: fill('layerHeightM'),
    closedLayers: fill('closedLayers'),
    infillShare: fill('infillShare'),
    pattern: pattern === 'ribs' ? ('ribs' as const) : ('cells' as const),
    alongLayers: along,
    throughLayers: through,
  };
  if (print.bedFace !== null) {
    return { ...common, parallelToBed: face === print.bedFace || face === opposite[print.bedFace] };
  }
  assumptions.note(`${path}/bedFace`, 'bedFace', defaults.bedFace);
  // Not knowing the direction: perimeters close the wall, heat crosses the layers.
  return assumptions.isTypical('bedFace')
    ? { ...common, parallelToBed: false }
    : { ...common, parallelToBed: false, alongLayers: through };
}

function resolveFace(
  document: AssemblyDocument,
  housing: Housing,
  name: FaceName,
  assumptions: Assumptions,
): ResolvedFace {
  const wall = housing.faces[name];
  const path = `/housing/faces/${name}`;
  const wallM = assumptions.fill<number>(wall.wallM, `${path}/wallM`, 'wallM', defaults.wallM);
  let material: Material;
  if (wall.material === null) {
    assumptions.note(`${path}/material`, 'material', defaults.material);
    material = assumptions.isTypical('material') ? typicalPolymer : unknownPolymer;
  } else {
    material = contentOf(wall.material, `${path}/material`);
  }
  const finish = wall.finishOutside === null ? null : contentOf(wall.finishOutside, `${path}/finishOutside`);
  const needsSun = document.scenarios.some((scenario) => scenario.sun !== null);
  const solarAbsorptance = needsSun
    ? assumptions.fill<number>(
        finish?.solarAbsorptance.value,
        `${path}/finishOutside`,
        `solar ${material.slug}`,
        solarPreset(material),
      )
    : (finish?.solarAbsorptance.value ?? defaults.solarAbsorptance.cautious);
  const loadState = isPolymer(material)
    ? assumptions.fill<string>(wall.loadState, `${path}/loadState`, 'loadState', defaults.loadState)
    : 'free';
  return {
    name,
    path,
    wallM,
    material,
    printed: wall.print === null ? null : resolvePrint(wall.print, name, wallM, material, `${path}/print`, assumptions),
    emissivityOutside: resolveEmissivity(wall.finishOutside, material, `${path}/finishOutside`, 'outside', assumptions),
    emissivityInside: resolveEmissivity(wall.finishInside, material, `${path}/finishInside`, 'inside', assumptions),
    solarAbsorptance,
    exposure: wall.exposure,
    loadState: loadState as ResolvedFace['loadState'],
  };
}

/** All six faces with every value known; `null` for an open assembly. */
export function resolveFaces(document: AssemblyDocument, assumptions: Assumptions): Faces | null {
  const { housing } = document;
  if (housing === null) return null;
  return Object.fromEntries(
    faceNames.map((name) => [name, resolveFace(document, housing, name, assumptions)]),
  ) as Faces;
}
