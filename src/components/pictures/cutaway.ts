import type { AssemblyDocumentInput, FaceName } from '../../../shared/schemas/assembly.js';
import { faceNames } from '../../../shared/schemas/assembly.js';
import type { Estimate } from '../../../shared/schemas/estimate.js';
import { elevation, type Elevation } from './elevation.js';

export interface CutawayBlock {
  node: string;
  label: string;
  temperatureC: number;
  x: number;
  y: number;
  w: number;
  h: number;
}

export interface CutawayArrow {
  face: FaceName;
  heatW: number;
  /** Start, and direction it points in. */
  x: number;
  y: number;
  direction: 'up' | 'down' | 'left' | 'right';
  thickness: number;
}

export interface CutawayLabel {
  x: number;
  y: number;
  text: string;
  anchor: 'start' | 'middle' | 'end';
  strong: boolean;
}

/** Room round the box for arrows and their watts [px]. */
const edge = 58;
const wallPx = 13;
const carrierPx = 8;
const partPx = 11;

function temperatureOf(estimate: Estimate, node: string): number {
  return estimate.nodes.find(({ id }) => id === node)?.temperatureC ?? NaN;
}

/** Heat that leaves a face’s outside for the room, by air, by radiation or by what it is held against [W]. */
export function heatThrough(estimate: Estimate, face: FaceName): number {
  return ['convection', 'radiation', 'sky', 'gap', 'joint', 'cover'].reduce(
    (sum, kind) => sum + (estimate.flowsW[`face.${face}.outside.${kind}`] ?? 0),
    0,
  );
}

interface Frame {
  view: Elevation;
  /** Inside of the walls [px]. */
  left: number;
  right: number;
  top: number;
  bottom: number;
}

function number(value: unknown, otherwise: number): number {
  return typeof value === 'number' && value > 0 ? value : otherwise;
}

/** Extent of a carrier in the picture, as a share of the wall that it stands on. */
function shareOf(
  document: AssemblyDocumentInput,
  frame: Frame,
  carrier: { sizeM: readonly unknown[]; on?: { face: FaceName } | null | undefined },
): number {
  if (!carrier.on || !document.housing) return 0.8;
  const along =
    carrier.on.face === frame.view.up || carrier.on.face === frame.view.down
      ? frame.view.acrossAxis
      : frame.view.upAxis;
  const normal = { left: 0, right: 0, front: 1, back: 1, bottom: 2, top: 2 }[carrier.on.face];
  const axes = [0, 1, 2].filter((axis) => axis !== normal);
  const size = number(carrier.sizeM[axes.indexOf(along)], number(carrier.sizeM[0], 0.05));
  return Math.min(size / number(document.housing.outerM[along], 0.1), 0.94);
}

/** A slab that lies on the inside of a wall, `off` px away from it, over `share` of it from `from`. */
function slab(frame: Frame, face: FaceName, off: number, depth: number, share: number, from = (1 - share) / 2) {
  const { view, left, right, top, bottom } = frame;
  const width = right - left;
  const height = bottom - top;
  if (face === view.up) return { x: left + width * from, y: top + off, w: width * share, h: depth };
  if (face === view.down) return { x: left + width * from, y: bottom - off - depth, w: width * share, h: depth };
  if (face === view.near) return { x: left + off, y: top + height * from, w: depth, h: height * share };
  if (face === view.far) return { x: right - off - depth, y: top + height * from, w: depth, h: height * share };
  // On a wall behind or before the section: seen against it, in the middle.
  return { x: left + width * from, y: top + height * 0.5 - depth / 2, w: width * share, h: depth };
}

