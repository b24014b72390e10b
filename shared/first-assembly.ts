import {
  assemblyFormat,
  faceNames,
  type AssemblyDocument,
  type Carrier,
  type FaceName,
  type Housing,
  type Part,
  type PrintSettings,
  type Scenario,
  type Wall,
} from './schemas/assembly.js';
import type { MaterialVersion, PartTypeVersion } from './schemas/reference-lists.js';
import type { PartType } from './schemas/part-type.js';

/**
 * The eight questions of a new assembly, and the document that they make. Whatever is not known stays `null` where the
 * document can hold it, so that the estimate marks it assumed; where it cannot, a cautious stand-in is taken and named
 * in `stoodIn`.
 */

export const questions = [
  { id: 'size', number: 1, words: 'How big is it?' },
  { id: 'material', number: 2, words: 'What is it made of?' },
  { id: 'walls', number: 3, words: 'What are its walls like?' },
  { id: 'heat', number: 4, words: 'What makes the heat?' },
  { id: 'mounted', number: 5, words: 'How is it mounted?' },
  { id: 'room', number: 6, words: 'How hot is the worst room?' },
  { id: 'touched', number: 7, words: 'Is it touched?' },
  { id: 'sun', number: 8, words: 'Is there sun?' },
] as const;
export type QuestionId = (typeof questions)[number]['id'];

export const mountings = ['standing', 'hanging', 'back-against-wall', 'top-against-ceiling'] as const;
export type Mounting = (typeof mountings)[number];

export const seats = ['board', 'plate-top', 'plate-bottom', 'wall-top', 'wall-bottom'] as const;
/** What the heat sits on inside. */
export type Seat = (typeof seats)[number];

/** `null` everywhere: not known. */
export interface FirstAnswers {
  name: string;
  sizeM: [number, number, number] | null;
  /** Version id of a material row. */
  material: string | null;
  wallM: number | null;
  /** `null`: not printed. */
  print: Partial<PrintSettings> | null;
  printed: boolean;
  /** Version id of a part type; `null`: only its watts are given. */
  partType: string | null;
  currentA: number | null;
  heatW: number | null;
  mounting: Mounting | null;
  seat: Seat | null;
  airC: number | null;
  altitudeM: number | null;
  touched: Housing['touched'];
  sun: 'none' | 'window' | 'full' | null;
}

export interface Catalogue {
  materials: readonly MaterialVersion[];
  partTypes: readonly PartTypeVersion[];
}

/** A value that had to be taken because the document needs one. */
export interface StandIn {
  question: QuestionId;
  label: string;
  taken: string;
}

export function emptyAnswers(): FirstAnswers {
  return {
    name: '',
    sizeM: null,
    material: null,
    wallM: null,
    print: {},
    printed: true,
    partType: null,
    currentA: null,
    heatW: null,
    mounting: null,
    seat: null,
    airC: null,
    altitudeM: null,
    touched: null,
    sun: null,
  };
}

/** A small box gets hotter than a large one: what stands in where the size is not known. */
const smallBoxM: [number, number, number] = [0.1, 0.08, 0.05];

/** Irradiance of clear sun met squarely, W/m²; common practice. */
const fullSun = 1000;
/** What a clean single pane lets through; common practice. */
const paneTransmittance = 0.85;

const practice = <T>(value: T) => ({
  value,
  standing: 'common-practice' as const,
  source: 'stand-in for a part known only by its heat; no source',
});

/** A part of which only the watts are known: a small block without ratings or limits of its own. */
export const plainHeat: PartType = {
  slug: 'part-known-by-its-heat',
  name: 'Part known by its heat',
  class: 'other',
  footprintM: practice<[number, number]>([0.02, 0.02]),
  heightM: practice(0.01),
  thermal: {
    internalKPerW: practice(0),
    basis: 'body',
    refersTo: 'heat',
    capacityJPerK: practice(5),
  },
  electrical: { kind: 'heat' },
  ratings: [],
  temperatureLimits: [],
};

