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

type FanCurve = readonly (readonly [number, number])[];

/** Share of the last flow over which a curve that ends under pressure is brought down to none. */
const dropShare = 0.01;

/**
 * A fan curve that reaches zero pressure: one that ends above it falls to nothing over the last 1 % of its flow, so that no opening, however
 * large, draws more than its last flow [m³/s], and the flow has a slope there too.
 */
export function closedFanCurve(curve: FanCurve): FanCurve {
  const last = curve.at(-1) as readonly [number, number];
  const before = curve.at(-2);
  if (last[1] === 0 || !before) return curve;
  const drop = Math.min(dropShare * last[0], (last[0] - before[0]) / 2);
  const slope = (last[1] - before[1]) / (last[0] - before[0]);
  return [...curve.slice(0, -1), [last[0] - drop, last[1] - slope * drop], [last[0], 0]];
}

/** Half width over which a corner of the curve is rounded, as a share of the shorter piece beside it. */
const cornerShare = 0.01;

/**
 * Flow of a fan against the resistance of its openings: where its curve p(V̇), straight between its points, meets
 * ρ/2 (V̇/(C_d A))². The curve’s corners are rounded by a parabola over ±1 % of the shorter piece beside them, so that the slope is continuous.
 * Below its first flow the curve goes on straight.
 *
 * @param density ρ of the air that passes [kg/m³]
 * @param effectiveArea C_d A [m²]
 * @param curve [[m³/s, Pa], …], rising in flow, falling in pressure; `closedFanCurve` makes it reach zero pressure
 * @returns V̇ [m³/s] and dV̇/d ln ρ; at most the last flow of the curve
 *
 * **Source** the working point of a fan, common practice.
 * **Checked against** a hand calculation, tests/reference/ventilation.
 */
export function fanFlow(
  density: number,
  effectiveArea: number,
  curve: FanCurve,
  out: { value: number; byLogDensity: number },
): void {
  const a = density / (2 * effectiveArea ** 2);
  for (let i = 1; i < curve.length; i++) {
    const [v0, p0] = curve[i - 1] as readonly [number, number];
    const [v1, p1] = curve[i] as readonly [number, number];
    const slope = (p1 - p0) / (v1 - v0);
    const next = curve[i + 1];
    const half = next ? cornerShare * Math.min(v1 - v0, next[0] - v1) : 0;
    // The fan’s surplus of pressure falls all along the curve: the first place where there is none is the working point.
    if (a * (v1 - half) ** 2 >= p1 - slope * half) {
      const free = p0 - slope * v0;
      // a V² − slope V − free = 0.
      const root = (slope + Math.sqrt(slope * slope + 4 * a * Math.max(free, 0))) / (2 * a);
      settle(a, root, slope, out);
      return;
    }
    if (!next) break;
    const after = (next[1] - p1) / (next[0] - v1);
    if (a * (v1 + half) ** 2 < p1 + after * half) continue;
    // With x = V − v1 the rounded curve is p1 + mean x + bend (x² + half²).
    const mean = (slope + after) / 2;
    const bend = (after - slope) / (4 * half);
    const linear = 2 * a * v1 - mean;
    const constant = a * v1 * v1 - p1 - bend * half * half;
    const x = (-2 * constant) / (linear + Math.sqrt(Math.max(linear * linear - 4 * (a - bend) * constant, 0)));
    settle(a, v1 + x, mean + 2 * bend * x, out);
    return;
  }
  out.value = (curve.at(-1) as readonly [number, number])[0];
  out.byLogDensity = 0;
}

/** A working point with its slope: a V² d ln ρ + 2 a V dV = p′ dV. */
function settle(a: number, flow: number, slope: number, out: { value: number; byLogDensity: number }): void {
  out.value = flow;
  out.byLogDensity = flow > 0 ? (-a * flow * flow) / (2 * a * flow - slope) : 0;
}
