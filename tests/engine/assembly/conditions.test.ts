import { describe, expect, it } from 'vitest';
import { assemblyDocumentSchema, type AssemblyDocumentInput } from '../../../shared/schemas/assembly.js';
import type { Estimate } from '../../../shared/schemas/estimate.js';
import { equivalentPair } from '../../../server/engine/assembly/airflow.js';
import { compileAssembly } from '../../../server/engine/assembly/compile.js';
import { resolveAssembly } from '../../../server/engine/assembly/resolve.js';
import { EngineError } from '../../../server/engine/errors.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import {
  aluminium,
  heatedMetalBox,
  heater,
  lamp,
  lampHousing,
  lampInput,
  matt,
  paste,
  printedWall,
  rules,
  sixWalls,
  type HousingInput,
} from '../fixtures.js';

type Document = ReturnType<typeof lamp>;

/** Temperatures of a document’s first scenario [°C], by node and reading, with the warnings’ codes. */
function solved(document: Document, refine?: number) {
  const resolved = resolveAssembly(document);
  const [scenario] = resolved.scenarios;
  if (!scenario) throw new Error('no scenario');
  const compiled = compileAssembly(resolved, scenario, rules, refine === undefined ? {} : { refine });
  const answer = solveNetwork(compiled.network);
  const codes = [...compiled.warnings, ...answer.warnings].map(({ code }) => code);
  const at = (id: string) => answer.temperaturesC[id] ?? NaN;
  return { at, codes, answer, network: compiled.network };
}

function housed(change: Partial<HousingInput>): Document {
  return lamp({ housing: { ...lampHousing, ...change } });
}

function withFace(name: keyof HousingInput['faces'], change: object): Document {
  return housed({ faces: { ...sixWalls(printedWall), [name]: { ...printedWall, ...change } } });
}

const junction = (document: Document) => solved(document).at('part.left.junction');
const plain = junction(lamp());

function refusal(document: Document): Estimate['warnings'] | { path: string; message: string }[] {
  try {
    resolveAssembly(document);
  } catch (error) {
    if (error instanceof EngineError) return error.errors;
    throw error;
  }
  throw new Error('It was not refused');
}

describe('The pose', () => {
  it('matters: the lamp with its plate under the lid is cooler upright than upside down', () => {
    expect(plain).toBeLessThan(junction(housed({ pose: { up: 'bottom' } })) - 0.2);
  });

  it('has no jump between level, leaning and on its side', () => {
    const film = (tiltDeg: number) =>
      solved(housed({ pose: { up: 'top', tiltDeg } })).answer.filmCoefficientsWPerM2K[
        'face.bottom.outside.convection'
      ] ?? NaN;
    for (let tilt = 1; tilt < 86; tilt += 4) expect(Math.abs(film(tilt + 2) / film(tilt) - 1)).toBeLessThan(0.25);
    // Level, looking down it loses least; on its side, upright, more.
    expect(film(90)).toBeGreaterThan(film(0));
  });

  it('of a scenario stands over that of the housing', () => {
    const scenarios: AssemblyDocumentInput['scenarios'] = [
      { id: 'shelf', name: 'Shelf', airC: 25, pose: { up: 'bottom' } },
    ];
    expect(junction(lamp({ scenarios }))).toBeCloseTo(junction(housed({ pose: { up: 'bottom' } })), 9);
  });
});

describe('What a face meets', () => {
  const exposed = (exposure: object) => junction(withFace('top', { exposure }));

  it('in the right order: a cold wall, the open room, a gap, a cover, nothing at all', () => {
    const order = [
      exposed({ kind: 'against-wall', surfaceC: 20 }),
      exposed({ kind: 'open' }),
      exposed({ kind: 'gap', gapM: 0.01 }),
      exposed({ kind: 'covered', layerKM2PerW: 0.5 }),
      exposed({ kind: 'against-wall' }),
    ];
    expect(order).toEqual([...order].sort((a, b) => a - b));
  });

  it('nothing that takes heat, on all six sides, is refused at the faces', () => {
    const held = { ...printedWall, exposure: { kind: 'against-wall' as const } };
    expect(refusal(housed({ faces: sixWalls(held) }))).toHaveLength(6);
  });

  it('a hot surface nearby warms it', () => {
    expect(exposed({ kind: 'near', surfaceC: 80 })).toBeGreaterThan(plain + 3);
    expect(exposed({ kind: 'near', surfaceC: 25 })).toBeCloseTo(plain, 6);
  });
});

