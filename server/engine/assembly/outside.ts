import { faceNames, type FaceName } from '../../../shared/schemas/assembly.js';
import type { NetworkBuilder } from './builder.js';
import { faceLabel, faceSurface, type BoxModel } from './box.js';
import { dot, normalOf, slopeExtents, sunDirection } from './pose.js';
import type { ResolvedScenario } from './resolved.js';
import { conductTo, meetAir, radiateTo, type Surface } from './surfaces.js';

/** Emissivity of what covers a face (cloth, dust), common practice. */
const coverEmissivity = 0.9;

/** The room: its air, its surroundings and, where it is given, its sky. */
export function compileRoom(builder: NetworkBuilder, scenario: ResolvedScenario): void {
  builder.node('ambient', 'ambient', 'Room air', { fixedC: scenario.airC });
  builder.node('surroundings', 'surroundings', 'Surroundings', { fixedC: scenario.surroundingsC });
  if (scenario.skyC !== null) builder.node('sky', 'surroundings', 'Sky', { fixedC: scenario.skyC });
}

/** Convection to the room’s air and radiation to its surroundings; of what looks up, its share of the sky. */
export function meetOpenRoom(
  builder: NetworkBuilder,
  surface: Surface,
  scenario: ResolvedScenario,
  radiant = 'surroundings',
): void {
  meetAir(builder, surface, 'ambient', scenario.airSpeedMPerS);
  // View factor of a tilted plane to the half space above it.
  const sky =
    scenario.skyC === null || radiant !== 'surroundings' ? 0 : (1 + Math.cos((surface.tiltDeg * Math.PI) / 180)) / 2;
  if (sky < 1) radiateTo(builder, surface, radiant, { areaFactor: 1 - sky });
  if (sky > 1e-6) radiateTo(builder, surface, 'sky', { areaFactor: sky, id: `${surface.id}.sky` });
}

/** The outside of a face by what it meets. */
export function meetRoom(builder: NetworkBuilder, box: BoxModel, name: FaceName, scenario: ResolvedScenario): void {
  const surface = faceSurface(box, name, 'outside', scenario);
  const { exposure } = box.models[name].face;
  switch (exposure.kind) {
    case 'open':
      meetOpenRoom(builder, surface, scenario);
      return;
    case 'near': {
      const other = `near.${name}`;
      builder.node(other, 'surroundings', `Surface near the ${name} face`, { fixedC: exposure.surfaceC });
      meetOpenRoom(builder, surface, scenario, other);
      return;
    }
    case 'against-wall': {
      if (exposure.surfaceC === null) return;
      const other = `against.${name}`;
      builder.node(other, 'surroundings', `What the ${name} face is held against`, { fixedC: exposure.surfaceC });
      conductTo(builder, surface, other, 1 / exposure.jointKM2PerW, `${surface.id}.joint`);
      return;
    }
    case 'gap': {
      const other = `gap.${name}`;
      builder.node(other, 'surroundings', `Surface across the gap from the ${name} face`, {
        fixedC: exposure.surfaceC ?? scenario.surroundingsC,
      });
      crossGap(builder, surface, other, exposure.gapM);
      const emissivity = 1 / (1 / Math.max(surface.emissivity, 1e-6) + 1 / Math.max(exposure.emissivity, 1e-6) - 1);
      radiateTo(builder, surface, other, { emissivity });
      return;
    }
    case 'covered': {
      const cover = coverNode(name);
      builder.node(cover, 'face', `${faceLabel(name)}, outside of its cover`);
      conductTo(builder, surface, cover, 1 / exposure.layerKM2PerW, `${surface.id}.cover`);
      meetOpenRoom(
        builder,
        { ...surface, id: `face.${name}.cover`, of: { node: cover }, emissivity: coverEmissivity },
        scenario,
      );
      return;
    }
  }
}

function coverNode(name: FaceName): string {
  return `face.${name}.cover`;
}

/** A closed gap of air. Its law counts the tilt with 0 for a surface below its gap, which is one that looks up. */
function crossGap(builder: NetworkBuilder, surface: Surface, other: string, gapM: number): void {
  const common = { gapM, heightM: surface.slopeM[0], tiltDeg: surface.tiltDeg };
  const id = `${surface.id}.gap`;
  if ('grid' in surface.of) {
    builder.gridOf(surface.of.grid).surfaces.push({ id, side: surface.of.side, to: other, kind: 'air-gap', ...common });
    return;
  }
  builder.link({ id, kind: 'air-gap', from: surface.of.node, to: other, areaM2: surface.areaM2, ...common });
}

/** Faces that the sun reaches, with the share of their area that it meets squarely. */
function sunlitFaces(box: BoxModel, scenario: ResolvedScenario): { name: FaceName; share: number }[] {
  const { sun } = scenario;
  if (sun === null) return [];
  const reached = (name: FaceName) => ['open', 'near', 'covered'].includes(box.models[name].face.exposure.kind);
  const { direction } = sun;
  if (direction !== null) {
    const towards = sunDirection(direction, scenario.up);
    return faceNames
      .map((name) => ({ name, share: dot(normalOf(name), towards) }))
      .filter(({ name, share }) => share > 1e-9 && reached(name));
  }
  const absorbed = (name: FaceName) =>
    reached(name) ? box.models[name].face.solarAbsorptance * box.models[name].outerAreaM2 : 0;
  const onto =
    sun.onto === 'worst'
      ? faceNames.reduce((best, name) => (absorbed(name) > absorbed(best) ? name : best), 'top')
      : sun.onto;
  return reached(onto) ? [{ name: onto, share: 1 }] : [];
}

/** Sun: α G τ × the area that it meets squarely, into the outside or into what covers it. */
export function compileSun(builder: NetworkBuilder, box: BoxModel, scenario: ResolvedScenario): void {
  const { sun } = scenario;
  if (sun === null) return;
  for (const { name, share } of sunlitFaces(box, scenario)) {
    const { face, outerAreaM2 } = box.models[name];
    const heat = face.solarAbsorptance * outerAreaM2 * share * sun.irradianceWPerM2 * sun.glazingTransmittance;
    if (heat > 0) builder.addHeat(face.exposure.kind === 'covered' ? coverNode(name) : `face.${name}.outer`, heat);
  }
}

/** Outside extents of a face, for what is mounted there. */
export function outsideExtents(
  name: FaceName,
  size: readonly [number, number],
  scenario: ResolvedScenario,
): [number, number] {
  return slopeExtents(name, scenario.up, size);
}
