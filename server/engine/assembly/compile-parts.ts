import type { NetworkSource } from '../../../shared/schemas/network.js';
import type { NetworkBuilder } from './builder.js';
import { carrierLabel, carrierSurfaces, gridOfCarrier } from './compile-carriers.js';
import { faceLabel, faceSurface, gridOfFace, type BoxModel } from './box.js';
import { bodyEmissivity } from './defaults.js';
import { meetOpenRoom } from './outside.js';
import type { ResolvedAssembly, ResolvedPart, ResolvedScenario } from './resolved.js';
import type { Surface } from './surfaces.js';

/** Least resistance of a joint [K m²/W]. */
const leastJoint = 1e-7;

function lightTargets(part: ResolvedPart, box: BoxModel | null): { node: string; share: number }[] {
  if (part.lightKeptShare === 0) return [];
  // In the open all light leaves but what the carrier keeps.
  if (!box) return part.on.kind === 'carrier' ? [{ node: `part.${part.id}.case`, share: part.lightKeptShare }] : [];
  const models = Object.values(box.models);
  const total = models.reduce((sum, model) => sum + model.innerAreaM2, 0);
  return models.map((model) => ({
    node: `face.${model.face.name}.inner`,
    share: (part.lightKeptShare * model.innerAreaM2) / total,
  }));
}

function sourceOf(part: ResolvedPart, box: BoxModel | null): NetworkSource | undefined {
  const { electrical } = part.type;
  const supply = part.supply ?? undefined;
  if (electrical.kind === 'led') {
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
      light: lightTargets(part, box),
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

/** Names of what a part stands on: the grid, the mean under it, its hottest spot. */
export function groundOf(part: ResolvedPart): { grid: string; under: string; peak: string } {
  const grid = part.on.kind === 'face' ? gridOfFace(part.on.face) : gridOfCarrier(part.on.carrier);
  return { grid, under: `${grid}.under.${part.id}`, peak: `${grid}.peak.${part.id}` };
}

/** Top and sides of a part’s body. */
function bodySurfaces(part: ResolvedPart, tiltDeg: number): Surface[] {
  const [u, v] = part.type.footprintM.value;
  const height = part.type.heightM.value;
  const of = { node: `part.${part.id}.case` };
  const upright = Math.abs(tiltDeg - 90) < 45;
  return [
    {
      id: `part.${part.id}.top`,
      of,
      areaM2: u * v * part.count,
      tiltDeg,
      slopeM: [Math.max(u, v), Math.min(u, v)] as const,
      emissivity: bodyEmissivity,
    },
    {
      id: `part.${part.id}.sides`,
      of,
      areaM2: 2 * (u + v) * height * part.count,
      tiltDeg: 90,
      slopeM: upright ? ([Math.max(u, v), height] as const) : ([height, Math.max(u, v)] as const),
      emissivity: bodyEmissivity,
    },
  ].filter((surface) => surface.areaM2 > 1e-9);
}

/** Parts; returns the surfaces that they show to the inside of the box. */
export function compileParts(
  builder: NetworkBuilder,
  assembly: ResolvedAssembly,
  box: BoxModel | null,
  scenario: ResolvedScenario,
): Surface[] {
  return assembly.parts.flatMap((part) => {
    const junction = `part.${part.id}.junction`;
    const body = `part.${part.id}.case`;
    builder.node(junction, 'junction', `${part.label}, hottest inside`, {
      heatW: part.type.electrical.kind === 'heat' ? part.heatW : undefined,
      source: sourceOf(part, box),
    });
    builder.node(body, 'case', `${part.label}, body`, {
      capacityJPerK: part.type.thermal.capacityJPerK.value * part.count,
    });
    builder.resistance(`part.${part.id}.internal`, junction, body, internalResistance(part));

    const { grid, under, peak } = groundOf(part);
    const carrier = assembly.carriers.find(({ id }) => part.on.kind === 'carrier' && id === part.on.carrier);
    const ground = carrier
      ? carrierLabel(carrier)
      : part.on.kind === 'face'
        ? `${faceLabel(part.on.face)}, inside,`
        : '';
    const { xM, yM } = part.at;
    const rectangle = { xM, yM, sizeM: [...part.at.sizeM] as [number, number] };
    builder.node(under, 'spot', `${ground} under ${part.label}, mean`);
    builder.gridOf(grid).patches.push({ node: under, side: 'near', ...rectangle });
    builder.reading(
      grid,
      { id: peak, side: 'near', what: 'peak', over: rectangle },
      'spot',
      `${ground} under ${part.label}, hottest`,
    );
    const area = part.at.sizeM[0] * part.at.sizeM[1];
    builder.resistance(`${part.id}.joint`, body, under, Math.max(part.jointKM2PerW, leastJoint) / area);

    const tiltDeg =
      part.on.kind === 'face' && box
        ? faceSurface(box, part.on.face, 'inside', scenario).tiltDeg
        : carrier
          ? carrierSurfaces(carrier, scenario).near.tiltDeg
          : 0;
    const surfaces = bodySurfaces(part, tiltDeg);
    if (box) return surfaces;
    for (const surface of surfaces) meetOpenRoom(builder, surface, scenario);
    return [];
  });
}
