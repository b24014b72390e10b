import { faceNames, type FaceName } from '../../../shared/schemas/assembly.js';
import { finestCell } from '../grid/mesh.js';
import { faceLabel, gridOfFace, wallConductivity, type BoxModel } from './box.js';
import { cellFilm, type NetworkBuilder } from './builder.js';
import { edgeTowards, edges, faceSize } from './geometry.js';
import { meetRoom } from './outside.js';
import { insideOf } from './resolve-parts.js';
import type { ResolvedAssembly, ResolvedScenario } from './resolved.js';

/**
 * Share of a face’s extent, from the edge, over which the mean of its temperature stands for heat that comes over that
 * edge and is lost evenly: one third (a fin that loses heat evenly: T_edge − T_mean = q l/(3 k t w)).
 */
const edgeShare = 1 / 3;

function compileWall(builder: NetworkBuilder, box: BoxModel, name: FaceName): void {
  const model = box.models[name];
  const { face } = model;
  const perVolume = face.material.densityKgPerM3.value * face.material.specificHeatJPerKgK.value;
  const inner = `face.${name}.inner`;
  const outer = `face.${name}.outer`;
  if (!model.gridded) {
    const conductionArea = Math.sqrt(model.innerAreaM2 * model.outerAreaM2);
    const half = (conductionArea * face.wallM * perVolume) / 2;
    builder.node(inner, 'face', `${faceLabel(name)}, inside`, { capacityJPerK: half });
    builder.node(outer, 'face', `${faceLabel(name)}, outside`, { capacityJPerK: half });
    builder.link({
      id: `face.${name}.wall`,
      kind: 'conduction',
      from: inner,
      to: outer,
      conductivityWPerMK: model.through,
      areaM2: conductionArea,
      lengthM: face.wallM,
    });
    return;
  }
  builder.node(inner, 'face', `${faceLabel(name)}, inside, mean of what is bare`);
  builder.node(outer, 'face', `${faceLabel(name)}, outside, mean`);
  const { housing } = box.assembly.box as NonNullable<ResolvedAssembly['box']>;
  const inside = insideOf(name, housing, box.faces);
  builder.grid({
    id: gridOfFace(name),
    sizeM: faceSize(name, box.outerM),
    layers: [
      {
        thicknessM: face.wallM,
        inPlaneWPerMK: model.inPlane,
        throughWPerMK: model.through,
        heatCapacityJPerM3K: perVolume,
      },
    ],
    // The same cells for every end of the printed-wall band.
    finestCellM: finestCell({
      layers: [{ thicknessM: face.wallM, inPlaneWPerMK: wallConductivity(face, 'mid').inPlane, throughWPerMK: 1 }],
      filmForCellsWPerM2K: cellFilm,
    }),
    nearWithinM: [inside.xM, inside.yM, inside.xM + inside.sizeM[0], inside.yM + inside.sizeM[1]],
    free: { near: inner, far: outer },
  });
  builder.reading(
    gridOfFace(name),
    { id: `face.${name}.mean`, side: 'near', what: 'mean' },
    'face',
    `${faceLabel(name)}, inside, mean of all`,
  );
  builder.reading(
    gridOfFace(name),
    { id: `face.${name}.hotSpot`, side: 'far', what: 'peak' },
    'spot',
    `${faceLabel(name)}, outside, hottest spot`,
  );
}

/** Nodes of the six faces, their walls, their outsides and the conduction round the edges. */
export function compileHousing(builder: NetworkBuilder, box: BoxModel, scenario: ResolvedScenario): void {
  for (const name of faceNames) compileWall(builder, box, name);
  compileEdges(builder, box);
  for (const name of faceNames) meetRoom(builder, box, name, scenario);
}

/** Conduction round the twelve edges: half of it between the insides and half between the outsides, or from cell to cell. */
function compileEdges(builder: NetworkBuilder, box: BoxModel): void {
  for (const edge of edges(box.outerM)) {
    const a = box.models[edge.a];
    const b = box.models[edge.b];
    const beyondA = (edge.acrossA * edgeShare) / (a.inPlane * a.face.wallM);
    const beyondB = (edge.acrossB * edgeShare) / (b.inPlane * b.face.wallM);
    if (a.gridded && b.gridded) {
      builder.gridOf(gridOfFace(edge.a)).edgeJoins.push({
        edge: edgeTowards(edge.a, edge.b),
        grid: gridOfFace(edge.b),
        gridEdge: edgeTowards(edge.b, edge.a),
      });
      continue;
    }
    if (a.gridded || b.gridded) {
      const [own, other, beyond] = a.gridded ? [edge.a, edge.b, beyondB] : [edge.b, edge.a, beyondA];
      builder.gridOf(gridOfFace(own)).edges.push({
        edge: edgeTowards(own, other),
        near: `face.${other}.inner`,
        far: `face.${other}.outer`,
        resistanceKMPerW: beyond,
      });
      continue;
    }
    for (const side of ['inner', 'outer'] as const) {
      builder.resistance(
        `edge.${edge.a}-${edge.b}.${side}`,
        `face.${edge.a}.${side}`,
        `face.${edge.b}.${side}`,
        (2 * (beyondA + beyondB)) / edge.lengthM,
      );
    }
  }
}
