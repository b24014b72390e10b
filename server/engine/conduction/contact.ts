/** Dry joint of a printed part on metal or on another print, common practice [K m²/W]. */
export const dryJointPrinted = 5e-4;
/** Dry joint of metal on metal, common practice [K m²/W]. */
export const dryJointMetal = 1e-4;

/** One layer of an attachment: bond line [m], conductivity [W/(m K)], extra specific resistance [K m²/W], contact share. */
export interface ContactLayer {
  thickness: number;
  conductivity: number;
  specificResistance: number;
  contactShare: number;
}

/**
 * Specific resistance of a stack of layers, each over its share of the contact area.
 *
 * r = Σ (t/k + r_layer) / share
 *
 * @returns [K m²/W]; divide by the contact area for K/W
 *
 * **Valid for** layers thin against the contact’s width.
 * **Source** one-dimensional conduction in series.
 * **Checked against** a hand calculation, tests/engine/conduction.
 */
export function stackSpecificResistance(layers: readonly ContactLayer[]): number {
  return layers.reduce(
    (sum, layer) => sum + (layer.thickness / layer.conductivity + layer.specificResistance) / layer.contactShare,
    0,
  );
}
