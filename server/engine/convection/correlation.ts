import { tabulated, type WithSlope } from '../hermite.js';

/** What a correlation gives: Nu, and its two slopes for Newton’s method. */
export interface Nusselt {
  nu: number;
  /** dNu/d ln Ra = Ra dNu/dRa: finite at Ra = 0, where dNu/dRa need not be. */
  byLogRa: number;
  /** dNu/dPr. */
  byPr: number;
}

export interface Range {
  ra?: readonly [number, number];
  pr?: readonly [number, number];
}

/** A published natural-convection correlation Nu(Ra, Pr) of one shape. */
export interface Correlation {
  id: string;
  shape: string;
  /** The formula as text, for the reader. */
  formula: string;
  source: string;
  /** What the published range is, as data. */
  range: Range;
  /** The law that takes over when the surface is colder than its air and up and down change places. */
  mate?: string;
  /** @param ratio length ÷ diameter, where the shape has one */
  evaluate: (ra: number, pr: number, out: Nusselt, ratio?: number) => void;
}

/**
 * Joins the laminar law c/ln(1 + c/Nu_T) of thick boundary layers to its slopes.
 *
 * Nu_l = c / ln(1 + c/Nu_T). As Nu_T → 0 so does Nu_l, with all slopes.
 *
 * @returns Nu_l and dNu_l/dNu_T
 */
export function thickLayer(thin: number, c: number, out: { value: number; slope: number }): void {
  if (thin < 1e-300) {
    out.value = 0;
    out.slope = 0;
    return;
  }
  const log = Math.log1p(c / thin);
  out.value = c / log;
  out.slope = (c * c) / (log * log * thin * (thin + c));
}

/** Prandtl numbers that the tables of this folder cover: air’s own, 150 … 1500 K, with room on both sides. */
const prandtlRange = [0.55, 0.95] as const;

/** A function of Pr alone, made fast: outside the table’s range it is computed as it stands. */
export function ofPrandtl(exact: WithSlope): WithSlope {
  return tabulated(exact, prandtlRange, 200);
}

/** r^n for the small whole powers that blends use. */
function wholePower(r: number, n: number): number {
  let result = 1;
  for (let square = r, rest = n; rest > 0; rest >>= 1, square *= square) if (rest & 1) result *= square;
  return result;
}

/** (a^n + b^n)^(1/n) with its slopes by a and b, n a whole number, safe for zero and for large n. */
export function powerSum(a: number, b: number, n: number, out: { value: number; byA: number; byB: number }): void {
  const greater = a > b ? a : b;
  if (greater <= 0) {
    out.value = 0;
    out.byA = 0;
    out.byB = 0;
    return;
  }
  const lesser = a > b ? b : a;
  const ratio = lesser / greater;
  const power = wholePower(ratio, n);
  const root = Math.exp(Math.log1p(power) / n);
  const byGreater = root / (1 + power);
  const byLesser = lesser > 0 ? (byGreater * power) / ratio : 0;
  out.value = greater * root;
  out.byA = a > b ? byGreater : byLesser;
  out.byB = a > b ? byLesser : byGreater;
}

/**
 * C̄_l of Raithby & Hollands and its slope by Pr: 0.671/[1 + (0.492/Pr)^(9/16)]^(4/9).
 */
export const laminarCoefficient: WithSlope = ofPrandtl((pr, out) => {
  const x = (0.492 / pr) ** (9 / 16);
  out.value = 0.671 / (1 + x) ** (4 / 9);
  out.slope = (out.value * (4 / 9) * (9 / 16) * x) / ((1 + x) * pr);
});
