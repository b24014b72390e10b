import { describe, expect, it } from 'vitest';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { network, resistor } from './documents.js';

const led = {
  kind: 'led',
  supply: 'drive',
  voltageV: 36,
  atCurrentA: 0.35,
  atC: 25,
  differentialOhm: 6,
  voltagePerK: -0.02,
  efficiency: 0.35,
  efficiencyPerK: -0.001,
  efficiencyPerA: -0.2,
  wiringOhm: 0.2,
} as const;

function pair(change: { right?: object; left?: object; rLeft?: number; rRight?: number; currentA?: number } = {}) {
  return solveNetwork(
    network({
      supplies: [{ id: 'drive', currentA: change.currentA ?? 0.7 }],
      nodes: [
        { id: 'amb', fixedC: 25 },
        { id: 'l', source: { ...led, ...change.left } },
        { id: 'r', source: { ...led, ...change.right } },
      ],
      links: [resistor('l', 'amb', change.rLeft ?? 4), resistor('r', 'amb', change.rRight ?? 4)],
    }),
  );
}

describe('Arrays in parallel on one supply', () => {
  it('share equally where they are equal and well cooled, and that is stable', () => {
    const { devices } = pair();
    expect(devices.l?.currentA).toBeCloseTo(0.35, 9);
    expect(devices.l).toMatchObject({ stable: true });
    expect(devices.r?.share).toBeCloseTo(0.5, 9);
  });

  it('have one voltage with their wiring, and currents that sum to the supply’s', () => {
    const { devices } = pair({ rRight: 8, right: { voltageV: 35.5 } });
    const atSupply = (id: 'l' | 'r') => (devices[id]?.voltageV ?? NaN) + 0.2 * (devices[id]?.currentA ?? NaN);
    expect(atSupply('l')).toBeCloseTo(atSupply('r'), 9);
    expect((devices.l?.currentA ?? NaN) + (devices.r?.currentA ?? NaN)).toBeCloseTo(0.7, 12);
    expect(devices.r?.currentA).toBeGreaterThan(devices.l?.currentA ?? Infinity);
  });

  it('leave one dark whose voltage is too high', () => {
    const { devices } = pair({ right: { voltageV: 60 } });
    expect(devices.r).toMatchObject({ currentA: 0, heatW: 0, share: 0 });
    expect(devices.l?.currentA).toBeCloseTo(0.7, 12);
  });

  it('leave an equal share that is not stable, and say so', () => {
    // Strong negative voltage coefficient, little series resistance, poor cooling: the warmer takes more and warms further.
    const weak = { voltagePerK: -0.15, differentialOhm: 0.3, wiringOhm: 0 };
    const { devices, warnings } = pair({ left: weak, right: weak, rLeft: 8, rRight: 8, currentA: 0.5 });
    expect(Math.abs((devices.l?.share ?? NaN) - 0.5)).toBeGreaterThan(0.1);
    expect(warnings.map(({ code }) => code)).toContain('share-not-stable');
    expect(devices.l?.stable).toBe(true);
  });

  it('turn each watt into heat or light, and absorbed light into heat again', () => {
    const nothing = pair();
    const electricalW = (nothing.devices.l?.electricalW ?? NaN) + (nothing.devices.r?.electricalW ?? NaN);
    expect(nothing.heatBalance.inW).toBeCloseTo(electricalW, 9);
    expect(nothing.heatBalance.outW + nothing.heatBalance.lightOutW).toBeCloseTo(electricalW, 9);
    const kept = pair({ left: { light: [{ node: 'r', share: 1 }] }, right: { light: [{ node: 'r', share: 1 }] } });
    expect(kept.heatBalance.lightOutW).toBeCloseTo(0, 12);
    expect(kept.temperaturesC.r).toBeGreaterThan((nothing.temperaturesC.r ?? NaN) + 10);
  });

  it('give a lone array exactly its supply’s current, even without a series resistance', () => {
    const { devices } = solveNetwork(
      network({
        supplies: [{ id: 'drive', currentA: 0.3 }],
        nodes: [
          { id: 'amb', fixedC: 25 },
          { id: 'l', source: { ...led, differentialOhm: 0, wiringOhm: 0, efficiency: 0 } },
        ],
        links: [resistor('l', 'amb', 4)],
      }),
    );
    expect(devices.l?.currentA).toBe(0.3);
    expect(devices.l?.lightW).toBe(0);
  });
});
