/**
 * Air exchange by hand: ρ c_p V̇ ΔT with handbook properties of air (ρ = p/(287.05 T), c_p 1007 J/(kg K) near 30–50 °C), the stack effect
 * V̇ = C_d A √(2 g H ΔT/T_out) of texts on natural ventilation, and a fan’s working point. Common practice; formulas from memory.
 */
import { describe, expect, it } from 'vitest';
import { airHeatCapacity } from '../../../server/engine/air.js';
import { closedFanCurve, fanFlow, openingsInSeries } from '../../../server/engine/ventilation.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { network } from '../../engine/network/documents.js';

type Link = Parameters<typeof network>[0]['links'];

function carried(insideC: number, link: object): number {
  const { flowsW } = solveNetwork(
    network({
      nodes: [
        { id: 'in', fixedC: insideC },
        { id: 'out', fixedC: 25 },
      ],
      links: [{ id: 'air', kind: 'ventilation', from: 'in', to: 'out', ...link }] as Link,
    }),
  );
  return flowsW.air ?? NaN;
}

const density = (celsius: number) => 101325 / (287.05 * (celsius + 273.15));

/** c_p at the mean of both temperatures, by the law that the handbook table checks [J/(kg K)]. */
const meanHeatCapacity = (insideC: number) => airHeatCapacity((insideC + 25) / 2 + 273.15).value;

const warm = [26, 35, 55, 90, 200, 600];

describe('Air exchange', () => {
  it('of a given flow is ρ c_p V̇ ΔT, at the temperature of the air that leaves', () => {
    for (const insideC of warm) {
      const heat = carried(insideC, { flowM3PerS: 0.002 });
      expect(heat / (density(insideC) * meanHeatCapacity(insideC) * 0.002 * (insideC - 25))).toBeCloseTo(1, 9);
    }
    // With the handbook’s round c_p, to its third digit.
    expect(carried(45, { flowM3PerS: 0.002 }) / (density(45) * 1007 * 0.002 * 20)).toBeCloseTo(1, 2);
  });

  it('by buoyancy is the stack effect through both openings in series', () => {
    const area = 0.6 / Math.sqrt(1 / 2e-4 ** 2 + 1 / 3e-4 ** 2);
    expect(openingsInSeries(2e-4, 3e-4) * 0.6).toBeCloseTo(area, 12);
    for (const insideC of warm) {
      const flow = area * Math.sqrt((2 * 9.80665 * 0.2 * (insideC - 25)) / 298.15);
      const heat = carried(insideC, { inletAreaM2: 2e-4, outletAreaM2: 3e-4, heightM: 0.2 });
      expect(heat / (density(insideC) * meanHeatCapacity(insideC) * flow * (insideC - 25))).toBeCloseTo(1, 9);
    }
  });

  it('by buoyancy grows with the three-halves power of the difference, but for the thinner air', () => {
    const per = (insideC: number) =>
      carried(insideC, { inletAreaM2: 2e-4, outletAreaM2: 3e-4, heightM: 0.2 }) /
      (density(insideC) * meanHeatCapacity(insideC));
    expect(per(65) / per(35)).toBeCloseTo(4 ** 1.5, 9);
  });

  it('turns where the inside is colder, and is nothing without an opening', () => {
    expect(carried(5, { inletAreaM2: 2e-4, outletAreaM2: 3e-4, heightM: 0.2 })).toBeLessThan(0);
    expect(carried(55, { inletAreaM2: 0, outletAreaM2: 3e-4, heightM: 0.2 })).toBe(0);
  });
});

describe('A fan', () => {
  const out = { value: 0, byLogDensity: 0 };
  type Curve = Parameters<typeof fanFlow>[2];
  const straight: Curve = [
    [0, 30],
    [0.004, 0],
  ];
  const bent: Curve = [
    [0, 40],
    [0.002, 25],
    [0.003, 9],
    [0.005, 0],
  ];

  const working = (density: number, area: number, curve: Curve) => {
    fanFlow(density, area, curve, out);
    return { ...out };
  };

  /** Where the curve as given meets the loss of the openings, by halving. */
  const byHalving = (density: number, area: number, curve: Curve) => {
    const surplus = (v: number) => {
      const i = Math.max(
        1,
        curve.findIndex(([flow]) => flow >= v),
      );
      const [v0, p0] = curve[i - 1] as readonly [number, number];
      const [v1, p1] = curve[i] as readonly [number, number];
      return p0 + ((p1 - p0) * (v - v0)) / (v1 - v0) - (density / 2) * (v / area) ** 2;
    };
    let low = 0;
    let high = (curve.at(-1) as readonly [number, number])[0];
    for (let n = 0; n < 60; n++) {
      const middle = (low + high) / 2;
      if (surplus(middle) > 0) low = middle;
      else high = middle;
    }
    return low;
  };

  it('with a straight curve works where the curve meets ρ/2 (V̇/C_d A)²', () => {
    // 30 Pa − 7500 V̇ = 0.6 (V̇/3e-4)²: by the quadratic formula.
    const a = 1.2 / (2 * 3e-4 ** 2);
    const expected = (-7500 + Math.sqrt(7500 ** 2 + 4 * a * 30)) / (2 * a);
    expect(working(1.2, 3e-4, straight).value / expected).toBeCloseTo(1, 10);
  });

  it.each([1e-5, 1e-4, 3e-4, 5e-4, 8e-4, 3e-3])('with a bent curve works there too, with openings of %d m²', (area) => {
    const { value } = working(1.2, area, bent);
    const exact = byHalving(1.2, area, bent);
    const nearCorner = [0.002, 0.003].some((corner) => Math.abs(exact - corner) < 1.5e-5);
    expect(Math.abs(value / exact - 1)).toBeLessThan(nearCorner ? 3e-3 : 1e-10);
  });

  it('is moved by a corner’s rounding by 0.1 % at most, and its slope is that of differences all along', () => {
    for (let area = 1e-4; area < 2e-3; area *= 1.003) {
      const { value, byLogDensity } = working(1.2, area, bent);
      expect(Math.abs(value / byHalving(1.2, area, bent) - 1)).toBeLessThan(1e-3);
      const d = 1e-6;
      const above = working(1.2 * (1 + d), area, bent).value;
      const below = working(1.2 * (1 - d), area, bent).value;
      expect(Math.abs((above - below) / (2 * d) - byLogDensity)).toBeLessThan(1e-5 * value);
    }
  });

  it('delivers its last flow at most, where its curve ends under pressure and the openings are large', () => {
    const curve = closedFanCurve([
      [0, 12],
      [0.004, 5],
    ]);
    for (const area of [2e-3, 1e-2, 1]) {
      const { value } = working(1.2, area, curve);
      expect(value).toBeLessThanOrEqual(0.004);
      expect(value).toBeGreaterThan(0.99 * 0.004);
    }
    // Well inside the curve nothing changes: 12 − 1750 V̇ = 0.6 (V̇/3e-4)².
    const a = 0.6 / 3e-4 ** 2;
    expect(working(1.2, 3e-4, curve).value / ((-1750 + Math.sqrt(1750 ** 2 + 48 * a)) / (2 * a))).toBeCloseTo(1, 10);
  });

  it('without any pressure moves nothing', () => {
    const { value, byLogDensity } = working(1.2, 3e-4, [
      [0, 0],
      [0.004, 0],
    ]);
    expect(value).toBe(0);
    expect(byLogDensity).toBe(0);
  });
});
