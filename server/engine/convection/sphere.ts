import { ofPrandtl, type Correlation, type Nusselt } from './correlation.js';

const psi = { value: 0, slope: 0 };

/** 0.589/[1 + (0.469/Pr)^(9/16)]^(4/9). */
const coefficient = ofPrandtl((pr, out) => {
  const x = (0.469 / pr) ** (9 / 16);
  out.value = 0.589 / (1 + x) ** (4 / 9);
  out.slope = (out.value * (4 / 9) * (9 / 16) * x) / ((1 + x) * pr);
});

/**
 * Natural convection of a sphere; L = diameter.
 *
 * Nu = 2 + 0.589 Ra^¼/[1 + (0.469/Pr)^(9/16)]^(4/9)
 *
 * **Valid for** Ra ≤ 10¹¹, Pr ≥ 0.7.
 * **Source** S. W. Churchill, Heat Exchanger Design Handbook (1983), short form, as given in textbooks.
 * **Checked against** a second computation, tests/reference/churchill-1983.
 */
export function nusseltSphereChurchill(ra: number, pr: number, out: Nusselt): void {
  coefficient(pr, psi);
  const quarter = Math.sqrt(Math.sqrt(ra));
  const term = psi.value * quarter;
  out.nu = 2 + term;
  out.byLogRa = term / 4;
  out.byPr = psi.slope * quarter;
}

export const sphereCorrelations: Correlation[] = [
  {
    id: 'churchill-sphere',
    shape: 'sphere',
    formula: 'Nu = 2 + 0.589 Ra^¼/[1 + (0.469/Pr)^(9/16)]^(4/9)',
    source: 'Churchill, Heat Exchanger Design Handbook (1983), short form',
    range: { ra: [0, 1e11] },
    evaluate: nusseltSphereChurchill,
  },
];
