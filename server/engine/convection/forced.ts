import { ofPrandtl } from './correlation.js';

/** What a forced-flow correlation gives: Nu, and its slopes for Newton’s method. */
export interface ForcedNusselt {
  nu: number;
  /** dNu/d ln Re. */
  byLogRe: number;
  /** dNu/dPr. */
  byPr: number;
}

/** A published forced-convection correlation Nu(Re, Pr). */
export interface ForcedCorrelation {
  id: string;
  shape: 'flat-plate' | 'cylinder-in-cross-flow' | 'sphere-in-flow';
  formula: string;
  source: string;
  range: { re: readonly [number, number]; pr?: readonly [number, number] };
  evaluate: (re: number, pr: number, out: ForcedNusselt) => void;
}

const third = { value: 0, slope: 0 };
const cubeRoot = ofPrandtl((pr, out) => {
  out.value = Math.cbrt(pr);
  out.slope = out.value / (3 * pr);
});

/** Reynolds number where the laminar layer turns, and half the width of the blend in ln Re. */
const transition = Math.log(5e5);
const halfBlend = Math.log(1.3);

/**
 * Forced flow along a flat plate, mean over its length.
 *
 * Laminar 0.664 Re^½ Pr^⅓; beyond Re = 5·10⁵ mixed (0.037 Re^0.8 − 871) Pr^⅓. Both meet at 5·10⁵ in value but not in slope: within a factor
 * 1.3 of it they are joined by a cubic step in ln Re, which stays within 4 % of the published piece.
 *
 * **Valid for** Re ≤ 10⁸, 0.6 ≤ Pr ≤ 60.
 * **Source** Pohlhausen’s laminar solution and the mixed law of textbooks (Incropera et al.); recalled, to be verified.
 * **Checked against** a second computation outside the blend, tests/reference/forced-flow.
 */
export function nusseltFlatPlateForced(re: number, pr: number, out: ForcedNusselt): void {
  cubeRoot(pr, third);
  const x = Math.log(re);
  const u = Math.min(1, Math.max(0, (x - transition + halfBlend) / (2 * halfBlend)));
  const weight = u * u * (3 - 2 * u);
  const weightSlope = (6 * u * (1 - u)) / (2 * halfBlend);
  const laminar = 0.664 * Math.sqrt(re);
  const turbulent = u > 0 ? 0.037 * re ** 0.8 : 0;
  const mixed = turbulent - 871;
  const nu = u > 0 ? (1 - weight) * laminar + weight * mixed : laminar;
  out.nu = nu * third.value;
  out.byLogRe =
    ((1 - weight) * 0.5 * laminar + weight * 0.8 * turbulent + weightSlope * (u > 0 ? mixed - laminar : 0)) *
    third.value;
  out.byPr = nu * third.slope;
}

const shield = { value: 0, slope: 0 };

/** 0.62 Pr^⅓/[1 + (0.4/Pr)^⅔]^¼ of Churchill & Bernstein. */
const crossFlowCoefficient = ofPrandtl((pr, out) => {
  const y = (0.4 / pr) ** (2 / 3);
  out.value = (0.62 * Math.cbrt(pr)) / (1 + y) ** 0.25;
  out.slope = (out.value / pr) * (1 / 3 + y / (6 * (1 + y)));
});

/**
 * Forced flow across a cylinder; length = diameter.
 *
 * Nu = 0.3 + 0.62 Re^½ Pr^⅓/[1 + (0.4/Pr)^⅔]^¼ · [1 + (Re/282 000)^(5/8)]^(4/5)
 *
 * **Valid for** Re Pr ≥ 0.2 (here Re ≥ 0.3), Re ≤ 10⁷.
 * **Source** S. W. Churchill, M. Bernstein, J. Heat Transfer 99 (1977) 300–306.
 * **Checked against** a second computation, tests/reference/forced-flow.
 */
export function nusseltCylinderChurchillBernstein(re: number, pr: number, out: ForcedNusselt): void {
  crossFlowCoefficient(pr, shield);
  const half = Math.sqrt(re);
  const x = (re / 282000) ** 0.625;
  const turbulent = (1 + x) ** 0.8;
  const term = shield.value * half * turbulent;
  out.nu = 0.3 + term;
  out.byLogRe = term * (0.5 + (0.5 * x) / (1 + x));
  out.byPr = shield.slope * half * turbulent;
}

const two = { value: 0, slope: 0 };
const twoFifths = ofPrandtl((pr, out) => {
  out.value = pr ** 0.4;
  out.slope = (0.4 * out.value) / pr;
});

/**
 * Forced flow past a sphere, before its correction by (μ∞/μ_s)^¼; length = diameter.
 *
 * Nu − 2 = (0.4 Re^½ + 0.06 Re^⅔) Pr^0.4 (μ∞/μ_s)^¼, all but μ_s at the temperature of the free stream.
 *
 * @returns Nu − 2 without the correction
 *
 * **Valid for** 3.5 ≤ Re ≤ 7.6·10⁴, 0.71 ≤ Pr ≤ 380.
 * **Source** S. Whitaker, AIChE J. 18 (1972) 361–371, as given in textbooks.
 * **Checked against** a second computation, tests/reference/forced-flow.
 */
export function nusseltSphereWhitaker(re: number, pr: number, out: ForcedNusselt): void {
  twoFifths(pr, two);
  const half = 0.4 * Math.sqrt(re);
  const rest = 0.06 * Math.cbrt(re) ** 2;
  out.nu = (half + rest) * two.value;
  out.byLogRe = (half / 2 + (2 * rest) / 3) * two.value;
  out.byPr = (half + rest) * two.slope;
}

export const forcedCorrelations: Record<ForcedCorrelation['shape'], ForcedCorrelation> = {
  'flat-plate': {
    id: 'flat-plate-mixed',
    shape: 'flat-plate',
    formula: 'Nu = 0.664 Re^½ Pr^⅓ (Re ≤ 5·10⁵), (0.037 Re^0.8 − 871) Pr^⅓ (above)',
    source: 'Pohlhausen; Incropera et al., Fundamentals of Heat and Mass Transfer (recalled, to be verified)',
    range: { re: [1e3, 1e8] },
    evaluate: nusseltFlatPlateForced,
  },
  'cylinder-in-cross-flow': {
    id: 'churchill-bernstein',
    shape: 'cylinder-in-cross-flow',
    formula: 'Nu = 0.3 + 0.62 Re^½ Pr^⅓/[1 + (0.4/Pr)^⅔]^¼ · [1 + (Re/282 000)^(5/8)]^(4/5)',
    source: 'Churchill & Bernstein, J. Heat Transfer 99 (1977) 300',
    range: { re: [0.3, 1e7] },
    evaluate: nusseltCylinderChurchillBernstein,
  },
  'sphere-in-flow': {
    id: 'whitaker',
    shape: 'sphere-in-flow',
    formula: 'Nu = 2 + (0.4 Re^½ + 0.06 Re^⅔) Pr^0.4 (μ∞/μ_s)^¼',
    source: 'Whitaker, AIChE J. 18 (1972) 361',
    range: { re: [3.5, 7.6e4] },
    evaluate: nusseltSphereWhitaker,
  },
};
