import { describe, expect, it } from 'vitest';
import { estimateSchema, type Estimate } from '../../../shared/schemas/estimate.js';
import { assemblyDocumentSchema } from '../../../shared/schemas/assembly.js';
import { findCeiling } from '../../../server/engine/answers/ceiling.js';
import { estimateAssembly } from '../../../server/engine/answers/estimate.js';
import { withAskedMargins } from '../../../server/engine/answers/guarded.js';
import { stateOf } from '../../../server/engine/answers/limit-lines.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import {
  heatedMetalBox,
  lamp,
  lampHousing,
  lampInput,
  matt,
  printedWall,
  rules,
  sixWalls,
  white,
} from '../fixtures.js';

const temperature = (estimate: Estimate, id: string): number => {
  const node = estimate.nodes.find((candidate) => candidate.id === id);
  if (!node) throw new Error(`no node ${id}`);
  return node.temperatureC;
};

describe('An estimate of the lamp', () => {
  const estimate = estimateAssembly(lamp(), rules);

  it('keeps the promised form', () => {
    expect(() => estimateSchema.parse(estimate)).not.toThrow();
  });

  it('answers in the hotter room when nobody asks for another', () => {
    expect(estimate.scenario).toBe('hot');
    expect(estimateAssembly(lamp(), rules, { scenario: 'room' }).scenario).toBe('room');
    expect(estimate.scenarios.map(({ scenario }) => scenario)).toEqual(['room', 'hot']);
  });

  it('balances: all heat and light that the supply brings leaves', () => {
    const { inW, outW, lightOutW, largestResidualW } = estimate.heatBalance;
    expect(Math.abs(inW - outW - lightOutW)).toBeLessThan(1e-9 * Math.max(inW, 1));
    expect(largestResidualW).toBeLessThan(1e-9 * Math.max(inW, 1));
    const electricalW = ['left', 'right'].reduce(
      (sum, id) => sum + (estimate.devices[`part.${id}.junction`]?.electricalW ?? NaN),
      0,
    );
    expect(estimate.heatBalance.inW).toBeCloseTo(electricalW, 6);
    expect(estimate.heatBalance.lightOutW).toBeGreaterThan(0);
  });

  it('falls from the junction to the room along each part’s path', () => {
    for (const path of estimate.paths) {
      const temperatures = path.steps.map(({ temperatureC }) => temperatureC);
      expect(temperatures).toEqual([...temperatures].sort((a, b) => b - a));
      expect(path.steps[0]?.node).toBe(`part.${path.part}.junction`);
      expect(['ambient', 'surroundings']).toContain(path.steps.at(-1)?.node);
    }
  });

  it('shares the supply’s current between equal arrays', () => {
    expect(estimate.devices['part.left.junction']?.currentA).toBeCloseTo(0.1, 6);
  });

  it('has a hand check of its hottest spot, near what the cells say', () => {
    const { spreading } = estimate.handCheck;
    expect(spreading?.text).toContain('Lee, Song, Au & Moran');
    expect(spreading?.riseK).toBeGreaterThan(0.3 * (spreading?.networkRiseK ?? NaN));
    expect(spreading?.riseK).toBeLessThan(3 * (spreading?.networkRiseK ?? NaN));
  });

  it('has a guarded ceiling below the nominal one', () => {
    const { nominalCeiling, guardedCeiling } = estimate.verdict;
    expect(guardedCeiling).not.toBeNull();
    expect(guardedCeiling).toBeLessThan(nominalCeiling ?? -Infinity);
  });

  it('breaks a limit a thousandth above the nominal ceiling, and none a thousandth below', () => {
    const worst = (scale: number) => {
      const network = {
        ...estimate.network,
        supplies: estimate.network.supplies.map((s) => ({
          ...s,
          currentA: s.currentA * estimate.ceiling.scale * scale,
        })),
      };
      return Math.min(...solveNetwork(network).limits.map(({ margin }) => margin));
    };
    expect(worst(1.001)).toBeLessThan(0);
    expect(worst(0.999)).toBeGreaterThan(0);
  });

  it('names as binding the limit whose own ceiling is the least', () => {
    const headrooms = estimate.limits.map(({ headroom }) => headroom ?? Infinity);
    const binding = estimate.limits.find(({ id }) => id === estimate.verdict.binds);
    expect(binding?.headroom).toBeCloseTo(Math.min(...headrooms), 9);
    expect(binding?.headroom).toBeCloseTo(estimate.verdict.headroom ?? NaN, 3);
  });

  it('counts the margins that the rules ask into the guarded ceiling', () => {
    const asked = new Map(estimate.limits.map((line) => [line.id, line.askedMargin]));
    const infos = estimate.network.limits.map((limit) => {
      const line = estimate.limits.find(({ id }) => limit.id === id || limit.id.startsWith(`${id}@`));
      return { id: limit.id, askedMargin: asked.get(line?.id ?? '') ?? 0 };
    });
    const tightened = withAskedMargins(estimate.network, infos as unknown as Parameters<typeof withAskedMargins>[1]);
    const ceiling = findCeiling(tightened, { supply: 'drive' });
    expect(estimate.guardedCeiling.scale).toBeLessThanOrEqual(ceiling.scale * (1 + 1e-9));
  });
});

