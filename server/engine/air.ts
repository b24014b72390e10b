import { interpolate } from './hermite.js';

/**
 * Dry air as an ideal gas. SI units, temperatures in kelvin.
 */

/** Specific gas constant of dry air [J/(kg K)]. */
export const gasConstant = 287.05;

/** Sutherland’s law: reference value at 273.15 K, and its constant S [K]. */
const viscosity = { at273: 1.716e-5, s: 110.4 };
const conductivity = { at273: 0.0241, s: 194 };

/** Range over which these laws are used [K]. */
export const airRange = { temperature: [150, 1500] } as const;

function sutherland(law: { at273: number; s: number }, t: number): number {
  return (law.at273 * (t / 273.15) ** 1.5 * (273.15 + law.s)) / (t + law.s);
}

/** d ln(law)/dT [1/K]. */
function sutherlandSlope(law: { s: number }, t: number): number {
  return 1.5 / t - 1 / (t + law.s);
}

/**
 * Dynamic viscosity μ [Pa s] at T [K], Sutherland’s law.
 * **Source** constants of physics handbooks: 1.716·10⁻⁵ Pa s at 273.15 K, S = 110.4 K.
 */
export function airViscosity(t: number): number {
  return sutherland(viscosity, t);
}

/** Thermal conductivity k [W/(m K)] at T [K], Sutherland’s law with 0.0241 W/(m K) at 273.15 K, S = 194 K. */
export function airConductivity(t: number): number {
  return sutherland(conductivity, t);
}

/** Terms of the ideal-gas heat capacity: constant N₇, and two Planck–Einstein terms (share, temperature [K]). */
const heatCapacity = {
  constant: 2.490888032,
  criticalTemperature: 132.6312,
  molarGasConstant: 8.31451,
  molarMass: 0.0289586,
  power: [0.6057194e-7, -0.210274769e-4, -0.158860716e-3] as const,
  root: -0.19536342e-3,
  einstein: [
    [0.791309509, 25.36365],
    [0.212236768, 16.90741],
  ] as const,
};

/**
 * Isobaric ideal-gas heat capacity c_p of dry air and its slope.
 *
 * c_p/R = 1 − τ² α°_ττ, with τ = 132.6312 K/T.
 *
 * @param t temperature T [K]
 * @param out where to write; a new object without it
 * @returns `value` [J/(kg K)] and `slope` dc_p/dT [J/(kg K²)]
 *
 * **Valid for** 60 … 2000 K (the term of dissociation, under 10⁻⁶ below 1500 K, is left out).
 * **Source** E. W. Lemmon, R. T. Jacobsen, S. G. Penoncello, D. G. Friend, J. Phys. Chem. Ref. Data 29 (2000) 331–385, ideal-gas part;
 * coefficients from memory.
 * **Checked against** handbook values at 250 … 500 K within 0.5 %, tests/reference/air-handbook-table.
 */
export function airHeatCapacity(t: number, out = { value: 0, slope: 0 }): { value: number; slope: number } {
  const { constant, criticalTemperature, molarGasConstant, molarMass, power, root, einstein } = heatCapacity;
  const tau = criticalTemperature / t;
  // τ² α°_ττ and its derivative by τ.
  let sum = 12 * power[0] * tau ** -3 + 6 * power[1] * tau ** -2 + (2 * power[2]) / tau;
  let slope = -36 * power[0] * tau ** -4 - 12 * power[1] * tau ** -3 - (2 * power[2]) / tau ** 2;
  sum += 0.75 * root * tau ** 1.5;
  slope += 1.125 * root * Math.sqrt(tau);
  sum -= constant;
  for (let i = 0; i < einstein.length; i++) {
    const [share, theta] = einstein[i] as readonly [number, number];
    const u = theta * tau;
    const e = Math.exp(-u);
    const term = (share * u * u * e) / (1 - e) ** 2;
    sum -= term;
    slope -= term * (2 / tau - (theta * (1 + e)) / (1 - e));
  }
  const r = molarGasConstant / molarMass;
  out.value = r * (1 - sum);
  out.slope = r * slope * (tau / t);
  return out;
}

