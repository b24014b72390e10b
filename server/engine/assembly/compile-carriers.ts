import { cellAirConductivity } from '../conduction/printed-wall.js';
import type { NetworkBuilder } from './builder.js';
import { faceLabel, gridOfFace, type BoxModel } from './box.js';
import { meetOpenRoom } from './outside.js';
import { normalOf, slopeExtents, tiltOf } from './pose.js';
import type { Fins, ResolvedCarrier, ResolvedScenario } from './resolved.js';
import { conductTo, radiateTo, type Surface } from './surfaces.js';

/** Up to this stand-off the air under a board stands still and conducts [m]; common practice. */
const stillGapM = 0.01;
/** Least specific resistance of a joint: what is taken as “none” [K m²/W]. */
const leastJoint = 1e-7;

export function gridOfCarrier(id: string): string {
  return `carrier.${id}`;
}

/** “Plate”, or “Plate lid” where the id says more. */
export function carrierLabel(carrier: ResolvedCarrier): string {
  const kind = { plate: 'Plate', board: 'Board', fins: 'Heat sink' }[carrier.kind];
  return carrier.id.toLowerCase() === carrier.kind ? kind : `${kind} ${carrier.id}`;
}

/** Which way the side with the parts looks [°], and its extents along and across the slope [m]. */
function orientation(
  carrier: ResolvedCarrier,
  scenario: ResolvedScenario,
): { tiltDeg: number; slopeM: [number, number] } {
  const { sizeM } = carrier.at;
  if (carrier.face === null) {
    const tiltDeg = { up: 0, down: 180, sideways: 90 }[carrier.facing];
    // In the open y points up the drawing.
    return { tiltDeg, slopeM: [sizeM[1], sizeM[0]] };
  }
  const outward = tiltOf(normalOf(carrier.face), scenario.up);
  return { tiltDeg: 180 - outward, slopeM: slopeExtents(carrier.face, scenario.up, sizeM) };
}

/** Both sides of a carrier as surfaces: the near one bears the parts. */
export function carrierSurfaces(carrier: ResolvedCarrier, scenario: ResolvedScenario): { near: Surface; far: Surface } {
  const { tiltDeg, slopeM } = orientation(carrier, scenario);
  const area = carrier.at.sizeM[0] * carrier.at.sizeM[1];
  const grid = gridOfCarrier(carrier.id);
  const common = { slopeM, emissivity: carrier.emissivity, areaM2: area };
  return {
    near: { ...common, id: `carrier.${carrier.id}.free`, of: { grid, side: 'near' }, tiltDeg },
    far: { ...common, id: `carrier.${carrier.id}.back`, of: { grid, side: 'far' }, tiltDeg: 180 - tiltDeg },
  };
}

/** The fins on a base, and what they radiate: the open fronts of the grooves as grey cavities, and the outer sides of the outer fins. */
function compileFins(
  builder: NetworkBuilder,
  carrier: ResolvedCarrier,
  fins: Fins,
  far: Surface,
  scenario: ResolvedScenario,
): void {
  const [x, y] = carrier.at.sizeM;
  const [width, length] = fins.along === 'y' ? [x, y] : [y, x];
  // Fins along the slope stand upright with it; across it, or on a level base, the air cannot rise through them.
  const alongSlope = carrier.face === null ? fins.along === 'y' : far.slopeM[0] === length;
  const level = far.tiltDeg < 45 || far.tiltDeg > 135;
  const lean = Math.abs(far.tiltDeg - 90);
  if (level || !alongSlope) {
    builder.warnings.push({
      code: 'fins-not-upright',
      node: gridOfCarrier(carrier.id),
      message: `The fins of ${carrierLabel(carrier)} do not stand upright: only their outline is taken as cooled`,
    });
    meetOpenRoom(builder, far, scenario);
    return;
  }
  builder.gridOf(gridOfCarrier(carrier.id)).surfaces.push({
    id: `carrier.${carrier.id}.fins`,
    side: 'far',
    to: 'ambient',
    kind: 'fin-array',
    baseWidthM: width,
    baseHeightM: length,
    finHeightM: fins.heightM,
    finThicknessM: fins.thicknessM,
    finCount: fins.count,
    conductivityWPerMK: fins.conductivity,
    tiltDeg: lean,
  });
  const gap = (width - fins.count * fins.thicknessM) / (fins.count - 1);
  const front = (fins.count - 1) * gap * length;
  const cavity = front + 2 * (fins.count - 1) * fins.heightM * length;
  const { emissivity } = carrier;
  const apparent = emissivity / (emissivity + (1 - emissivity) * (front / cavity));
  const radiating = front * apparent + (fins.count * fins.thicknessM + 2 * fins.heightM) * length * emissivity;
  if (emissivity > 0) {
    radiateTo(builder, far, 'surroundings', { areaFactor: radiating / (far.areaM2 * emissivity) });
  }
}

