import { laminarCoefficient, powerSum, thickLayer, type Correlation, type Nusselt } from './correlation.js';

const laminar = { value: 0, slope: 0 };
const thick = { value: 0, slope: 0 };
const sum = { value: 0, byA: 0, byB: 0 };

/**
 * Natural convection of a hot plate that looks up (or a cold one that looks down).
 *
 * Nu_T = 0.835 C̄_l Ra^¼; Nu_l = 1.4/ln(1 + 1.4/Nu_T); Nu_t = 0.14 Ra^⅓; Nu = (Nu_l¹⁰ + Nu_t¹⁰)^(1/10). L = area/perimeter.
 *
 * **Valid for** 1 ≤ Ra ≤ 10¹¹, Pr ≥ 0.5 (0.14 is the coefficient for air).
 * **Source** G. D. Raithby, K. G. T. Hollands, Handbook of Heat Transfer, 3rd ed. (1998), ch. 4; recalled, to be verified.
 * **Checked against** a second computation in high precision, tests/reference/raithby-hollands.
 */
export function nusseltPlateFacingUpRaithbyHollands(ra: number, pr: number, out: Nusselt): void {
  laminarCoefficient(pr, laminar);
  const quarter = 0.835 * Math.sqrt(Math.sqrt(ra));
  thickLayer(laminar.value * quarter, 1.4, thick);
  const turbulent = 0.14 * Math.cbrt(ra);
  powerSum(thick.value, turbulent, 10, sum);
  out.nu = sum.value;
  out.byLogRa = sum.byA * thick.slope * laminar.value * quarter * 0.25 + (sum.byB * turbulent) / 3;
  out.byPr = sum.byA * thick.slope * laminar.slope * quarter;
}

/** Where the two published pieces meet, and half the width of the blend between them in ln Ra. */
const joint = Math.log(1e7);
const halfBlend = Math.log(3);

/**
 * Natural convection of a hot plate that looks up, two power laws.
 *
 * Nu = 0.54 Ra^¼ up to 10⁷, 0.15 Ra^⅓ above; L = area/perimeter. The pieces differ by 6 % at the joint: within a factor 3 of it
 * they are blended by a cubic step in ln Ra, which stays within 3.2 % of the published piece; outside it is exact.
 *
 * **Valid for** 10⁴ ≤ Ra ≤ 10¹¹.
 * **Source** J. R. Lloyd, W. R. Moran, J. Heat Transfer 96 (1974) 443–447, as given in textbooks; recalled, to be verified.
 * **Checked against** a second computation outside the blend, tests/reference/lloyd-moran-1974.
 */
export function nusseltPlateFacingUpLloydMoran(ra: number, _pr: number, out: Nusselt): void {
  out.byPr = 0;
  const low = 0.54 * Math.sqrt(Math.sqrt(ra));
  const high = 0.15 * Math.cbrt(ra);
  const x = ra > 0 ? (Math.log(ra) - joint + halfBlend) / (2 * halfBlend) : 0;
  const u = Math.min(1, Math.max(0, x));
  const weight = u * u * (3 - 2 * u);
  const weightSlope = (6 * u * (1 - u)) / (2 * halfBlend);
  out.nu = (1 - weight) * low + weight * high;
  out.byLogRa = ((1 - weight) * low) / 4 + (weight * high) / 3 + weightSlope * (high - low);
}

export const plateFacingUpCorrelations: Correlation[] = [
  {
    id: 'raithby-hollands',
    shape: 'plate-facing-up',
    formula: 'Nu = (Nu_l¹⁰ + Nu_t¹⁰)^(1/10), Nu_l = 1.4/ln(1 + 1.4/(0.835 C̄_l Ra^¼)), Nu_t = 0.14 Ra^⅓',
    source: 'Raithby & Hollands, Handbook of Heat Transfer, ch. 4 (recalled, to be verified)',
    range: { ra: [1, 1e11] },
    mate: 'raithby-hollands',
    evaluate: nusseltPlateFacingUpRaithbyHollands,
  },
  {
    id: 'lloyd-moran',
    shape: 'plate-facing-up',
    formula: 'Nu = 0.54 Ra^¼ (Ra ≤ 10⁷), 0.15 Ra^⅓ (above)',
    source: 'Lloyd & Moran, J. Heat Transfer 96 (1974) 443 (recalled, to be verified)',
    range: { ra: [1e4, 1e11] },
    mate: 'mcadams',
    evaluate: nusseltPlateFacingUpLloydMoran,
  },
];
