import { laminarCoefficient, ofPrandtl, powerSum, thickLayer, type Correlation, type Nusselt } from './correlation.js';

/** Workspace, so that the hot loop allocates nothing. */
const laminar = { value: 0, slope: 0 };
const thick = { value: 0, slope: 0 };
const sum = { value: 0, byA: 0, byB: 0 };
const turbulence = { value: 0, slope: 0 };
const psi = { value: 0, slope: 0 };

/** C_t = 0.13 Pr^0.22/(1 + 0.61 Pr^0.81)^0.42 of Raithby & Hollands. */
const turbulentCoefficient = ofPrandtl((pr, out) => {
  const q = 0.61 * pr ** 0.81;
  out.value = (0.13 * pr ** 0.22) / (1 + q) ** 0.42;
  out.slope = (out.value / pr) * (0.22 - (0.42 * 0.81 * q) / (1 + q));
});

/** 0.387/[1 + (0.492/Pr)^(9/16)]^(8/27) of Churchill & Chu. */
const churchillChuCoefficient = ofPrandtl((pr, out) => {
  const x = (0.492 / pr) ** (9 / 16);
  out.value = 0.387 / (1 + x) ** (8 / 27);
  out.slope = (out.value * (8 / 27) * (9 / 16) * x) / ((1 + x) * pr);
});

/**
 * Natural convection of a vertical plate, laminar and turbulent.
 *
 * Nu_T = C̄_l Ra^¼; Nu_l = 2/ln(1 + 2/Nu_T); Nu_t = C_t Ra^⅓/(1 + 1.4·10⁹ Pr/Ra), C_t = 0.13 Pr^0.22/(1 + 0.61 Pr^0.81)^0.42;
 * Nu = (Nu_l⁶ + Nu_t⁶)^(1/6).
 *
 * @param ra Ra on the height L; @param pr Pr; @param out Nu and its slopes
 *
 * **Valid for** 0.1 ≤ Ra ≤ 10¹².
 * **Source** G. D. Raithby, K. G. T. Hollands, “Natural convection”, Handbook of Heat Transfer, 3rd ed. (1998), ch. 4;
 * recalled, to be verified.
 * **Checked against** a second computation in high precision, tests/reference/raithby-hollands.
 */
export function nusseltVerticalPlateRaithbyHollands(ra: number, pr: number, out: Nusselt): void {
  laminarCoefficient(pr, laminar);
  const quarter = Math.sqrt(Math.sqrt(ra));
  thickLayer(laminar.value * quarter, 2, thick);
  const layerByLogRa = thick.slope * laminar.value * quarter * 0.25;
  const layerByPr = thick.slope * laminar.slope * quarter;
  turbulentCoefficient(pr, turbulence);
  const ct = turbulence.value;
  const ctByPr = turbulence.slope;
  let turbulent = 0;
  let turbulentByLogRa = 0;
  let turbulentByPr = 0;
  if (ra > 0) {
    const onset = (1.4e9 * pr) / ra;
    turbulent = (ct * Math.cbrt(ra)) / (1 + onset);
    turbulentByLogRa = turbulent * (1 / 3 + onset / (1 + onset));
    turbulentByPr = turbulent * (ctByPr / ct - onset / pr / (1 + onset));
  }
  powerSum(thick.value, turbulent, 6, sum);
  out.nu = sum.value;
  out.byLogRa = sum.byA * layerByLogRa + sum.byB * turbulentByLogRa;
  out.byPr = sum.byA * layerByPr + sum.byB * turbulentByPr;
}

/**
 * Natural convection of a vertical plate, one formula for all Ra.
 *
 * Nu = {0.825 + 0.387 Ra^(1/6)/[1 + (0.492/Pr)^(9/16)]^(8/27)}²
 *
 * **Valid for** Ra ≤ 10¹², all Pr.
 * **Source** S. W. Churchill, H. H. S. Chu, Int. J. Heat Mass Transfer 18 (1975) 1323–1329, eq. 9.
 * **Checked against** a second computation and a textbook’s vertical fire screen, tests/reference.
 */
export function nusseltVerticalPlateChurchillChu(ra: number, pr: number, out: Nusselt): void {
  churchillChuCoefficient(pr, psi);
  const sixth = Math.cbrt(Math.sqrt(ra));
  const term = psi.value * sixth;
  const root = 0.825 + term;
  out.nu = root * root;
  out.byLogRa = (2 * root * term) / 6;
  out.byPr = 2 * root * psi.slope * sixth;
}

/**
 * Natural convection of a vertical plate, laminar.
 *
 * Nu = 0.68 + 0.670 Ra^¼/[1 + (0.492/Pr)^(9/16)]^(4/9)
 *
 * **Valid for** Ra ≤ 10⁹.
 * **Source** S. W. Churchill, H. H. S. Chu, Int. J. Heat Mass Transfer 18 (1975) 1323–1329.
 * **Checked against** a second computation, tests/reference/churchill-chu-1975.
 */
export function nusseltVerticalPlateChurchillChuLaminar(ra: number, pr: number, out: Nusselt): void {
  laminarCoefficient(pr, laminar);
  // 0.670 here, 0.671 in the coefficient.
  const quarter = (0.67 / 0.671) * Math.sqrt(Math.sqrt(ra));
  const term = laminar.value * quarter;
  out.nu = 0.68 + term;
  out.byLogRa = term / 4;
  out.byPr = laminar.slope * quarter;
}

export const verticalPlateCorrelations: Correlation[] = [
  {
    id: 'raithby-hollands',
    shape: 'vertical-plate',
    formula: 'Nu = (Nu_l⁶ + Nu_t⁶)^(1/6), Nu_l = 2/ln(1 + 2/(C̄_l Ra^¼)), Nu_t = C_t Ra^⅓/(1 + 1.4·10⁹ Pr/Ra)',
    source: 'Raithby & Hollands, Handbook of Heat Transfer, ch. 4 (recalled, to be verified)',
    range: { ra: [0.1, 1e12] },
    evaluate: nusseltVerticalPlateRaithbyHollands,
  },
  {
    id: 'churchill-chu',
    shape: 'vertical-plate',
    formula: 'Nu = {0.825 + 0.387 Ra^(1/6)/[1 + (0.492/Pr)^(9/16)]^(8/27)}²',
    source: 'Churchill & Chu, Int. J. Heat Mass Transfer 18 (1975) 1323',
    range: { ra: [0, 1e12] },
    evaluate: nusseltVerticalPlateChurchillChu,
  },
  {
    id: 'churchill-chu-laminar',
    shape: 'vertical-plate',
    formula: 'Nu = 0.68 + 0.670 Ra^¼/[1 + (0.492/Pr)^(9/16)]^(4/9)',
    source: 'Churchill & Chu, Int. J. Heat Mass Transfer 18 (1975) 1323',
    range: { ra: [0, 1e9] },
    evaluate: nusseltVerticalPlateChurchillChuLaminar,
  },
];
