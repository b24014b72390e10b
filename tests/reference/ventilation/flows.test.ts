/**
 * Air exchange by hand: ρ c_p V̇ ΔT with handbook properties of air (ρ = p/(287.05 T), c_p 1007 J/(kg K) near 30–50 °C), the stack effect
 * V̇ = C_d A √(2 g H ΔT/T_out) of texts on natural ventilation, and a fan’s working point. Common practice; formulas from memory.
 */
import { describe, expect, it } from 'vitest';
import { fanFlow, openingsInSeries } from '../../../server/engine/ventilation.js';
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

describe('Air exchange', () => {
  it('of a given flow is ρ c_p V̇ ΔT, at the temperature of the air that leaves', () => {
    expect(carried(45, { flowM3PerS: 0.002 }) / (density(45) * 1007 * 0.002 * 20)).toBeCloseTo(1, 2);
  });

  it('by buoyancy is the stack effect through both openings in series', () => {
    const area = 0.6 / Math.sqrt(1 / 2e-4 ** 2 + 1 / 3e-4 ** 2);
    const flow = area * Math.sqrt((2 * 9.80665 * 0.2 * 30) / 298.15);
    const heat = carried(55, { inletAreaM2: 2e-4, outletAreaM2: 3e-4, heightM: 0.2 });
    expect(heat / (density(55) * 1007 * flow * 30)).toBeCloseTo(1, 2);
    expect(openingsInSeries(2e-4, 3e-4) * 0.6).toBeCloseTo(area, 12);
  });

  it('turns where the inside is colder, and is nothing without an opening', () => {
    expect(carried(5, { inletAreaM2: 2e-4, outletAreaM2: 3e-4, heightM: 0.2 })).toBeLessThan(0);
    expect(carried(55, { inletAreaM2: 0, outletAreaM2: 3e-4, heightM: 0.2 })).toBe(0);
  });

  it('by a fan is where its curve meets ρ/2 (V̇/C_d A)²', () => {
    const out = { value: 0, byLogDensity: 0 };
    // 30 Pa − 7500 V̇ = 0.6 (V̇/3e-4)²: by the quadratic formula.
    const a = 1.2 / (2 * 3e-4 ** 2);
    const expected = (-7500 + Math.sqrt(7500 ** 2 + 4 * a * 30)) / (2 * a);
    fanFlow(
      1.2,
      3e-4,
      [
        [0, 30],
        [0.004, 0],
      ],
      out,
    );
    expect(out.value).toBeCloseTo(expected, 12);
    const d = 1e-6;
    fanFlow(
      1.2 * (1 + d),
      3e-4,
      [
        [0, 30],
        [0.004, 0],
      ],
      out,
    );
    const byLog = (out.value - expected) / d;
    fanFlow(
      1.2,
      3e-4,
      [
        [0, 30],
        [0.004, 0],
      ],
      out,
    );
    expect(out.byLogDensity).toBeCloseTo(byLog, 7);
  });
});