describe('Vents', () => {
  const slot = (heightM: number, freeAreaM2 = 2e-4) => ({ freeAreaM2, heightM });

  it('cool the inside, the more the further apart they lie', () => {
    const apart = solved(withFace('front', { vents: [slot(0.005), slot(0.04)] }));
    const near = solved(withFace('front', { vents: [slot(0.02), slot(0.025)] }));
    const sealed = solved(lamp());
    expect(apart.at('air.inside')).toBeLessThan(near.at('air.inside'));
    expect(near.at('air.inside')).toBeLessThan(sealed.at('air.inside'));
  });

  it('follow the pose: an inverted cup open only below has no draught, and says so', () => {
    const cup = solved(withFace('bottom', { vents: [slot(0, 2e-3)] }));
    expect(cup.codes).toContain('no-draught');
    expect(cup.at('air.inside')).toBeCloseTo(solved(lamp()).at('air.inside'), 9);
    // On its side the same openings lie one above the other.
    const document = withFace('front', { vents: [slot(0.005), slot(0.04)] });
    const laid = {
      ...document,
      housing: document.housing && { ...document.housing, pose: { up: 'front' as const, tiltDeg: 0, towards: null } },
    };
    expect(solved(laid).codes).toContain('no-draught');
  });

  it('that open onto a wall are closed, and say so', () => {
    expect(solved(withFace('bottom', { exposure: { kind: 'against-wall' }, vents: [slot(0)] })).codes).toContain(
      'vents-blocked',
    );
  });

  it('of two heights are the textbook’s pair: 1/A² = 1/A₁² + 1/A₂²', () => {
    const pair = equivalentPair([
      { effectiveM2: 3e-4, heightM: 0.01 },
      { effectiveM2: 1e-4, heightM: 0.09 },
    ]);
    expect(pair?.heightM).toBeCloseTo(0.08, 12);
    expect(pair?.effectiveM2).toBeCloseTo(1 / Math.sqrt(1 / 3e-4 ** 2 + 1 / 1e-4 ** 2), 9);
  });

  it('with a fan carry its flow: ρ c_p V̇ ΔT by hand', () => {
    const { answer, at } = solved(
      housed({
        fan: { flowM3PerS: 0.001 },
        faces: { ...sixWalls(printedWall), front: { ...printedWall, vents: [slot(0.02)] } },
      }),
    );
    const density = 101325 / (287.05 * (at('air.inside') + 273.15));
    // c_p of dry air near 30 °C, 1006 J/(kg K): handbook value.
    expect(answer.flowsW['air.exchange']).toBeCloseTo(density * 1006 * 0.001 * (at('air.inside') - 25), 2);
  });

  it('are refused in foam, and a fan without any', () => {
    const foam = { kind: 'foam' as const, material: { inline: paste } };
    const vented = { ...sixWalls(printedWall), front: { ...printedWall, vents: [slot(0.02)] } };
    expect(refusal(housed({ fill: foam, faces: vented }))[0]).toMatchObject({ path: '/housing/faces/front/vents' });
    expect(refusal(housed({ fan: { flowM3PerS: 0.001 } }))[0]).toMatchObject({ path: '/housing/fan' });
  });
});

