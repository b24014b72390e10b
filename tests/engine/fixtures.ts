import {
  assemblyDocumentSchema,
  faceNames,
  type AssemblyDocument,
  type AssemblyDocumentInput,
} from '../../shared/schemas/assembly.js';
import type { Finish, Material } from '../../shared/schemas/material.js';
import type { PartType } from '../../shared/schemas/part-type.js';
import { contactTimes, touchSurfaces, type LoadState, type RuleSet } from '../../shared/schemas/rule-set.js';

/** Test values carry a standing too; these are round numbers of ours, for arithmetic only. */
export function entered<T>(value: T) {
  return { value, standing: 'measured' as const, source: 'round number for a test' };
}

export const petg: Material = {
  slug: 'test-petg',
  name: 'Test PETG',
  group: 'print-polymer',
  morphology: 'amorphous',
  conductivityWPerMK: entered(0.21),
  conductivityThroughLayersWPerMK: entered(0.17),
  densityKgPerM3: entered(1270),
  specificHeatJPerKgK: entered(1300),
  glassTransitionC: entered(80),
  heatDeflection045C: entered(70),
  heatDeflection180C: entered(66),
};

export const aluminium: Material = {
  slug: 'test-aluminium',
  name: 'Test aluminium',
  group: 'metal',
  conductivityWPerMK: entered(180),
  densityKgPerM3: entered(2700),
  specificHeatJPerKgK: entered(900),
};

export const paste: Material = {
  slug: 'test-paste',
  name: 'Test paste',
  group: 'interface',
  conductivityWPerMK: entered(1),
  densityKgPerM3: entered(2500),
  specificHeatJPerKgK: entered(1000),
};

export const matt: Finish = {
  slug: 'test-matt',
  name: 'Test matt',
  emissivity: entered(0.9),
  solarAbsorptance: entered(0.9),
};

export const white: Finish = { ...matt, slug: 'test-white', name: 'Test white', solarAbsorptance: entered(0.3) };

export const array: PartType = {
  slug: 'test-array',
  name: 'Test array',
  class: 'led-array',
  footprintM: entered<[number, number]>([0.02, 0.02]),
  heightM: entered(0.002),
  thermal: {
    internalKPerW: entered(1.5),
    basis: 'junction-to-case-bottom',
    refersTo: 'heat',
    capacityJPerK: entered(2),
  },
  electrical: {
    kind: 'led',
    voltageV: entered(34),
    atCurrentA: entered(0.3),
    atC: entered(25),
    differentialOhm: entered(6),
    voltagePerK: entered(-0.02),
    efficiency: entered(0.35),
    efficiencyPerK: entered(-0.001),
    efficiencyPerA: entered(-0.2),
  },
  ratings: [{ quantity: 'currentA', max: entered(0.7) }],
  temperatureLimits: [{ spot: 'junction', maxC: entered(125) }],
};

export const resistor: PartType = {
  slug: 'test-resistor',
  name: 'Test resistor',
  class: 'resistor',
  footprintM: entered<[number, number]>([0.03, 0.015]),
  heightM: entered(0.015),
  thermal: {
    internalKPerW: entered(2),
    basis: 'element-to-mounting-face',
    refersTo: 'heat',
    capacityJPerK: entered(15),
  },
  electrical: { kind: 'resistor', resistanceOhm: entered(10), perK: entered(5e-5), atC: entered(25) },
  ratings: [{ quantity: 'powerW', max: entered(25) }],
  temperatureLimits: [{ spot: 'case', maxC: entered(200) }],
  deratingCurve: {
    quantity: 'powerW',
    reference: 'case',
    points: entered<[number, number][]>([
      [25, 1],
      [225, 0],
    ]),
  },
};

export const heater: PartType = {
  ...resistor,
  slug: 'test-heater',
  name: 'Test heater',
  class: 'other',
  electrical: { kind: 'heat' },
  ratings: [],
  temperatureLimits: [{ spot: 'case', maxC: entered(120) }],
  deratingCurve: undefined,
};