function printOf(answers: FirstAnswers): PrintSettings | null {
  if (!answers.printed) return null;
  const print = answers.print ?? {};
  return {
    perimeters: print.perimeters ?? null,
    lineWidthM: print.lineWidthM ?? null,
    layerHeightM: print.layerHeightM ?? null,
    closedLayers: print.closedLayers ?? null,
    infillShare: print.infillShare ?? null,
    pattern: print.pattern ?? null,
    bedFace: print.bedFace ?? null,
  };
}

function housingOf(answers: FirstAnswers): Housing {
  const against: FaceName | null =
    answers.mounting === 'back-against-wall' ? 'back' : answers.mounting === 'top-against-ceiling' ? 'top' : null;
  // Standing on a table: what it stands on takes no heat, the cautious reading.
  const closed = against ?? (answers.mounting === 'hanging' ? null : 'bottom');
  const wall = (face: FaceName): Wall => ({
    wallM: answers.wallM,
    material: answers.material === null ? null : { version: answers.material },
    finishOutside: null,
    finishInside: null,
    print: printOf(answers),
    exposure: face === closed ? { kind: 'against-wall', surfaceC: null, jointKM2PerW: 0.005 } : { kind: 'open' },
    loadState: null,
    vents: [],
  });
  return {
    outerM: answers.sizeM ?? smallBoxM,
    pose: { up: 'top', tiltDeg: 0, towards: null },
    fill: { kind: 'air' },
    fan: null,
    touched: answers.touched,
    faces: Object.fromEntries(faceNames.map((face) => [face, wall(face)])) as Housing['faces'],
  };
}

function find(materials: readonly MaterialVersion[], word: RegExp): string | null {
  return materials.find(({ content }) => word.test(content.slug) || word.test(content.name))?.version ?? null;
}

/** Three quarters of the floor or lid, rounded to the millimetre. */
function carrierSize(housing: Housing): [number, number] {
  const share = (size: number) => Math.max(Math.round(size * 750) / 1000, 0.003);
  return [share(housing.outerM[0]), share(housing.outerM[1])];
}

function carriersOf(seat: Seat, housing: Housing, { materials }: Catalogue): Carrier[] {
  const sizeM = carrierSize(housing);
  if (seat === 'plate-top' || seat === 'plate-bottom') {
    const aluminium = find(materials, /^aluminium-606/) ?? find(materials, /alumin/i);
    if (aluminium === null) return [];
    return [
      {
        id: 'plate',
        kind: 'plate',
        sizeM,
        thicknessM: 0.0015,
        material: { version: aluminium },
        finish: null,
        on: { face: seat === 'plate-top' ? 'top' : 'bottom', stack: null },
      },
    ];
  }
  const laminate = materials.find(({ content }) => content.group === 'laminate')?.version ?? null;
  const copper = find(materials, /copper/i);
  if (seat !== 'board' || laminate === null) return [];
  const foil = (coverage: number) =>
    copper === null ? [] : [{ material: { version: copper }, thicknessM: 0.000035, coverage }];
  return [
    {
      id: 'board',
      kind: 'board',
      sizeM,
      layers: [...foil(0.5), { material: { version: laminate }, thicknessM: 0.0016, coverage: 1 }, ...foil(0.5)],
      zones: [],
      finish: null,
      standOffM: null,
      on: { face: 'bottom' },
    },
  ];
}

function mountOn(seat: Seat, carriers: readonly Carrier[]): string {
  return carriers[0]?.id ?? (seat.endsWith('top') ? 'face.top' : 'face.bottom');
}

/** Rated current of a part type, or the current that its figures are given at [A]. */
function ratedCurrent(type: PartType): number {
  const rating = type.ratings.find(({ quantity }) => quantity === 'currentA');
  if (rating) return rating.max.value;
  const { electrical } = type;
  if (electrical.kind === 'led') return electrical.atCurrentA.value;
  const watts = type.ratings.find(({ quantity }) => quantity === 'powerW' || quantity === 'outputW')?.max.value ?? 1;
  if (electrical.kind === 'resistor') return Math.sqrt(watts / electrical.resistanceOhm.value);
  return electrical.kind === 'converter' ? watts / electrical.outputV.value : 0;
}

