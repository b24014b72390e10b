import { faceNames, type FaceName } from '../../../shared/schemas/assembly.js';

/** Axis of each face’s normal: 0 = x (left to right), 1 = y (front to back), 2 = z (bottom to top). */
export const normalAxis: Record<FaceName, 0 | 1 | 2> = { left: 0, right: 0, front: 1, back: 1, bottom: 2, top: 2 };

export const opposite: Record<FaceName, FaceName> = {
  left: 'right',
  right: 'left',
  front: 'back',
  back: 'front',
  bottom: 'top',
  top: 'bottom',
};

/** The two axes that span a face, in the document’s order (its local x and y). */
export function spanAxes(face: FaceName): [0 | 1 | 2, 0 | 1 | 2] {
  const axis = normalAxis[face];
  if (axis === 0) return [1, 2];
  return axis === 1 ? [0, 2] : [0, 1];
}

/** Length and width of a face of a box of the given size [m]. */
export function faceSize(face: FaceName, sizeM: readonly [number, number, number]): [number, number] {
  const [u, v] = spanAxes(face);
  return [sizeM[u], sizeM[v]];
}

/** Size of the inside of a box whose faces have the given wall thicknesses [m]. */
export function innerSize(
  outerM: readonly [number, number, number],
  wallM: Record<FaceName, number>,
): [number, number, number] {
  return [
    outerM[0] - wallM.left - wallM.right,
    outerM[1] - wallM.front - wallM.back,
    outerM[2] - wallM.bottom - wallM.top,
  ];
}

/** Name of the edge of face `a`, in its own plane, at which it meets face `b`. */
export function edgeTowards(a: FaceName, b: FaceName): 'x0' | 'x1' | 'y0' | 'y1' {
  const [u] = spanAxes(a);
  const axis = normalAxis[b] === u ? 'x' : 'y';
  return `${axis}${b === 'right' || b === 'back' || b === 'top' ? '1' : '0'}`;
}

/** An edge that two faces share, with how far the middle of each lies from it [m]. */
export interface Edge {
  a: FaceName;
  b: FaceName;
  lengthM: number;
  /** Extent of face a, and of b, across the edge. */
  acrossA: number;
  acrossB: number;
}

/** The twelve edges of a box. */
export function edges(sizeM: readonly [number, number, number]): Edge[] {
  const found: Edge[] = [];
  faceNames.forEach((a, i) => {
    for (const b of faceNames.slice(i + 1)) {
      const axisA = normalAxis[a];
      const axisB = normalAxis[b];
      if (axisA === axisB) continue;
      const along = (3 - axisA - axisB) as 0 | 1 | 2;
      found.push({ a, b, lengthM: sizeM[along], acrossA: sizeM[axisB], acrossB: sizeM[axisA] });
    }
  });
  return found;
}
