/**
 * Air exchange across its range, by hand: the energy balance ρ c_p V̇ ΔT with c_p of a handbook’s air table (Incropera et al., Fundamentals of
 * Heat and Mass Transfer, appendix; from memory), the stack effect of texts on natural ventilation, and a fan’s working point found by bisection.
 */
import { describe, expect, it } from 'vitest';
import { buoyantFlow, carriedHeat, fanFlow } from '../../../server/engine/ventilation.js';
import { exactly } from '../correlation-check.js';

const outside = 300;

describe('A given flow', () => {
  // c_p [J/(kg K)] at the mean of both temperatures.
  it.each([
    [300.001, 1007],
    [400, 1009],
    [500, 1014],
    [700, 1030],
    [900, 1051],
    [1100, 1075],
  ])('of air at %d K carries the heat of its mass', (inside, cp) => {
    const out = { flow: 0, byFrom: 0, byTo: 0, film: 0 };
    carriedHeat(inside, outside, 101325, { value: 0.002, byInside: 0, byOutside: 0 }, out);
    const byHand = (101325 / (287.05 * inside)) * cp * 0.002 * (inside - outside);
    // The table’s c_p is of a real gas and rounded to 1 J/(kg K).
    expect(Math.abs(out.flow / byHand - 1)).toBeLessThan(0.005);
  });
});

describe('Buoyant flow', () => {
  it.each([0.01, 1, 10, 50, 200, 800])('at %d K above outside is C_d A √(2 g H ΔT/T_out), either way', (difference) => {
    const flow = { value: 0, byInside: 0, byOutside: 0 };
    const expected = exactly('2e-4 * sqrt(2 * 9.80665 * 0.3 * ra / 300)', difference, 0.7);
    buoyantFlow(outside + difference, outside, { effectiveArea: 2e-4, height: 0.3 }, flow);
    expect(flow.value / expected).toBeCloseTo(1, 9);
    // The slope of a root: half of it over its argument.
    expect(flow.byInside / (expected / (2 * difference))).toBeCloseTo(1, 9);
    if (difference >= 200) return;
    buoyantFlow(outside - difference, outside, { effectiveArea: 2e-4, height: 0.3 }, flow);
    expect(flow.value / expected).toBeCloseTo(1, 9);
  });
});

describe('A fan', () => {
  const curve = [
    [0, 40],
    [0.0015, 25],
    [0.002, 16],
    [0.003, 9],
    [0.005, 0],
  ] as const;

  function pressure(flow: number): number {
    const i = Math.max(
      1,
      curve.findIndex(([v]) => v >= flow),
    );
    const [v0, p0] = curve[i - 1] as readonly [number, number];
    const [v1, p1] = curve[i] as readonly [number, number];
    return p0 + ((p1 - p0) * (flow - v0)) / (v1 - v0);
  }

  it.each([5e-5, 1e-4, 2e-4, 2.6e-4, 3.6e-4, 6e-4, 2e-3])(
    'blows through %f m² what its curve and ρ/2 (V̇/A)² agree on',
    (area) => {
      let low = 0;
      let high = 0.005;
      for (let n = 0; n < 60; n++) {
        const middle = (low + high) / 2;
        if (0.6 * (middle / area) ** 2 < pressure(middle)) low = middle;
        else high = middle;
      }
      const out = { value: 0, byLogDensity: 0 };
      fanFlow(1.2, area, curve, out);
      // No working point here lies within 1 % of a corner, where the curve is rounded.
      expect(out.value / low).toBeCloseTo(1, 9);
    },
  );
});
