import type { FaceName } from '../../../shared/schemas/assembly.js';
import type { NetworkSource } from '../../../shared/schemas/network.js';
import { spreadingLeeSongAuMoran } from '../conduction/spreading.js';
import { cellAirConductivity } from '../conduction/printed-wall.js';
import type { NetworkBuilder } from './builder.js';
import { faceLabel, type FaceModel } from './compile-housing.js';
import { bodyEmissivity, spreadingFilm } from './defaults.js';
import { outsideFacing, turned, verticalExtent } from './geometry.js';
import type { ResolvedAssembly, ResolvedCarrier, ResolvedPart } from './resolved.js';
import type { Surface } from './surfaces.js';

/** Up to this stand-off the air under a board stands still and conducts [m]; common practice. */
const stillGapM = 0.01;

/**
 * The reading of an outside hot spot lies between two computed nodes: T = T_outer + β (T_peak − T_outer). Two resistances this
 * large take that mean without moving any heat worth naming (10 µW at 100 K) [K/W].
 */
const readingKPerW = 1e7;

interface Context {
  builder: NetworkBuilder;
  assembly: ResolvedAssembly;
  models: Record<FaceName, FaceModel>;
  covered: Record<FaceName, number>;
  surfaces: Surface[];
}

/**
 * Joins a source of the given contact area to the inside of a face: joint, hottest spot, spreading in the wall. The wall
 * conducts differently through and along itself: stretching its thickness by √(k∥/k⊥) makes it isotropic with √(k∥ k⊥).
 * `even`: the source is a plate that evens out its own temperature, so that its mean speaks for all of it.
 */
function joinToFace(
  context: Context,
  from: string,
  id: string,
  label: string,
  face: FaceName,
  areaM2: number,
  jointKM2PerW: number,
  even: boolean,
) {
  const { builder, models } = context;
  const model = models[face];
  const spreading = spreadingLeeSongAuMoran({
    sourceArea: areaM2,
    plateArea: model.innerAreaM2,
    thickness: model.face.wallM * Math.sqrt(model.inPlane / model.through),
    conductivity: Math.sqrt(model.inPlane * model.through),
    filmCoefficient: spreadingFilm,
  });
  const peak = `face.${face}.peak.${id}`;
  const hotSpot = `face.${face}.hotSpot.${id}`;
  builder.node(peak, 'spot', `${faceLabel(face)}, inside, under ${label}`);
  builder.node(hotSpot, 'spot', `${faceLabel(face)}, outside, over ${label}`);
  builder.resistance(`${id}.joint`, from, peak, jointKM2PerW / areaM2);
  builder.resistance(`${id}.spreading`, peak, `face.${face}.inner`, even ? spreading.mean : spreading.peak);
  const share = Math.min(Math.max(spreading.farSideShare, 1e-6), 1 - 1e-6);
  builder.resistance(`${id}.reading.inner`, peak, hotSpot, readingKPerW * (1 - share));
  builder.resistance(`${id}.reading.outer`, hotSpot, `face.${face}.outer`, readingKPerW * share);
}

/** “Plate”, or “Plate lid” where the id says more. */
function carrierLabel(carrier: ResolvedCarrier): string {
  const kind = carrier.kind === 'plate' ? 'Plate' : 'Board';
  return carrier.id.toLowerCase() === carrier.kind ? kind : `${kind} ${carrier.id}`;
}

function compileCarrier(context: Context, carrier: ResolvedCarrier, partsAreaM2: number): void {
  const { builder, assembly, models, covered, surfaces } = context;
  const { up } = assembly.document.housing.pose;
  const node = `carrier.${carrier.id}.mean`;
  const areaM2 = carrier.sizeM[0] * carrier.sizeM[1];
  builder.node(node, 'carrier', carrierLabel(carrier), {
    capacityJPerK: carrier.capacityJPerK,
  });
  const inward = turned(outsideFacing(carrier.face, up));
  const surface = {
    node,
    sizeM: carrier.sizeM,
    verticalM: verticalExtent(carrier.face, up, carrier.sizeM),
    emissivity: carrier.emissivity,
  };
  surfaces.push({
    ...surface,
    id: `carrier.${carrier.id}.free`,
    areaM2: Math.max(areaM2 - partsAreaM2, 0),
    facing: inward,
  });
  if (carrier.kind === 'plate') {
    covered[carrier.face] += areaM2;
    joinToFace(
      context,
      node,
      carrier.id,
      carrierLabel(carrier).toLowerCase(),
      carrier.face,
      areaM2,
      carrier.jointKM2PerW,
      true,
    );
    return;
  }
  if (carrier.standOffM > stillGapM) {
    surfaces.push({ ...surface, id: `carrier.${carrier.id}.back`, areaM2, facing: turned(inward) });
    return;
  }
  covered[carrier.face] += Math.min(areaM2, models[carrier.face].innerAreaM2);
  const to = `face.${carrier.face}.inner`;
  builder.link({
    id: `carrier.${carrier.id}.gap`,
    kind: 'conduction',
    from: node,
    to,
    conductivityWPerMK: cellAirConductivity,
    areaM2,
    lengthM: carrier.standOffM,
  });
  builder.link({
    id: `carrier.${carrier.id}.gap.radiation`,
    kind: 'radiation',
    from: node,
    to,
    areaM2,
    emissivity: carrier.emissivity,
    emissivityTo: models[carrier.face].face.emissivityInside,
  });
}

