/**
 * Spreading of heat from a small source into a larger plate. SI units.
 */

export interface SpreadingInput {
  /** Contact area of the source [m²]. */
  sourceArea: number;
  /** Area of the plate [m²]. */
  plateArea: number;
  /** Thickness of the plate t [m]. */
  thickness: number;
  /** Conductivity of the plate k [W/(m K)]. */
  conductivity: number;
  /** Mean film coefficient on the far side h [W/(m² K)], over the plate’s area. */
  filmCoefficient: number;
}

export interface SpreadingAnswer {
  /** From the hottest point of the source to the mean of the plate’s near side [K/W]. */
  peak: number;
  /** From the mean of the source to the mean of the plate’s near side [K/W]. */
  mean: number;
  /** Excess under the source on the far side ÷ excess on the near side, 0 … 1. */
  farSideShare: number;
}

/**
 * Spreading resistance of a uniform heat flux into a plate that is cooled on its far side, closed form.
 *
 * With a and b the radii of the circles of the same areas, ε = a/b, τ = t/b, Bi = h b/k, λ = π + 1/(√π ε):
 * Φ = (tanh λτ + λ/Bi) / (1 + (λ/Bi) tanh λτ);
 * peak Ψ = ετ/√π + (1 − ε) Φ/√π, mean Ψ = ετ/√π + ½ (1 − ε)^1.5 Φ; R = Ψ/(√π k a).
 * The term ετ/√π is the plate’s one-dimensional resistance; it is left out here, the network carries it.
 *
 * Neither passes what it would be if no heat spread at all, (t/k + 1/h)(1/A_s − 1/A): the formula would for a large source on a
 * thin poor conductor.
 *
 * The share on the far side is that of the single mode λ through the plate: 1/(cosh λτ + (Bi/λ) sinh λτ).
 *
 * @returns resistances [K/W] beyond the one-dimensional one
 *
 * **Valid for** any ε in (0, 1], τ > 0, Bi > 0; source in the middle; from the exact series within 10 % for small
 * sources under weak films, up to 14 % (mean) and 20 % (peak) for large sources under strong ones.
 * **Source** S. Lee, S. Song, V. Au, K. P. Moran, “Constriction/spreading resistance model for electronics
 * packaging”, ASME/JSME Thermal Engineering Conf. 4 (1995) 199–206; recalled, to be verified.
 * **Checked against** its own limits, peak 1/(π k a) and mean 1/(2 √π k a) on a thick body, and zero for a source as large as the
 * plate, tests/reference/lee-song-au-moran-1995.
 */
export function spreadingLeeSongAuMoran(input: SpreadingInput): SpreadingAnswer {
  const a = Math.sqrt(input.sourceArea / Math.PI);
  const b = Math.sqrt(input.plateArea / Math.PI);
  const epsilon = Math.min(1, a / b);
  const tau = input.thickness / b;
  const biot = (input.filmCoefficient * b) / input.conductivity;
  const lambda = Math.PI + 1 / (Math.sqrt(Math.PI) * epsilon);
  const tanh = Math.tanh(lambda * tau);
  const phi = (tanh + lambda / biot) / (1 + (lambda / biot) * tanh);
  const perRadius = 1 / (Math.sqrt(Math.PI) * input.conductivity * a);
  const withoutSpreading =
    (input.thickness / input.conductivity + 1 / input.filmCoefficient) *
    Math.max(1 / input.sourceArea - 1 / input.plateArea, 0);
  return {
    peak: Math.min(perRadius * ((1 - epsilon) / Math.sqrt(Math.PI)) * phi, withoutSpreading),
    mean: Math.min(perRadius * 0.5 * (1 - epsilon) ** 1.5 * phi, withoutSpreading),
    farSideShare: 1 / (Math.cosh(lambda * tau) + (biot / lambda) * Math.sinh(lambda * tau)),
  };
}
