import { faceNames, type FaceName, type Pose } from '../../../shared/schemas/assembly.js';
import { EngineError } from '../errors.js';
import { normalAxis, opposite, spanAxes } from './geometry.js';

export type Vector = readonly [number, number, number];

/** Outward normal of a face, in the box’s own axes: x left to right, y front to back, z bottom to top. */
export function normalOf(face: FaceName): Vector {
  const sign = face === 'right' || face === 'back' || face === 'top' ? 1 : -1;
  const normal: [number, number, number] = [0, 0, 0];
  normal[normalAxis[face]] = sign;
  return normal;
}

export function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

/**
 * Which way is up, in the box’s own axes: the normal of the face that looks up, leaned back by the tilt from the face that it leans towards.
 *
 * @param path of the pose in the document, for errors
 * @throws EngineError where the box is to lean towards the face that looks up, or its opposite
 */
export function upward({ up, tiltDeg, towards }: Pose, path: string): Vector {
  const lean = towards ?? faceNames.find((face) => face !== up && face !== opposite[up]) ?? 'front';
  if (lean === up || lean === opposite[up]) {
    const message = 'It can only lean towards a face beside the one that looks up';
    throw new EngineError('invalid-document', message, [{ path: `${path}/towards`, message }]);
  }
  const angle = (tiltDeg * Math.PI) / 180;
  const u = normalOf(up);
  const t = normalOf(lean);
  return [0, 1, 2].map(
    (axis) => Math.cos(angle) * (u[axis] as number) - Math.sin(angle) * (t[axis] as number),
  ) as unknown as Vector;
}

/** Angle of a direction from straight up [°]: 0 looks up, 90 sideways, 180 down. */
export function tiltOf(normal: Vector, up: Vector): number {
  return (Math.acos(Math.min(1, Math.max(-1, dot(normal, up)))) * 180) / Math.PI;
}

/** Extents of a surface parallel to a face: along the slope (the steeper of its two axes) and across it [m]. */
export function slopeExtents(face: FaceName, up: Vector, size: readonly [number, number]): [number, number] {
  const [u, v] = spanAxes(face);
  return Math.abs(up[u]) > Math.abs(up[v]) ? [size[0], size[1]] : [size[1], size[0]];
}

/**
 * Unit vector towards the sun, in the box’s own axes.
 *
 * @param up which way is up; the azimuth counts from the front face (from the bottom face, where front or back looks up), to the right
 */
export function sunDirection(
  { elevationDeg, azimuthDeg }: { elevationDeg: number; azimuthDeg: number },
  up: Vector,
): Vector {
  const front = Math.abs(up[1]) > 0.9 ? normalOf('bottom') : normalOf('front');
  const level = subtract(front, scale(up, dot(front, up)));
  const ahead = scale(level, 1 / Math.sqrt(dot(level, level)));
  // To the left of someone who looks at the front.
  const left = cross(ahead, up);
  const elevation = (elevationDeg * Math.PI) / 180;
  const azimuth = (azimuthDeg * Math.PI) / 180;
  return add(
    scale(up, Math.sin(elevation)),
    add(scale(ahead, Math.cos(elevation) * Math.cos(azimuth)), scale(left, -Math.cos(elevation) * Math.sin(azimuth))),
  );
}

function scale(a: Vector, s: number): Vector {
  return [a[0] * s, a[1] * s, a[2] * s];
}

function add(a: Vector, b: Vector): Vector {
  return [a[0] + b[0], a[1] + b[1], a[2] + b[2]];
}

function subtract(a: Vector, b: Vector): Vector {
  return add(a, scale(b, -1));
}

function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}
