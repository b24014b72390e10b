import { ofPrandtl, type Correlation, type Nusselt } from './correlation.js';
import { piecewise } from './pieces.js';

const psi = { value: 0, slope: 0 };

/** 0.387/[1 + (0.559/Pr)^(9/16)]^(8/27) of Churchill & Chu. */
const coefficient = ofPrandtl((pr, out) => {
  const x = (0.559 / pr) ** (9 / 16);
  out.value = 0.387 / (1 + x) ** (8 / 27);
  out.slope = (out.value * (8 / 27) * (9 / 16) * x) / ((1 + x) * pr);
});

/**
 * Natural convection of a long horizontal cylinder; L = diameter.
 *
 * Nu = {0.60 + 0.387 Ra^(1/6)/[1 + (0.559/Pr)^(9/16)]^(8/27)}²
 *
 * **Valid for** 10⁻⁵ ≤ Ra ≤ 10¹², all Pr.
 * **Source** S. W. Churchill, H. H. S. Chu, Int. J. Heat Mass Transfer 18 (1975) 1049–1053.
 * **Checked against** a second computation, tests/reference/churchill-chu-1975, and textbooks’ horizontal pipes, tests/reference/textbook-surfaces.
 */
export function nusseltHorizontalCylinderChurchillChu(ra: number, pr: number, out: Nusselt): void {
  coefficient(pr, psi);
  const sixth = Math.cbrt(Math.sqrt(ra));
  const term = psi.value * sixth;
  const root = 0.6 + term;
  out.nu = root * root;
  out.byLogRa = (2 * root * term) / 6;
  out.byPr = 2 * root * psi.slope * sixth;
}

const morganPieces = piecewise([
  { coefficient: 0.675, power: 0.058, upTo: 1e-2 },
  { coefficient: 1.02, power: 0.148, upTo: 1e2 },
  { coefficient: 0.85, power: 0.188, upTo: 1e4 },
  { coefficient: 0.48, power: 0.25, upTo: 1e7 },
  { coefficient: 0.125, power: 1 / 3, upTo: Infinity },
]);

/**
 * Natural convection of a long horizontal cylinder in five power laws C Ra^n, blended within a factor 3 of their joints (the pieces
 * differ there by less than 1 %); L = diameter.
 *
 * **Valid for** 10⁻¹⁰ ≤ Ra ≤ 10¹².
 * **Source** V. T. Morgan, Advances in Heat Transfer 11 (1975) 199–264, as given in textbooks; recalled, to be verified.
 * **Checked against** a second computation in the middle of each piece, tests/reference/morgan-1975.
 */
export function nusseltHorizontalCylinderMorgan(ra: number, _pr: number, out: Nusselt): void {
  morganPieces(ra, out);
}

export const horizontalCylinderCorrelations: Correlation[] = [
  {
    id: 'churchill-chu-cylinder',
    shape: 'horizontal-cylinder',
    formula: 'Nu = {0.60 + 0.387 Ra^(1/6)/[1 + (0.559/Pr)^(9/16)]^(8/27)}²',
    source: 'Churchill & Chu, Int. J. Heat Mass Transfer 18 (1975) 1049',
    range: { ra: [1e-5, 1e12] },
    evaluate: nusseltHorizontalCylinderChurchillChu,
  },
  {
    id: 'morgan',
    shape: 'horizontal-cylinder',
    formula: 'Nu = C Ra^n in five pieces: 0.675 Ra^0.058, 1.02 Ra^0.148, 0.850 Ra^0.188, 0.480 Ra^¼, 0.125 Ra^⅓',
    source: 'Morgan, Advances in Heat Transfer 11 (1975) 199 (recalled, to be verified)',
    range: { ra: [1e-10, 1e12] },
    evaluate: nusseltHorizontalCylinderMorgan,
  },
];