/** A carrier in the open: both its sides meet the room. */
function compileOpen(builder: NetworkBuilder, carrier: ResolvedCarrier, scenario: ResolvedScenario): Surface[] {
  const { near, far } = carrierSurfaces(carrier, scenario);
  meetOpenRoom(builder, near, scenario);
  if (carrier.fins) compileFins(builder, carrier, carrier.fins, far, scenario);
  else meetOpenRoom(builder, far, scenario);
  return [];
}

/** A plate or the base of a heat sink, joined cell to cell to its face. */
function joinToFace(builder: NetworkBuilder, carrier: ResolvedCarrier): void {
  const face = carrier.face as NonNullable<typeof carrier.face>;
  const outside = carrier.kind === 'fins';
  const label = carrierLabel(carrier);
  const over = { xM: carrier.at.xM, yM: carrier.at.yM, sizeM: [...carrier.at.sizeM] as [number, number] };
  builder.gridOf(gridOfFace(face)).joins.push({
    id: `${carrier.id}.joint`,
    side: outside ? 'far' : 'near',
    grid: gridOfCarrier(carrier.id),
    gridSide: outside ? 'near' : 'far',
    xM: carrier.at.xM,
    yM: carrier.at.yM,
    resistanceKM2PerW: Math.max(carrier.jointKM2PerW, leastJoint),
    emissivity: 0,
  });
  if (outside) return;
  const under = `${faceLabel(face)}, inside, under ${label.charAt(0).toLowerCase()}${label.slice(1)}`;
  builder.reading(
    gridOfFace(face),
    { id: `face.${face}.mean.${carrier.id}`, side: 'near', what: 'mean', over },
    'spot',
    `${under}, mean`,
  );
  builder.reading(
    gridOfFace(face),
    { id: `face.${face}.peak.${carrier.id}`, side: 'near', what: 'peak', over },
    'spot',
    `${under}, hottest`,
  );
}

/** A board over a face: open behind where it stands off far enough, else across still air. */
function standOff(builder: NetworkBuilder, carrier: ResolvedCarrier, box: BoxModel, far: Surface): Surface[] {
  const face = carrier.face as NonNullable<typeof carrier.face>;
  if (carrier.standOffM > stillGapM) return [far];
  const model = box.models[face];
  const emissivity = 1 / (1 / Math.max(carrier.emissivity, 1e-6) + 1 / Math.max(model.face.emissivityInside, 1e-6) - 1);
  const id = `carrier.${carrier.id}.gap`;
  if (model.gridded) {
    builder.gridOf(gridOfFace(face)).joins.push({
      id,
      side: 'near',
      grid: gridOfCarrier(carrier.id),
      gridSide: 'far',
      xM: carrier.at.xM,
      yM: carrier.at.yM,
      resistanceKM2PerW: carrier.standOffM / cellAirConductivity,
      emissivity,
    });
    return [];
  }
  const to = `face.${face}.inner`;
  conductTo(builder, far, to, cellAirConductivity / carrier.standOffM, id);
  radiateTo(builder, far, to, { emissivity, id: `${id}.radiation` });
  return [];
}

/** Area of a face’s inside that plates and close boards cover, beyond what its own grid knows [m²]. */
export function coveredByBoards(
  carriers: readonly ResolvedCarrier[],
  box: BoxModel,
  face: keyof BoxModel['models'],
): number {
  if (box.models[face].gridded) return 0;
  return carriers
    .filter((carrier) => carrier.face === face && carrier.kind === 'board' && carrier.standOffM <= stillGapM)
    .reduce((sum, { at }) => sum + at.sizeM[0] * at.sizeM[1], 0);
}

/**
 * The carriers as grids, with what joins them to their faces or to the room.
 *
 * @returns the surfaces that they show to the inside of the box
 */
export function compileCarriers(
  builder: NetworkBuilder,
  carriers: readonly ResolvedCarrier[],
  box: BoxModel | null,
  scenario: ResolvedScenario,
): Surface[] {
  return carriers.flatMap((carrier) => {
    const id = gridOfCarrier(carrier.id);
    const label = carrierLabel(carrier);
    builder.grid({
      id,
      sizeM: [...carrier.at.sizeM],
      layers: carrier.layers,
      zones: carrier.zones.map(({ xM, yM, sizeM, layers }) => ({ xM, yM, sizeM: [...sizeM], layers })),
    });
    builder.reading(id, { id: `${id}.mean`, side: 'near', what: 'mean' }, 'carrier', `${label}, mean`);
    if (!box || carrier.face === null) return compileOpen(builder, carrier, scenario);
    const { near, far } = carrierSurfaces(carrier, scenario);
    if (carrier.kind === 'board') return [near, ...standOff(builder, carrier, box, far)];
    joinToFace(builder, carrier);
    if (carrier.kind === 'plate') return [near];
    // Outside the box: its far side is what the room sees.
    const outward = {
      ...far,
      slopeM: slopeExtents(carrier.face, scenario.up, carrier.at.sizeM),
      tiltDeg: 180 - near.tiltDeg,
    };
    if (carrier.fins) compileFins(builder, carrier, carrier.fins, outward, scenario);
    return [];
  });
}
