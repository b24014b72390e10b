import { laminarCoefficient, type Correlation, type Nusselt } from './correlation.js';
import { nusseltVerticalPlateRaithbyHollands } from './vertical-plate.js';

const laminar = { value: 0, slope: 0 };

/** Thin-layer Nusselt number below which its fall to zero is rounded off in ζ, so that a cylinder without any excess loses finite heat. */
const rounding = 0.05;

/**
 * Natural convection of a vertical cylinder’s side: the plate of its height, enhanced by its curvature.
 *
 * Nu = Nu_plate ζ/ln(1 + ζ), ζ = 1.8 (L/D)/Nu_T, Nu_T = C̄_l Ra^¼; L = height. In ζ, Nu_T stands as √(Nu_T² + 0.05²), which changes it
 * by less than 0.5 % above Nu_T = 0.5.
 *
 * @param ratio L/D
 *
 * **Valid for** as the plate.
 * **Source** G. D. Raithby, K. G. T. Hollands, Handbook of Heat Transfer, 3rd ed. (1998), ch. 4; recalled, to be verified.
 * **Checked against** a second computation in high precision, tests/reference/raithby-hollands.
 */
export function nusseltVerticalCylinderRaithbyHollands(ra: number, pr: number, out: Nusselt, ratio = 1): void {
  nusseltVerticalPlateRaithbyHollands(ra, pr, out);
  laminarCoefficient(pr, laminar);
  const quarter = Math.sqrt(Math.sqrt(ra));
  const thin = laminar.value * quarter;
  const rounded = Math.sqrt(thin * thin + rounding * rounding);
  const zeta = (1.8 * ratio) / rounded;
  const log = Math.log1p(zeta);
  const factor = zeta / log;
  // d factor/dζ = (ln(1 + ζ) − ζ/(1 + ζ))/ln²(1 + ζ); dζ/dNu_T = −ζ Nu_T/(Nu_T² + 0.05²).
  const byThin = ((log - zeta / (1 + zeta)) / (log * log)) * ((-zeta * thin) / (rounded * rounded));
  out.byLogRa = out.byLogRa * factor + (out.nu * byThin * thin) / 4;
  out.byPr = out.byPr * factor + out.nu * byThin * laminar.slope * quarter;
  out.nu *= factor;
}

export const verticalCylinderCorrelations: Correlation[] = [
  {
    id: 'raithby-hollands',
    shape: 'vertical-cylinder',
    formula: 'Nu = Nu_plate ζ/ln(1 + ζ), ζ = 1.8 (L/D)/(C̄_l Ra^¼)',
    source: 'Raithby & Hollands, Handbook of Heat Transfer, ch. 4 (recalled, to be verified)',
    range: { ra: [0.1, 1e12] },
    evaluate: nusseltVerticalCylinderRaithbyHollands,
  },
];
