import type { Nusselt } from './correlation.js';

/** Sharpness of the blend of ElSherbiny’s three laws: at most 1 % where they meet, under 0.3 % elsewhere. */
const sharpness = 128;
/** Half width over which the corners of [x]⁺ are rounded. */
const corner = 0.1;

function wholePower(x: number, n: number): number {
  let result = 1;
  for (let square = x, rest = n; rest > 0; rest >>= 1, square *= square) if (rest & 1) result *= square;
  return result;
}

/**
 * Natural convection across a vertical gap between plates of unlike temperature.
 *
 * Nu = greatest of 0.0605 Ra^⅓, {1 + [0.104 Ra^0.293/(1 + (6310/Ra)^1.36)]³}^⅓ and 0.242 (Ra/A)^0.272, A = height/gap; blended by
 * (Σ Nu^128)^(1/128). Ra on the gap.
 *
 * @param ratio A = height/gap
 *
 * **Valid for** 5 ≤ A ≤ 110, 10² ≤ Ra ≤ 2·10⁷.
 * **Source** S. M. ElSherbiny, G. D. Raithby, K. G. T. Hollands, J. Heat Transfer 104 (1982) 96–102; recalled, to be verified.
 * **Checked against** a second computation, tests/reference/air-gaps.
 */
export function nusseltGapElSherbiny(ra: number, ratio: number, out: Nusselt): void {
  out.byPr = 0;
  if (!(ra > 1e-30)) {
    out.nu = 1;
    out.byLogRa = 0;
    return;
  }
  const first = 0.0605 * Math.cbrt(ra);
  const onset = (6310 / ra) ** 1.36;
  const t = (0.104 * ra ** 0.293) / (1 + onset);
  const tByLog = t * (0.293 + (1.36 * onset) / (1 + onset));
  const cubes = 1 + t * t * t;
  const second = Math.cbrt(cubes);
  const secondByLog = (second * t * t * tByLog) / cubes;
  const third = 0.242 * (ra / ratio) ** 0.272;
  const greatest = Math.max(first, second, third);
  const a = wholePower(first / greatest, sharpness);
  const b = wholePower(second / greatest, sharpness);
  const c = wholePower(third / greatest, sharpness);
  const sum = a + b + c;
  out.nu = greatest * Math.exp(Math.log(sum) / sharpness);
  out.byLogRa = (out.nu / sum) * (a / 3 + (b * secondByLog) / second + 0.272 * c);
}

/** [x]⁺ with its corner rounded over ±0.1; value and slope. */
function positive(x: number, out: { value: number; slope: number }): void {
  if (x <= -corner) {
    out.value = 0;
    out.slope = 0;
  } else if (x < corner) {
    out.value = (x + corner) ** 2 / (4 * corner);
    out.slope = (x + corner) / (2 * corner);
  } else {
    out.value = x;
    out.slope = 1;
  }
}

const one = { value: 0, slope: 0 };

/**
 * Natural convection across a gap heated from below, 0 … 60° from level.
 *
 * Nu = 1 + 1.44 [1 − 1708/(Ra cos φ)]⁺ {1 − 1708 sin^1.6(1.8 φ)/(Ra cos φ)} + [(Ra cos φ/5830)^⅓ − 1]⁺; the corners of [ ]⁺ are rounded
 * over ±0.1, which adds at most 3.6 % at them. Ra on the gap.
 *
 * @param tilt φ [rad]
 *
 * **Valid for** Ra ≤ 10⁵ (air), height/gap ≥ 12.
 * **Source** K. G. T. Hollands, T. E. Unny, G. D. Raithby, L. Konicek, J. Heat Transfer 98 (1976) 189–193; recalled, to be verified.
 * **Checked against** a second computation away from the corners, tests/reference/air-gaps.
 */
export function nusseltGapHollands(ra: number, tilt: number, out: Nusselt): void {
  out.byPr = 0;
  out.nu = 1;
  out.byLogRa = 0;
  const x = ra * Math.cos(tilt);
  if (!(x > 1)) return;
  const critical = 1708 / x;
  positive(1 - critical, one);
  if (one.value > 0) {
    const sine = Math.max(Math.sin(1.8 * tilt), 0) ** 1.6;
    const brace = 1 - critical * sine;
    out.nu += 1.44 * one.value * brace;
    // d(critical)/d ln Ra = −critical.
    out.byLogRa += 1.44 * (one.slope * critical * brace + one.value * critical * sine);
  }
  const root = Math.cbrt(x / 5830);
  positive(root - 1, one);
  out.nu += one.value;
  out.byLogRa += (one.slope * root) / 3;
}

const below = { nu: 0, byLogRa: 0, byPr: 0 };

/**
 * Nusselt number of a closed gap at any tilt of its warmer side: 0° level with the warmer side below, 90° upright, 180° with it above.
 *
 * 0 … 60° Hollands; 60 … 90° a straight line between its value at 60° and the vertical law; 90 … 180° 1 + (Nu₉₀ − 1) sin(tilt).
 *
 * @param tiltDeg of the warmer side; @param ratio height/gap
 */
export function nusseltGap(ra: number, tiltDeg: number, ratio: number, out: Nusselt): void {
  if (tiltDeg <= 60) {
    nusseltGapHollands(ra, (tiltDeg * Math.PI) / 180, out);
    return;
  }
  nusseltGapElSherbiny(ra, ratio, out);
  if (tiltDeg >= 90) {
    const sine = Math.sin((tiltDeg * Math.PI) / 180);
    out.nu = 1 + (out.nu - 1) * sine;
    out.byLogRa *= sine;
    return;
  }
  nusseltGapHollands(ra, Math.PI / 3, below);
  const w = (tiltDeg - 60) / 30;
  out.nu = (1 - w) * below.nu + w * out.nu;
  out.byLogRa = (1 - w) * below.byLogRa + w * out.byLogRa;
}

/** What the registry tells of the gap’s laws. */
export const gapCorrelations = [
  {
    id: 'elsherbiny',
    shape: 'air-gap',
    formula:
      'Nu = greatest of 0.0605 Ra^⅓, {1 + [0.104 Ra^0.293/(1 + (6310/Ra)^1.36)]³}^⅓, 0.242 (Ra gap/height)^0.272 (upright; 90–180°: 1 + (Nu₉₀ − 1) sin tilt)',
    source: 'ElSherbiny, Raithby & Hollands, J. Heat Transfer 104 (1982) 96 (recalled, to be verified)',
    range: { ra: [0, 2e7] as const, aspect: [5, 110] as const },
  },
  {
    id: 'hollands',
    shape: 'air-gap',
    formula:
      'Nu = 1 + 1.44 [1 − 1708/(Ra cos φ)]⁺ {1 − 1708 sin^1.6(1.8 φ)/(Ra cos φ)} + [(Ra cos φ/5830)^⅓ − 1]⁺ (0–60°; to 90° a straight line to elsherbiny)',
    source: 'Hollands, Unny, Raithby & Konicek, J. Heat Transfer 98 (1976) 189 (recalled, to be verified)',
    range: { ra: [0, 1e5] as const, aspect: [12, Infinity] as const },
  },
];