function sourceOf(part: ResolvedPart, models: Record<FaceName, FaceModel>): NetworkSource | undefined {
  const { electrical } = part.type;
  const supply = part.supply ?? undefined;
  if (electrical.kind === 'led') {
    const total = Object.values(models).reduce((sum, model) => sum + model.innerAreaM2, 0);
    return {
      kind: 'led',
      supply,
      voltageV: electrical.voltageV.value,
      atCurrentA: electrical.atCurrentA.value,
      atC: electrical.atC.value,
      differentialOhm: electrical.differentialOhm.value,
      voltagePerK: electrical.voltagePerK.value,
      efficiency: electrical.efficiency.value,
      efficiencyPerK: electrical.efficiencyPerK.value,
      efficiencyPerA: electrical.efficiencyPerA.value,
      wiringOhm: 0,
      light: Object.values(models).map((model) => ({
        node: `face.${model.face.name}.inner`,
        share: (part.lightKeptShare * model.innerAreaM2) / total,
      })),
    };
  }
  if (electrical.kind === 'resistor') {
    return {
      kind: 'resistor',
      supply,
      resistanceOhm: electrical.resistanceOhm.value,
      perK: electrical.perK.value,
      atC: electrical.atC.value,
      count: part.count,
      arrangement: part.arrangement,
    };
  }
  if (electrical.kind === 'converter') {
    return {
      kind: 'converter',
      supply,
      outputV: electrical.outputV.value,
      efficiency: electrical.efficiency.value,
      quiescentW: electrical.quiescentW.value,
    };
  }
  return undefined;
}

/**
 * Resistance from the heat-making spot to the mounting face, referred to the heat [K/W]: an array’s resistance given on
 * electrical power is divided by the share that becomes heat (JESD51-51). A bank’s elements stand in parallel.
 */
function internalResistance(part: ResolvedPart): number {
  const { thermal, electrical } = part.type;
  const onHeat =
    thermal.refersTo === 'electrical-power' && electrical.kind === 'led' ? 1 / (1 - electrical.efficiency.value) : 1;
  return (thermal.internalKPerW.value * onHeat) / part.count;
}

function compilePart(context: Context, part: ResolvedPart): void {
  const { builder, assembly, models, covered, surfaces } = context;
  const [u, v] = part.type.footprintM.value;
  const height = part.type.heightM.value;
  const areaM2 = u * v * part.count;
  const junction = `part.${part.id}.junction`;
  const body = `part.${part.id}.case`;
  builder.node(junction, 'junction', `${part.label}, hottest inside`, {
    heatW: part.type.electrical.kind === 'heat' ? part.heatW : undefined,
    source: sourceOf(part, models),
  });
  builder.node(body, 'case', `${part.label}, body`, {
    capacityJPerK: part.type.thermal.capacityJPerK.value * part.count,
  });
  builder.resistance(`part.${part.id}.internal`, junction, body, internalResistance(part));

  const carrier = assembly.carriers.find((c) => part.on.kind === 'carrier' && c.id === part.on.carrier);
  const face = part.on.kind === 'face' ? part.on.face : (carrier?.face ?? 'bottom');
  const { up } = assembly.document.housing.pose;
  const inward = turned(outsideFacing(face, up));
  const emissivity = bodyEmissivity;
  surfaces.push(
    {
      id: `part.${part.id}.top`,
      node: body,
      areaM2,
      facing: inward,
      sizeM: [u, v],
      verticalM: Math.max(u, v),
      emissivity,
    },
    {
      id: `part.${part.id}.sides`,
      node: body,
      areaM2: 2 * (u + v) * height * part.count,
      facing: 'sideways',
      sizeM: [u, height],
      verticalM: inward === 'sideways' ? Math.max(u, v) : height,
      emissivity,
    },
  );
  if (!carrier) {
    covered[face] += areaM2;
    joinToFace(context, body, part.id, part.label, face, areaM2, part.jointKM2PerW, false);
    return;
  }
  const spreading = spreadingLeeSongAuMoran({
    sourceArea: areaM2,
    plateArea: carrier.sizeM[0] * carrier.sizeM[1],
    thickness: carrier.thicknessM * Math.sqrt(carrier.inPlane / carrier.through),
    conductivity: Math.sqrt(carrier.inPlane * carrier.through),
    filmCoefficient: spreadingFilm,
  });
  const peak = `carrier.${carrier.id}.peak.${part.id}`;
  builder.node(peak, 'spot', `${carrierLabel(carrier)} under ${part.label}`);
  builder.resistance(`${part.id}.joint`, body, peak, part.jointKM2PerW / areaM2);
  builder.resistance(`${part.id}.spreading`, peak, `carrier.${carrier.id}.mean`, spreading.peak);
}

/** Carriers and parts; returns the surfaces they show to the inside air, and what they cover of each face. */
export function compileParts(
  builder: NetworkBuilder,
  assembly: ResolvedAssembly,
  models: Record<FaceName, FaceModel>,
): { surfaces: Surface[]; covered: Record<FaceName, number> } {
  const context: Context = {
    builder,
    assembly,
    models,
    covered: { top: 0, bottom: 0, front: 0, back: 0, left: 0, right: 0 },
    surfaces: [],
  };
  for (const carrier of assembly.carriers) {
    const partsArea = assembly.parts.reduce(
      (sum, part) =>
        part.on.kind === 'carrier' && part.on.carrier === carrier.id
          ? sum + part.count * part.type.footprintM.value[0] * part.type.footprintM.value[1]
          : sum,
      0,
    );
    compileCarrier(context, carrier, partsArea);
  }
  for (const part of assembly.parts) compilePart(context, part);
  return { surfaces: context.surfaces.filter((surface) => surface.areaM2 > 1e-9), covered: context.covered };
}
