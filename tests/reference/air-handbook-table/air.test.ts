/**
 * Dry air at 10⁵ Pa, after the table of Incropera et al., Fundamentals of Heat and Mass Transfer, appendix A.4 (the book’s densities
 * are for one atmosphere of 10⁵ Pa). Values recalled from memory, to be verified.
 */
import { describe, expect, it } from 'vitest';
import { airHeatCapacity, blankFilmAir, filmAir } from '../../../server/engine/air.js';
import { gravity } from '../../../server/engine/constants.js';

/** T [K], c_p [J/(kg K)], ν [10⁻⁶ m²/s], k [10⁻³ W/(m K)], Pr. */
const table: [number, number, number, number, number][] = [
  [250, 1006, 11.44, 22.3, 0.72],
  [300, 1007, 15.89, 26.3, 0.707],
  [350, 1009, 20.92, 30.0, 0.7],
  [400, 1014, 26.41, 33.8, 0.69],
  [450, 1021, 32.39, 37.3, 0.686],
  [500, 1030, 38.79, 40.7, 0.684],
];

describe('Air against a handbook table', () => {
  it.each(table)('at %d K: c_p within 0.5 %, ν and k within 1.5 %, Pr within 1 %', (t, cp, nu, k, pr) => {
    const air = blankFilmAir();
    filmAir(t, 1e5, gravity, air);
    expect(Math.abs(airHeatCapacity(t).value / cp - 1)).toBeLessThan(0.005);
    expect(Math.abs((air.kinematicViscosity * 1e6) / nu - 1)).toBeLessThan(0.015);
    expect(Math.abs((air.conductivity * 1e3) / k - 1)).toBeLessThan(0.015);
    expect(Math.abs(air.prandtl / pr - 1)).toBeLessThan(0.01);
  });

  it('has the slopes that central differences have', () => {
    const at = (t: number) => {
      const air = blankFilmAir();
      filmAir(t, 1e5, gravity, air);
      return air;
    };
    for (const t of [200, 300, 450, 900, 1400]) {
      const here = at(t);
      const [a, b] = [at(t - 0.05), at(t + 0.05)];
      const log = (x: number, y: number) => Math.log(y / x) / 0.1;
      expect(log(a.conductivity, b.conductivity)).toBeCloseTo(here.conductivitySlope, 8);
      expect(log(a.rayleighFactor, b.rayleighFactor)).toBeCloseTo(here.rayleighSlope, 8);
      expect(log(a.kinematicViscosity, b.kinematicViscosity)).toBeCloseTo(here.viscositySlope, 8);
      expect((b.prandtl - a.prandtl) / 0.1).toBeCloseTo(here.prandtlSlope, 8);
    }
  });

  it('gives Ra of a metre and a kelvin as g β ΔT L³/(ν α) from the table, within 4 %', () => {
    const air = blankFilmAir();
    filmAir(300, 1e5, gravity, air);
    const byTable = 9.81 / 300 / (15.89e-6 * 22.5e-6);
    expect(Math.abs(air.rayleighFactor / byTable - 1)).toBeLessThan(0.04);
  });
});