describe('A fill', () => {
  const value = (number: number) => ({ value: number, standing: 'common-practice' as const, source: 'of this test' });
  const filling = (conductivity: number) => ({
    inline: { ...paste, slug: 'fill', conductivityWPerMK: value(conductivity) },
  });
  /** A block on the floor of a printed box. */
  const box = (fill: HousingInput['fill']) =>
    heatedMetalBox(3, {
      housing: { outerM: [0.12, 0.08, 0.06], touched: 'no', faces: sixWalls(printedWall), ...(fill ? { fill } : {}) },
    });

  it('of potting makes a part on a board cooler and the wall behind it hotter', () => {
    const onBoard = (fill: HousingInput['fill']) =>
      solved(
        lamp({
          housing: { ...lampHousing, ...(fill ? { fill } : {}) },
          carriers: [
            {
              id: 'pcb',
              kind: 'board',
              sizeM: [0.08, 0.06],
              layers: [{ material: { inline: aluminium }, thicknessM: 0.0005 }],
              finish: { inline: matt },
              standOffM: 0.012,
              on: { face: 'bottom' },
            },
          ],
          parts: lampInput.parts.map((part, i) => ({
            ...part,
            mount: { on: 'pcb', xM: 0.02 + 0.04 * i, yM: 0.03, stack: [] },
          })),
        }),
      );
    const air = onBoard({ kind: 'air' });
    const potted = onBoard({ kind: 'potting', material: filling(0.8), heightM: 0.02 });
    expect(potted.at('part.left.junction')).toBeLessThan(air.at('part.left.junction') - 2);
    expect(potted.at('face.bottom.outer')).toBeGreaterThan(air.at('face.bottom.outer') + 2);
  });

  it('helps the more the deeper it is poured', () => {
    const at = (heightM: number) =>
      solved(box({ kind: 'potting', material: filling(0.8), heightM })).at('part.heater.junction');
    expect(at(0.03)).toBeLessThan(at(0.004));
  });

  it('may reach the other wall: then there is no air inside', () => {
    const full = solved(box({ kind: 'potting', material: filling(0.8), heightM: 0.06 }));
    expect(full.at('part.heater.junction')).toBeGreaterThan(25);
    expect(full.at('air.inside')).toBeNaN();
  });

  it('of foam insulates: the part is hotter than in potting', () => {
    expect(solved(box({ kind: 'foam', material: filling(0.035) })).at('part.heater.junction')).toBeGreaterThan(
      solved(box({ kind: 'potting', material: filling(0.8), heightM: 0.05 })).at('part.heater.junction') + 3,
    );
  });

  it('has a limit of its own', () => {
    const resolved = resolveAssembly(box({ kind: 'potting', material: filling(0.8), heightM: 0.03, maxC: 120 }));
    const [scenario] = resolved.scenarios;
    if (!scenario) throw new Error('no scenario');
    const groups = compileAssembly(resolved, scenario, rules).limits.map(({ group }) => group);
    expect(groups).toContain('fill.max');
  });
});

describe('The room', () => {
  const inRoom = (change: object) => junction(lamp({ scenarios: [{ id: 'room', name: 'Room', airC: 25, ...change }] }));

  it('cools more with moving air, and through a clear sky', () => {
    expect(inRoom({ airSpeedMPerS: 1 })).toBeLessThan(inRoom({}) - 3);
    expect(inRoom({ airSpeedMPerS: 3 })).toBeLessThan(inRoom({ airSpeedMPerS: 1 }));
    expect(inRoom({ skyC: -20 })).toBeLessThan(inRoom({}) - 1);
  });

  it('with the sun overhead heats as with the sun on the lid', () => {
    const sun = { irradianceWPerM2: 800 };
    const overhead = inRoom({ sun: { ...sun, direction: { elevationDeg: 90, azimuthDeg: 0 } } });
    expect(overhead).toBeCloseTo(inRoom({ sun: { ...sun, onto: 'top' } }), 9);
    expect(inRoom({ sun: { ...sun, direction: { elevationDeg: 40, azimuthDeg: 30 } } })).toBeGreaterThan(plain);
  });
});