function scenarioOf(answers: FirstAnswers): Scenario {
  const sun = answers.sun ?? 'full';
  return {
    id: 'worst',
    name: 'Worst room',
    airC: answers.airC,
    surroundingsC: null,
    altitudeM: answers.altitudeM ?? 0,
    airSpeedMPerS: 0,
    skyC: null,
    pose: null,
    sun:
      sun === 'none'
        ? null
        : {
            irradianceWPerM2: fullSun,
            onto: 'worst',
            direction: null,
            glazingTransmittance: sun === 'window' ? paneTransmittance : 1,
          },
    mustHold: true,
    fault: null,
  };
}

/** Makes the assembly document of the eight answers; never refuses. */
export function firstAssembly(
  answers: FirstAnswers,
  catalogue: Catalogue,
): { document: AssemblyDocument; stoodIn: StandIn[] } {
  const stoodIn: StandIn[] = [];
  const housing = housingOf(answers);
  if (answers.sizeM === null) {
    const mm = smallBoxM.map((size) => String(size * 1000)).join(' × ');
    stoodIn.push({ question: 'size', label: 'Size', taken: `a small box of ${mm} mm` });
  }
  if (answers.mounting === null) {
    stoodIn.push({ question: 'mounted', label: 'Mounting', taken: 'standing on something that takes no heat' });
  }
  const seat = answers.seat ?? 'board';
  const carriers = carriersOf(seat, housing, catalogue);
  if (answers.seat === null) {
    stoodIn.push({
      question: 'mounted',
      label: 'What the heat sits on',
      taken: carriers.length > 0 ? 'a bare board on stand-offs' : 'the bottom wall',
    });
  }
  const type = catalogue.partTypes.find(({ version }) => version === answers.partType);
  const electrical = type?.content.electrical.kind ?? 'heat';
  const fed = type !== undefined && electrical !== 'heat';
  const part: Part = {
    id: 'part-1',
    name: type?.content.name.split(',')[0] ?? 'Heat source',
    type: type ? { version: type.version } : { inline: plainHeat },
    mount: { on: mountOn(seat, carriers), stack: null },
    supply: fed ? 'drive' : null,
    count: 1,
    arrangement: 'parallel',
    heatW: fed ? null : answers.heatW,
    lightKeptShare: null,
  };
  if (fed && answers.currentA === null) {
    stoodIn.push({
      question: 'heat',
      label: 'Drive current',
      taken: `${String(Number(ratedCurrent(type.content).toPrecision(3)))} A, all that its rating allows`,
    });
  }
  if (answers.sun === null) {
    stoodIn.push({ question: 'sun', label: 'Sun', taken: `full sun, ${String(fullSun)} W/m², onto the worst face` });
  }
  const document: AssemblyDocument = {
    format: assemblyFormat,
    name: answers.name.trim() === '' ? 'New assembly' : answers.name.trim().slice(0, 120),
    note: '',
    housing,
    carriers,
    parts: [part],
    supplies: fed
      ? [{ id: 'drive', name: 'Drive', currentA: answers.currentA ?? ratedCurrent(type.content), maxA: null }]
      : [],
    drive: null,
    leads: [],
    cutOuts: [],
    scenarios: [scenarioOf(answers)],
    limits: [],
  };
  return { document, stoodIn };
}

/** Which question an assumption of the estimate belongs to, by its JSON pointer. */
export function questionOf(path: string): QuestionId {
  if (path.startsWith('/housing/outerM')) return 'size';
  if (path.endsWith('/material') && path.startsWith('/housing')) return 'material';
  if (path.startsWith('/housing/touched')) return 'touched';
  if (path.startsWith('/housing/faces')) return /finish/.test(path) ? 'material' : 'walls';
  if (/^\/(parts|carriers)\/\d+\/(mount|on|standOffM|finish)/.test(path)) return 'mounted';
  if (path.startsWith('/parts') || path.startsWith('/supplies')) return 'heat';
  return path.includes('/sun') ? 'sun' : 'room';
}