describe('What moves an estimate, in the right sense', () => {
  it('a hotter room by about as much', () => {
    const estimate = estimateAssembly(lamp(), rules);
    const room = estimateAssembly(lamp(), rules, { scenario: 'room' });
    const rise = temperature(estimate, 'face.top.outer') - temperature(room, 'face.top.outer');
    expect(rise).toBeGreaterThan(11);
    expect(rise).toBeLessThan(15);
  });

  it('thin air makes it hotter', () => {
    const at = (altitudeM: number) =>
      estimateAssembly(lamp({ scenarios: [{ id: 'hut', name: 'Hut', airC: 25, altitudeM }] }), rules);
    expect(temperature(at(3000), 'face.top.outer')).toBeGreaterThan(temperature(at(0), 'face.top.outer') + 0.3);
  });

  it('white and black prints differ in the sun only', () => {
    const hottest = (finish: typeof matt, sun: boolean) => {
      const walls = sixWalls({ ...printedWall, finishOutside: { inline: finish } });
      const scenario = { id: 'sill', name: 'Sill', airC: 25, sun: sun ? { irradianceWPerM2: 800 } : null };
      const document = lamp({ housing: { ...lampHousing, faces: walls }, scenarios: [scenario] });
      return temperature(estimateAssembly(document, rules), 'face.top.outer');
    };
    expect(hottest(matt, false)).toBe(hottest(white, false));
    expect(hottest(matt, true)).toBeGreaterThan(hottest(white, true) + 5);
  });

  it('a face held against a wall makes the rest hotter', () => {
    const against = sixWalls(printedWall);
    against.bottom = { ...printedWall, exposure: { kind: 'against-wall' } };
    const open = estimateAssembly(lamp(), rules);
    const held = estimateAssembly(lamp({ housing: { ...lampHousing, faces: against } }), rules);
    expect(temperature(held, 'face.top.outer')).toBeGreaterThan(temperature(open, 'face.top.outer'));
  });

  it('upside down the lid loses less by convection: it looks down', () => {
    const film = (up: 'top' | 'bottom') => {
      const { network } = estimateAssembly(lamp({ housing: { ...lampHousing, pose: { up } } }), rules);
      return solveNetwork(network).filmCoefficientsWPerM2K['face.top.outside.convection'] ?? NaN;
    };
    expect(film('bottom')).toBeLessThan(0.8 * film('top'));
  });
});

describe('A metal box', () => {
  it('is nearly of one temperature, and loses by hand what its heater makes', () => {
    const estimate = estimateAssembly(heatedMetalBox(6), rules);
    const faces = ['top', 'bottom', 'front', 'back', 'left', 'right'].map((name) =>
      temperature(estimate, `face.${name}.outer`),
    );
    expect(Math.max(...faces) - Math.min(...faces)).toBeLessThan(4);
    expect(estimate.handCheck.riseK).toBeCloseTo(6 / (10 * 2 * (0.12 * 0.08 + 0.12 * 0.06 + 0.08 * 0.06)), 9);
    expect(estimate.handCheck.networkRiseK / estimate.handCheck.riseK).toBeGreaterThan(0.7);
    expect(estimate.handCheck.networkRiseK / estimate.handCheck.riseK).toBeLessThan(1.3);
  });

  it('has its ceiling in watts where a part’s heat is the drive', () => {
    const { verdict } = estimateAssembly(heatedMetalBox(6), rules);
    expect(verdict.driveUnit).toBe('W');
    expect(verdict.drive).toBe(6);
    expect(verdict.nominalCeiling).toBeGreaterThan(6);
  });
});

describe('What is not known', () => {
  it('is listed with what the typical value would gain', () => {
    const walls = sixWalls({ ...printedWall, loadState: null });
    const { assumed, verdict } = estimateAssembly(
      lamp({ housing: { ...lampHousing, touched: null, faces: walls } }),
      rules,
    );
    expect(verdict.assumedCount).toBe(2);
    const load = assumed.find(({ path }) => path.endsWith('/loadState'));
    expect(load?.paths).toHaveLength(6);
    // Screw-clamped: 66 − 25 °C; self-weight: 70 − 10 °C.
    expect(load?.effectK).toBeCloseTo(19, 6);
  });
});

describe('A margin’s state', () => {
  it.each([
    [-0.1, 5, 'exceeds'],
    [0, 5, 'tight'],
    [4.9, 5, 'tight'],
    [5, 5, 'holds'],
    [0, 0, 'holds'],
  ] as const)('of %d K where %d K is asked is “%s”', (margin, asked, state) => {
    expect(stateOf(margin, asked)).toBe(state);
  });
});

describe('An assembly that cannot be computed', () => {
  it('is refused by the scenario’s name', () => {
    expect(() => estimateAssembly(lamp(), rules, { scenario: 'arctic' })).toThrow('There is no scenario “arctic”');
  });

  it('is refused where a limit names a node that is not there', () => {
    const document = assemblyDocumentSchema.parse({
      ...lampInput,
      limits: [{ id: 'lens', node: 'lens', maxC: 90, reason: 'acrylic' }],
    });
    expect(() => estimateAssembly(document, rules)).toThrow('There is no node “lens”');
  });
});