describe('Leads', () => {
  const lead = { id: 'cable', part: 'left', supply: 'drive', crossSectionM2: 1.5e-6, insideM: 0.05, outsideM: 1 };

  it('take heat out of the part, and bring a limit of their insulation', () => {
    const cabled = solved(lamp({ leads: [lead] }));
    expect(cabled.at('part.left.junction')).toBeLessThan(plain);
    expect(cabled.answer.flowsW['lead.cable.outside']).toBeGreaterThan(0);
    const { network } = solved(lamp({ leads: [{ ...lead, insulationMaxC: 70 }] }));
    expect(network.limits.map(({ id }) => id)).toContain('lead.cable.insulation');
  });

  it('heat themselves where the current is large', () => {
    const strong = solved(lamp({ leads: [{ ...lead, supply: null, currentA: 25 }] }));
    expect(strong.at('lead.cable.exit')).toBeGreaterThan(solved(lamp({ leads: [lead] })).at('lead.cable.exit') + 2);
  });

  it('are refused without a current, or at a part that is not there', () => {
    expect(refusal(lamp({ leads: [{ ...lead, supply: null }] }))[0]).toMatchObject({ path: '/leads/0/currentA' });
    expect(refusal(lamp({ leads: [{ ...lead, part: 'lens' }] }))[0]).toMatchObject({ path: '/leads/0/part' });
  });
});

describe('An open assembly', () => {
  const plate = {
    id: 'plate',
    kind: 'plate' as const,
    sizeM: [0.1, 0.06] as [number, number],
    thicknessM: 0.002,
    material: { inline: aluminium },
    finish: { inline: matt },
  };
  const open = (carrier: NonNullable<AssemblyDocumentInput['carriers']>[number], mount = { xM: 0.05, yM: 0.03 }) =>
    assemblyDocumentSchema.parse({
      format: 'trimwick-assembly/1',
      name: 'Open plate',
      housing: null,
      carriers: [carrier],
      parts: [{ id: 'heater', type: { inline: heater }, mount: { on: 'plate', stack: [], ...mount }, heatW: 5 }],
      scenarios: [{ id: 'room', name: 'Room', airC: 25 }],
    });

  it('has its carriers in the room, and all its heat goes there', () => {
    const { answer, at } = solved(open(plate));
    expect(answer.heatBalance.outW).toBeCloseTo(5, 9);
    expect(at('carrier.plate.mean')).toBeGreaterThan(40);
    expect(at('carrier.plate.peak.heater')).toBeGreaterThan(at('carrier.plate.mean'));
  });

  it('is hotter at a part in the corner', () => {
    const middle = solved(open(plate)).at('carrier.plate.peak.heater');
    const [u, v] = heater.footprintM.value;
    expect(solved(open(plate, { xM: u / 2, yM: v / 2 })).at('carrier.plate.peak.heater')).toBeGreaterThan(middle + 0.3);
  });

  it('is much cooler with upright fins; lying fins count for nothing and say so', () => {
    const fins = { heightM: 0.02, thicknessM: 0.001, count: 10 };
    const upright = solved(open({ ...plate, kind: 'fins', facing: 'sideways', fins }));
    expect(upright.at('carrier.plate.mean')).toBeLessThan(
      solved(open({ ...plate, facing: 'sideways' })).at('carrier.plate.mean') - 5,
    );
    expect(solved(open({ ...plate, kind: 'fins', facing: 'up', fins })).codes).toContain('fins-not-upright');
  });

  it('changes by little with twice the cells', () => {
    const coarse = solved(open(plate)).at('carrier.plate.peak.heater') - 25;
    expect(solved(open(plate), 2).at('carrier.plate.peak.heater') - 25).toBeCloseTo(coarse, 0);
  });

  it('has no faces to stand on, and no pose', () => {
    const document = open(plate);
    const on = {
      ...document,
      parts: document.parts.map((part) => ({ ...part, mount: { ...part.mount, on: 'face.top' } })),
    };
    expect(refusal(on)[0]).toMatchObject({ path: '/parts/0/mount/on' });
  });
});