function partBlocks(document: AssemblyDocumentInput, estimate: Estimate, frame: Frame): CutawayBlock[] {
  const blocks: CutawayBlock[] = [];
  const groups = new Map<string, typeof document.parts>();
  for (const part of document.parts) groups.set(part.mount.on, [...(groups.get(part.mount.on) ?? []), part]);
  for (const [on, parts] of groups) {
    const carrier = document.carriers?.find(({ id }) => id === on);
    const face = carrier?.on?.face ?? faceNames.find((name) => on === `face.${name}`);
    if (face === undefined) continue;
    const room = carrier ? shareOf(document, frame, carrier) : 0.8;
    const standOff = carrier?.kind === 'board' ? 16 : 0;
    const off = carrier ? standOff + carrierPx : 0;
    const each = Math.min(room / parts.length, 0.3);
    parts.forEach((part, i) => {
      const centre = (1 - room) / 2 + (room * (i + 0.5)) / parts.length;
      const share = each * 0.62;
      const node = `part.${part.id}.junction`;
      const box = slab(frame, face, off, partPx, share, centre - share / 2);
      blocks.push({ node, label: part.name ?? part.id, temperatureC: temperatureOf(estimate, node), ...box });
    });
  }
  return blocks;
}

/** A section of the housing in the pose of use: walls, carriers, parts, and the heat that leaves. */
export function cutaway(document: AssemblyDocumentInput, estimate: Estimate, width: number) {
  const view = elevation(document.housing?.outerM ?? [0.1, 0.1, 0.1], document.housing?.pose?.up ?? 'top');
  const boxWidth = width - 2 * edge;
  const boxHeight = Math.min(Math.max((boxWidth * view.heightM) / view.widthM, 130), 250);
  const height = boxHeight + 2 * edge;
  const outer = { x: edge, y: edge, w: boxWidth, h: boxHeight };
  const frame: Frame = {
    view,
    left: outer.x + wallPx,
    right: outer.x + outer.w - wallPx,
    top: outer.y + wallPx,
    bottom: outer.y + outer.h - wallPx,
  };
  const wall = (face: FaceName, box: { x: number; y: number; w: number; h: number }): CutawayBlock => {
    const node = `face.${face}.outer`;
    return { node, label: `${face} face, outside`, temperatureC: temperatureOf(estimate, node), ...box };
  };
  const walls = [
    wall(view.near, { x: outer.x, y: outer.y, w: wallPx, h: outer.h }),
    wall(view.far, { x: frame.right, y: outer.y, w: wallPx, h: outer.h }),
    wall(view.up, { x: outer.x, y: outer.y, w: outer.w, h: wallPx }),
    wall(view.down, { x: outer.x, y: frame.bottom, w: outer.w, h: wallPx }),
  ];
  const carriers = (document.carriers ?? []).map((carrier): CutawayBlock => {
    const node = `carrier.${carrier.id}.mean`;
    const off = carrier.kind === 'board' ? 16 : 0;
    const box = slab(frame, carrier.on?.face ?? view.down, off, carrierPx, shareOf(document, frame, carrier));
    return { node, label: `${carrier.kind} ${carrier.id}`, temperatureC: temperatureOf(estimate, node), ...box };
  });
  const drawn = [view.up, view.down, view.near, view.far];
  const largest = Math.max(...faceNames.map((face) => Math.abs(heatThrough(estimate, face))), 1e-9);
  const arrows = drawn.flatMap((face): CutawayArrow[] => {
    const heatW = heatThrough(estimate, face);
    if (Math.abs(heatW) < largest * 0.01) return [];
    const thickness = Math.max((Math.abs(heatW) / largest) * 14, 1.5);
    const middle = { x: outer.x + outer.w / 2, y: outer.y + outer.h / 2 };
    const out = heatW > 0;
    if (face === view.up)
      return [{ face, heatW, thickness, x: middle.x, y: outer.y - 4, direction: out ? 'up' : 'down' }];
    if (face === view.down)
      return [{ face, heatW, thickness, x: middle.x, y: outer.y + outer.h + 4, direction: out ? 'down' : 'up' }];
    if (face === view.near)
      return [{ face, heatW, thickness, x: outer.x - 4, y: middle.y, direction: out ? 'left' : 'right' }];
    return [{ face, heatW, thickness, x: outer.x + outer.w + 4, y: middle.y, direction: out ? 'right' : 'left' }];
  });
  const airInside = { node: 'air.inside', temperatureC: temperatureOf(estimate, 'air.inside') };
  return {
    width,
    height,
    outer,
    frame,
    walls,
    carriers,
    parts: partBlocks(document, estimate, frame),
    arrows,
    airInside,
  };
}
