import { ofPrandtl, thickLayer, type Correlation, type Nusselt } from './correlation.js';

const thick = { value: 0, slope: 0 };
const coefficient = { value: 0, slope: 0 };

/** 0.527/[1 + (1.9/Pr)^0.9]^(2/9) of Raithby & Hollands. */
const thinCoefficient = ofPrandtl((pr, out) => {
  const x = (1.9 / pr) ** 0.9;
  out.value = 0.527 / (1 + x) ** (2 / 9);
  out.slope = (out.value * (2 / 9) * 0.9 * x) / ((1 + x) * pr);
});

/**
 * Natural convection of a hot plate that looks down (or a cold one that looks up).
 *
 * Nu_T = 0.527 Ra^⅕/[1 + (1.9/Pr)^0.9]^(2/9); Nu = 2.45/ln(1 + 2.45/Nu_T) (an edition prints 2.5). L = area/perimeter.
 *
 * **Valid for** 10³ ≤ Ra ≤ 10¹⁰.
 * **Source** G. D. Raithby, K. G. T. Hollands, Handbook of Heat Transfer, 3rd ed. (1998), ch. 4; recalled, to be verified.
 * **Checked against** a second computation in high precision, tests/reference/raithby-hollands.
 */
export function nusseltPlateFacingDownRaithbyHollands(ra: number, pr: number, out: Nusselt): void {
  thinCoefficient(pr, coefficient);
  const fifth = ra ** 0.2;
  const thin = coefficient.value * fifth;
  thickLayer(thin, 2.45, thick);
  out.nu = thick.value;
  out.byLogRa = (thick.slope * thin) / 5;
  out.byPr = thick.slope * coefficient.slope * fifth;
}

/**
 * Natural convection of a hot plate that looks down. Nu = 0.27 Ra^¼; L = area/perimeter.
 *
 * **Valid for** 10⁵ ≤ Ra ≤ 10¹⁰.
 * **Source** W. H. McAdams, Heat Transmission, 3rd ed. (1954), as given in textbooks; recalled, to be verified.
 * **Checked against** a second computation, tests/reference/mcadams-1954.
 */
export function nusseltPlateFacingDownMcAdams(ra: number, _pr: number, out: Nusselt): void {
  out.nu = 0.27 * Math.sqrt(Math.sqrt(ra));
  out.byLogRa = out.nu / 4;
  out.byPr = 0;
}

/**
 * Natural convection of a hot plate that looks down. Nu = 0.52 Ra^⅕; L = area/perimeter.
 *
 * **Valid for** 10⁴ ≤ Ra ≤ 10⁹, Pr ≥ 0.7.
 * **Source** the fifth-power law of recent textbooks (Incropera et al., after Radziemska & Lewandowski 2001); recalled, to be verified.
 * **Checked against** a second computation, tests/reference/mcadams-1954.
 */
export function nusseltPlateFacingDownFifthPower(ra: number, _pr: number, out: Nusselt): void {
  out.nu = 0.52 * ra ** 0.2;
  out.byLogRa = out.nu / 5;
  out.byPr = 0;
}

export const plateFacingDownCorrelations: Correlation[] = [
  {
    id: 'raithby-hollands',
    shape: 'plate-facing-down',
    formula: 'Nu = 2.45/ln(1 + 2.45/Nu_T), Nu_T = 0.527 Ra^⅕/[1 + (1.9/Pr)^0.9]^(2/9)',
    source: 'Raithby & Hollands, Handbook of Heat Transfer, ch. 4 (recalled, to be verified)',
    range: { ra: [1e3, 1e10] },
    mate: 'raithby-hollands',
    evaluate: nusseltPlateFacingDownRaithbyHollands,
  },
  {
    id: 'mcadams',
    shape: 'plate-facing-down',
    formula: 'Nu = 0.27 Ra^¼',
    source: 'McAdams, Heat Transmission, 3rd ed. (1954) (recalled, to be verified)',
    range: { ra: [1e5, 1e10] },
    mate: 'lloyd-moran',
    evaluate: nusseltPlateFacingDownMcAdams,
  },
  {
    id: 'fifth-power',
    shape: 'plate-facing-down',
    formula: 'Nu = 0.52 Ra^⅕',
    source: 'Incropera et al., Fundamentals of Heat and Mass Transfer (recalled, to be verified)',
    range: { ra: [1e4, 1e9] },
    mate: 'lloyd-moran',
    evaluate: nusseltPlateFacingDownFifthPower,
  },
];
