import type { FaceName } from '../../../shared/schemas/assembly.js';

export interface NetRect {
  x: number;
  y: number;
  w: number;
  h: number;
}

export interface NetLayout {
  width: number;
  height: number;
  faces: Record<FaceName, NetRect>;
}

/** Smallest side that a finger can hit and a name fits into [px]. */
const leastSide = 58;
const largestHeight = 430;

/**
 * The net of a box: the top in the middle, its four sides round it, the bottom below the front. To scale, but for sides that
 * would become too small to hit.
 *
 * @param outerM width, depth and height of the box [m]
 * @param width what the picture may take [px]
 */
export function netLayout(outerM: readonly number[], width: number): NetLayout {
  const sides = [0, 1, 2].map((i) => {
    const size = Number(outerM[i]);
    return Number.isFinite(size) && size > 0 ? size : 0.1;
  });
  const [x = 0.1, y = 0.1, z = 0.1] = sides;
  const across = x + 2 * z;
  const along = 2 * y + 2 * z;
  const scale = Math.min((width - 4) / across, largestHeight / along);
  let [w, d, h] = [x, y, z].map((size) => Math.max(size * scale, leastSide)) as [number, number, number];
  const tooWide = w + 2 * h - (width - 4);
  if (tooWide > 0) w = Math.max(w - tooWide, leastSide);
  const still = w + 2 * h - (width - 4);
  if (still > 0) h = Math.max(h - still / 2, 40);
  [w, d, h] = [Math.round(w), Math.round(d), Math.round(h)];
  const left = 2;
  const top = 2;
  return {
    width: w + 2 * h + 4,
    height: 2 * d + 2 * h + 4,
    faces: {
      back: { x: left + h, y: top, w, h },
      left: { x: left, y: top + h, w: h, h: d },
      top: { x: left + h, y: top + h, w, h: d },
      right: { x: left + h + w, y: top + h, w: h, h: d },
      front: { x: left + h, y: top + h + d, w, h },
      bottom: { x: left + h, y: top + 2 * h + d, w, h: d },
    },
  };
}
