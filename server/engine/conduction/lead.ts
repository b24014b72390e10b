/** Conductivity of copper wire [W/(m K)], common practice. */
const copperConductivity = 390;
/** Resistivity of annealed copper at 20 °C [Ω m] and its change [1/K] (IEC 60028, from memory). */
const copper = { at20C: 1.7241e-8, perK: 0.00393 };

/** Resistivity of copper [Ω m] at a temperature [°C]. **Source** IEC 60028: 1.7241·10⁻⁸ Ω m at 20 °C, 0.00393/K; from memory. */
export function copperResistivity(celsius: number): number {
  return copper.at20C * (1 + copper.perK * (celsius - 20));
}

/**
 * A lead in the room as a fin: G = √(h p k A) tanh(m L), m = √(h p/(k A)), p = π d over the insulation.
 *
 * @returns `conductance` from its beginning to the room [W/K], `slenderness` m L, and the `conductivity` used
 *
 * **Valid for** a conductor much better than its insulation, its end adiabatic.
 * **Source** the straight fin of any heat-transfer text; conductivity of copper common practice.
 * **Checked against** a long and a short fin, tests/engine/conduction.
 */
export function leadConduction(lead: {
  crossSection: number;
  diameter: number;
  length: number;
  filmCoefficient: number;
}): { conductance: number; slenderness: number; conductivity: number } {
  const perimeter = Math.PI * lead.diameter;
  const hp = lead.filmCoefficient * perimeter;
  const ka = copperConductivity * lead.crossSection;
  const slenderness = lead.length * Math.sqrt(hp / ka);
  return { conductance: Math.sqrt(hp * ka) * Math.tanh(slenderness), slenderness, conductivity: copperConductivity };
}

/**
 * Share of the heat that a lead makes evenly along itself which enters at its beginning as if it were made there: tanh(mL)/(mL).
 *
 * **Source** the fin equation with even generation: q_base = G (T_base − T_room − g/(h p)).
 */
export function leadGroundShare(slenderness: number): number {
  return slenderness < 1e-6 ? 1 : Math.tanh(slenderness) / slenderness;
}