/** Properties of air at one film temperature, with the logarithmic slopes that the derivatives of a film need. */
export interface FilmAir {
  /** k [W/(m K)] and d ln k/dT [1/K]. */
  conductivity: number;
  conductivitySlope: number;
  /** Pr and dPr/dT [1/K]. */
  prandtl: number;
  prandtlSlope: number;
  /** g β/(ν α) [1/(m³ K)] and its d ln/dT [1/K]: Ra = this × ΔT × L³. */
  rayleighFactor: number;
  rayleighSlope: number;
  /** ν [m²/s] and d ln ν/dT [1/K]. */
  kinematicViscosity: number;
  viscositySlope: number;
}

/** A blank to be filled by `filmAir`. */
export function blankFilmAir(): FilmAir {
  return {
    conductivity: 0,
    conductivitySlope: 0,
    prandtl: 0,
    prandtlSlope: 0,
    rayleighFactor: 0,
    rayleighSlope: 0,
    kinematicViscosity: 0,
    viscositySlope: 0,
  };
}

const heatCapacityNow = { value: 0, slope: 0 };

/** Properties of one film temperature at 1 Pa and 1 m/s²: values with slopes by temperature, written in this order. */
function unitAir(t: number, out: Float64Array, at: number): void {
  const mu = sutherland(viscosity, t);
  const k = sutherland(conductivity, t);
  const cp = airHeatCapacity(t, heatCapacityNow);
  const muSlope = sutherlandSlope(viscosity, t);
  const kSlope = sutherlandSlope(conductivity, t);
  const cpSlope = cp.slope / cp.value;
  const prandtl = (mu * cp.value) / k;
  const rho = 1 / (gasConstant * t);
  const rayleigh = (rho * rho * cp.value) / (t * mu * k);
  out[at] = k;
  out[at + 1] = k * kSlope;
  out[at + 2] = prandtl;
  out[at + 3] = prandtl * (muSlope + cpSlope - kSlope);
  out[at + 4] = rayleigh;
  out[at + 5] = rayleigh * (-3 / t + cpSlope - muSlope - kSlope);
  out[at + 6] = mu / rho;
  out[at + 7] = (mu / rho) * (muSlope + 1 / t);
}

/** The table that `filmAir` reads: one row per kelvin. Between rows the error of the interpolation stays under 10⁻⁸ of the value. */
const rows = { first: airRange.temperature[0], last: airRange.temperature[1], width: 8 };
const table = new Float64Array((rows.last - rows.first + 1) * rows.width);
for (let i = 0; i <= rows.last - rows.first; i++) unitAir(rows.first + i, table, i * rows.width);
const exact = new Float64Array(rows.width);
const now = { value: 0, slope: 0 };

/**
 * All properties at a film temperature, written into `out`.
 *
 * ρ = p/(R T), β = 1/T, ν = μ/ρ, α = k/(ρ c_p), Pr = μ c_p/k, so g β/(ν α) = g ρ² c_p/(T μ k). Read from a table of these laws, by cubic
 * Hermite interpolation with its own slopes.
 *
 * @param t film temperature [K]
 * @param pressure p [Pa]
 * @param gravity g [m/s²]
 */
export function filmAir(t: number, pressure: number, gravity: number, out: FilmAir): void {
  const perPressure = gravity * pressure * pressure;
  if (!(t >= rows.first && t < rows.last)) {
    unitAir(t, exact, 0);
    out.conductivity = exact[0] as number;
    out.conductivitySlope = (exact[1] as number) / out.conductivity;
    out.prandtl = exact[2] as number;
    out.prandtlSlope = exact[3] as number;
    out.rayleighFactor = perPressure * (exact[4] as number);
    out.rayleighSlope = (exact[5] as number) / (exact[4] as number);
    out.kinematicViscosity = (exact[6] as number) / pressure;
    out.viscositySlope = (exact[7] as number) / (exact[6] as number);
    return;
  }
  const row = Math.floor(t - rows.first);
  const u = t - rows.first - row;
  const at = row * rows.width;
  interpolate(table, at, rows.width, u, 1, now);
  out.conductivity = now.value;
  out.conductivitySlope = now.slope / now.value;
  interpolate(table, at + 2, rows.width, u, 1, now);
  out.prandtl = now.value;
  out.prandtlSlope = now.slope;
  interpolate(table, at + 4, rows.width, u, 1, now);
  out.rayleighFactor = perPressure * now.value;
  out.rayleighSlope = now.slope / now.value;
  interpolate(table, at + 6, rows.width, u, 1, now);
  out.kinematicViscosity = now.value / pressure;
  out.viscositySlope = now.slope / now.value;
}