const loads: LoadState[] = ['free', 'self-weight', 'snap', 'screw-clamped', 'structural'];

export const rules: RuleSet = {
  slug: 'test-rules',
  name: 'Test rules',
  description: 'Round numbers for tests',
  perClass: (['led-array', 'resistor', 'other'] as const).map((name) => ({
    class: name,
    smallestMarginK: entered(15),
    largestStressRatio: entered(0.6),
  })),
  polymerMarginK: Object.fromEntries(
    loads.map((load) => [load, entered(load === 'screw-clamped' || load === 'structural' ? 25 : 10)]),
  ) as RuleSet['polymerMarginK'],
  wallMarginK: entered(5),
  touchMarginK: entered(3),
  touchLimits: touchSurfaces.flatMap((surface) =>
    contactTimes.map((contactTime) => ({
      surface,
      contactTime,
      maxC: entered(surface === 'plastic' ? 77 : 60),
    })),
  ),
};

type WallInput = NonNullable<AssemblyDocumentInput['housing']>['faces']['top'];

export const printedWall: WallInput = {
  wallM: 0.0024,
  material: { inline: petg },
  finishOutside: { inline: matt },
  finishInside: { inline: matt },
  print: {
    perimeters: 3,
    lineWidthM: 0.00045,
    layerHeightM: 0.0002,
    closedLayers: 4,
    infillShare: 0.2,
    pattern: 'cells',
    bedFace: 'bottom',
  },
  loadState: 'self-weight',
};

export const metalWall: WallInput = {
  wallM: 0.002,
  material: { inline: aluminium },
  finishOutside: { inline: matt },
  finishInside: { inline: matt },
};

export type HousingInput = NonNullable<AssemblyDocumentInput['housing']>;

export function sixWalls(wall: WallInput): HousingInput['faces'] {
  return Object.fromEntries(faceNames.map((name) => [name, wall])) as HousingInput['faces'];
}

export const lampHousing: HousingInput = {
  outerM: [0.16, 0.09, 0.045],
  touched: '10 s',
  faces: sixWalls(printedWall),
};

/** A lamp: two arrays on an aluminium plate under the lid of a printed box. */
export const lampInput: AssemblyDocumentInput = {
  format: 'trimwick-assembly/1',
  name: 'Test lamp',
  housing: lampHousing,
  carriers: [
    {
      id: 'plate',
      kind: 'plate',
      sizeM: [0.12, 0.07],
      thicknessM: 0.002,
      material: { inline: aluminium },
      finish: { inline: matt },
      on: { face: 'top', stack: [{ material: { inline: paste }, thicknessM: 0.0002 }] },
    },
  ],
  parts: ['left', 'right'].map((id, i) => ({
    id,
    type: { inline: array },
    mount: {
      on: 'plate',
      xM: 0.03 + 0.06 * i,
      yM: 0.035,
      stack: [{ material: { inline: paste }, thicknessM: 0.0001 }],
    },
    supply: 'drive',
    lightKeptShare: 0.1,
  })),
  supplies: [{ id: 'drive', currentA: 0.2 }],
  scenarios: [
    { id: 'room', name: 'Room', airC: 25 },
    { id: 'hot', name: 'Hot room', airC: 40 },
  ],
};

export function lamp(change: Partial<AssemblyDocumentInput> = {}): AssemblyDocument {
  return assemblyDocumentSchema.parse({ ...lampInput, ...change });
}

/** One heater on the bottom of an aluminium box. */
export function heatedMetalBox(heatW: number, change: Partial<AssemblyDocumentInput> = {}): AssemblyDocument {
  return assemblyDocumentSchema.parse({
    format: 'trimwick-assembly/1',
    name: 'Test metal box',
    housing: { outerM: [0.12, 0.08, 0.06], touched: 'no', faces: sixWalls(metalWall) },
    parts: [{ id: 'heater', type: { inline: heater }, mount: { on: 'face.bottom', stack: [] }, heatW }],
    scenarios: [{ id: 'room', name: 'Room', airC: 25 }],
    ...change,
  } satisfies AssemblyDocumentInput);
}
