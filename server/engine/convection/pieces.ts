import type { Nusselt } from './correlation.js';

/** A power law C Ra^n, valid up to a Rayleigh number. */
export interface Piece {
  coefficient: number;
  power: number;
  upTo: number;
}

/** Half the width of a blend in ln Ra: a factor 3 either way. */
const halfBlend = Math.log(3);

/**
 * Power laws in pieces, joined by a cubic step in ln Ra within a factor 3 of each joint: continuous with continuous slope, and outside the
 * blends exactly as published. The joints must lie more than a factor 9 apart.
 */
export function piecewise(pieces: readonly Piece[]): (ra: number, out: Nusselt) => void {
  const joints = pieces.map(({ upTo }) => Math.log(upTo));
  return (ra, out) => {
    out.byPr = 0;
    if (!(ra > 0)) {
      out.nu = 0;
      out.byLogRa = 0;
      return;
    }
    const x = Math.log(ra);
    let p = 0;
    while (p + 1 < pieces.length && x > (joints[p] as number) + halfBlend) p++;
    const low = pieces[p] as Piece;
    const nu = low.coefficient * Math.exp(low.power * x);
    out.nu = nu;
    out.byLogRa = low.power * nu;
    const high = pieces[p + 1];
    const u = (x - (joints[p] as number) + halfBlend) / (2 * halfBlend);
    if (!high || !(u > 0)) return;
    const weight = u * u * (3 - 2 * u);
    const weightSlope = (6 * u * (1 - u)) / (2 * halfBlend);
    const above = high.coefficient * Math.exp(high.power * x);
    out.nu = (1 - weight) * nu + weight * above;
    out.byLogRa = (1 - weight) * low.power * nu + weight * high.power * above + weightSlope * (above - nu);
  };
}
