import { airHeatCapacity, gasConstant } from './air.js';
import { gravity } from './constants.js';
import type { FlowOut } from './network/laws/law.js';

const heatCapacity = { value: 0, slope: 0 };

/**
 * Heat that a volume flow carries from inside to outside air: q = ρ c_p V̇ (T_in − T_out), ρ = p/(R T_in) of the air that leaves, c_p at the
 * mean of both temperatures.
 *
 * @param flow V̇ [m³/s], with its slopes by both temperatures
 * @param pressure p [Pa]
 *
 * **Source** steady-flow energy balance.
 * **Checked against** a hand calculation, tests/reference/ventilation.
 */
export function carriedHeat(
  inside: number,
  outside: number,
  pressure: number,
  flow: { value: number; byInside: number; byOutside: number },
  out: FlowOut,
): void {
  const cp = airHeatCapacity((inside + outside) / 2, heatCapacity);
  const density = pressure / (gasConstant * inside);
  const difference = inside - outside;
  const perFlow = density * cp.value;
  const bend = (density * flow.value * difference * cp.slope) / 2;
  out.flow = perFlow * flow.value * difference;
  out.byFrom = perFlow * flow.value + bend + perFlow * difference * (flow.byInside - flow.value / inside);
  out.byTo = -perFlow * flow.value + bend + perFlow * difference * flow.byOutside;
}

/**
 * Flow through a low and a high opening by buoyancy: V̇ = C_d A_eff √(2 g H |ΔT|/T_out), 1/A_eff² = 1/A_in² + 1/A_out².
 *
 * @param openings `effectiveArea` C_d A_eff [m²], `height` H [m]
 * @param flow V̇ [m³/s] and its slopes times nothing: at ΔT = 0 the slopes by temperature are infinite, but ΔT × slope is zero, so they are
 * given as zero there
 *
 * **Source** stack effect with both openings in series, as in any text on natural ventilation.
 * **Checked against** a hand calculation, tests/reference/ventilation.
 */
export function buoyantFlow(
  inside: number,
  outside: number,
  openings: { effectiveArea: number; height: number },
  flow: { value: number; byInside: number; byOutside: number },
): void {
  const difference = inside - outside;
  const size = Math.abs(difference);
  if (size < 1e-12) {
    flow.value = 0;
    flow.byInside = 0;
    flow.byOutside = 0;
    return;
  }
  flow.value = openings.effectiveArea * Math.sqrt((2 * gravity * openings.height * size) / outside);
  flow.byInside = flow.value / (2 * difference);
  flow.byOutside = -flow.value / (2 * difference) - flow.value / (2 * outside);
}

/** Effective area of two openings in series [m²]; nothing where one is closed. */
export function openingsInSeries(inlet: number, outlet: number): number {
  return inlet > 0 && outlet > 0 ? 1 / Math.sqrt(1 / inlet ** 2 + 1 / outlet ** 2) : 0;
}

/**
 * Flow of a fan against the resistance of its openings: where its curve p(V̇), straight between its points, meets
 * ρ/2 (V̇/(C_d A))².
 *
 * @param density ρ of the air that passes [kg/m³]
 * @param effectiveArea C_d A [m²]
 * @returns V̇ [m³/s] and dV̇/d ln ρ; at most the last flow of the curve
 *
 * **Source** the working point of a fan, common practice.
 * **Checked against** a hand calculation, tests/reference/ventilation.
 */
export function fanFlow(
  density: number,
  effectiveArea: number,
  curve: readonly (readonly [number, number])[],
  out: { value: number; byLogDensity: number },
): void {
  const a = density / (2 * effectiveArea ** 2);
  for (let i = 1; i < curve.length; i++) {
    const [v0, p0] = curve[i - 1] as readonly [number, number];
    const [v1, p1] = curve[i] as readonly [number, number];
    // Beyond this piece the fan still has the greater pressure.
    if (a * v1 * v1 < p1) continue;
    const slope = (p1 - p0) / (v1 - v0);
    const free = p0 - slope * v0;
    // a V² − slope V − free = 0.
    const root = (slope + Math.sqrt(slope * slope + 4 * a * Math.max(free, 0))) / (2 * a);
    out.value = Math.min(Math.max(root, v0), v1);
    out.byLogDensity = (-a * out.value * out.value) / (2 * a * out.value - slope);
    return;
  }
  out.value = (curve.at(-1) as readonly [number, number])[0];
  out.byLogDensity = 0;
}
