import type { FaceName } from '../../../shared/schemas/assembly.js';

export const oppositeFace: Record<FaceName, FaceName> = {
  left: 'right',
  right: 'left',
  front: 'back',
  back: 'front',
  bottom: 'top',
  top: 'bottom',
};

/** Axis of each face’s normal: 0 left to right, 1 front to back, 2 bottom to top. */
const axisOf: Record<FaceName, 0 | 1 | 2> = { left: 0, right: 0, front: 1, back: 1, bottom: 2, top: 2 };
const lowSide: Record<0 | 1 | 2, FaceName> = { 0: 'left', 1: 'front', 2: 'bottom' };

export interface Elevation {
  /** Axes of the picture: across, and the one that stands upright. */
  acrossAxis: 0 | 1 | 2;
  upAxis: 0 | 1 | 2;
  widthM: number;
  heightM: number;
  up: FaceName;
  down: FaceName;
  /** Faces at the left and right edge of the picture. */
  near: FaceName;
  far: FaceName;
}

/** The side view that shows the most: upright axis upright, the longer of the other two across. */
export function elevation(outerM: readonly number[], up: FaceName): Elevation {
  const size = (axis: 0 | 1 | 2) => {
    const value = Number(outerM[axis]);
    return Number.isFinite(value) && value > 0 ? value : 0.1;
  };
  const upAxis = axisOf[up];
  const others = ([0, 1, 2] as const).filter((axis) => axis !== upAxis);
  const acrossAxis = others.reduce((best, axis) => (size(axis) > size(best) ? axis : best));
  const near = lowSide[acrossAxis];
  return {
    acrossAxis,
    upAxis,
    widthM: size(acrossAxis),
    heightM: size(upAxis),
    up,
    down: oppositeFace[up],
    near,
    far: oppositeFace[near],
  };
}
