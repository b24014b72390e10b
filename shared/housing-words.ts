import { readQuantity, type UnitConverter } from './quantities.js';

/** Reads a housing’s size and wall as people describe them: “160 × 90 × 45 mm”, “PETG, 3 walls, 20 % infill”. */

export type SizeReading =
  | { status: 'empty' | 'unknown' | 'waiting' }
  | { status: 'read'; sizeM: [number, number, number]; understood: string }
  | { status: 'unclear'; message: string };

function splitSize(text: string): string[] {
  const crossed = text.split(/\s*[x×*]\s*|\s+by\s+|;\s*|,\s+/i);
  if (crossed.length > 1) return crossed;
  return /^\d+,\d+,\d+/.test(text) ? text.split(',') : crossed;
}

/** Three lengths; a unit behind the last counts for those before it that have none. */
export function readSize(text: string, converter?: UnitConverter): SizeReading {
  const trimmed = text.trim();
  if (trimmed === '') return { status: 'empty' };
  if (readQuantity(trimmed, 'length').status === 'unknown') return { status: 'unknown' };
  const pieces = splitSize(trimmed).map((piece) => piece.trim());
  if (pieces.length !== 3) {
    return { status: 'unclear', message: 'Give three lengths: width × depth × height, such as 160 × 90 × 45 mm' };
  }
  const unit = /[a-z"″”']+\.?$/i.exec(pieces[2] ?? '')?.[0] ?? '';
  const readings = pieces.map((piece) =>
    readQuantity(/[a-z"″”']$/i.test(piece) ? piece : `${piece} ${unit}`, 'length', converter),
  );
  const sizes: number[] = [];
  for (const reading of readings) {
    if (reading.status === 'waiting') return { status: 'waiting' };
    if (reading.status === 'unclear') return reading;
    if (reading.status !== 'read') return { status: 'unclear', message: 'Give all three lengths' };
    sizes.push(reading.value);
  }
  const [x = 0, y = 0, z = 0] = sizes;
  const mm = sizes.map((size) => String(Number((size * 1000).toPrecision(6))));
  return { status: 'read', sizeM: [x, y, z], understood: `${mm.join(' × ')}\u00a0mm` };
}

export interface NamedMaterial {
  slug: string;
  name: string;
  group: string;
}

export interface WallWords<M extends NamedMaterial> {
  material: M | null;
  wallM: number | null;
  /** `null`: not printed, or not said. */
  print: {
    perimeters: number | null;
    infillShare: number | null;
    lineWidthM: number | null;
    layerHeightM: number | null;
    closedLayers: number | null;
    pattern: 'cells' | 'ribs' | null;
  } | null;
  understood: string[];
  /** Words that were not understood, to be shown to the person. */
  left: string[];
}

const numberWords = ['zero', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten'];

const number = '(\\d+(?:\\.\\d+)?)';
const length = `${number}\\s*mm`;

/** The table’s material that the text names: the one with the longest matching word. */
function findMaterial<M extends NamedMaterial>(words: readonly string[], materials: readonly M[]): M | null {
  let best: { material: M; score: number } | null = null;
  for (const material of materials) {
    const known = `${material.name} ${material.slug}`.toLowerCase().split(/[^a-z0-9]+/);
    const hits = words.filter(
      (word) => word.length > 1 && known.some((k) => k === word || (word.length > 4 && k.startsWith(word))),
    );
    // Several hits beat one; of equal ones the row named by that word alone, then the shorter name, the plainer material.
    const exact = hits.includes(material.slug) ? 0.5 : 0;
    const unasked = known.includes('pure') && !words.includes('pure') ? 1 : 0;
    const score = hits.reduce((sum, word) => sum + word.length, 0) + exact - unasked - known.length / 100;
    if (hits.length > 0 && (best === null || score > best.score)) best = { material, score };
  }
  return best?.material ?? null;
}

const filler = new Set([
  'and',
  'with',
  'of',
  'the',
  'a',
  'in',
  'printed',
  'print',
  'wall',
  'walls',
  'thick',
  'at',
  'material',
  'sheet',
]);

/** “PETG, 3 walls, 20 % infill” → material and print settings; what is not said stays `null`. */
export function readWallWords<M extends NamedMaterial>(text: string, materials: readonly M[]): WallWords<M> {
  const understood: string[] = [];
  let rest = text
    .toLowerCase()
    .replace(/[\u00a0\u2009\u202f]/g, ' ')
    .replace(/(\d),(?=\d)/g, '$1.')
    .replace(/aluminum/g, 'aluminium')
    .replace(new RegExp(`\\b(${numberWords.join('|')})\\b`, 'g'), (word) => String(numberWords.indexOf(word)));

  const take = (...patterns: string[]): number | null => {
    for (const pattern of patterns) {
      const found = new RegExp(pattern).exec(rest);
      const digits = found?.slice(1).find((group) => group !== undefined);
      if (!found || digits === undefined) continue;
      rest = `${rest.slice(0, found.index)} ; ${rest.slice(found.index + found[0].length)}`;
      return Number(digits);
    }
    return null;
  };
  const inMetres = (mm: number | null) => (mm === null ? null : Number((mm / 1000).toPrecision(9)));

  const solidPrint = /\bsolid\b/.test(rest);
  const layerHeightM = inMetres(
    take(`${length}\\s*layers?(?:\\s*heights?)?`, `layers?\\s*(?:heights?)?\\s*(?:of|:|=)?\\s*${length}`),
  );
  const lineWidthM = inMetres(
    take(
      `${length}\\s*(?:lines?|nozzle|bead|extrusion)(?:\\s*widths?)?`,
      `(?:line|bead|extrusion)\\s*widths?\\s*(?:of|:|=)?\\s*${length}`,
    ),
  );
  const closedLayers = take(`(\\d+)\\s*(?:(?:top|bottom|closed|solid|and|\\/|&)\\s*)+layers?`);
  const infill = take(
    `${number}\\s*(?:%|percent|per cent)\\s*(?:infill|filled|fill|infilled)`,
    `(?:infill|fill)\\s*(?:of|:|=)?\\s*${number}\\s*(?:%|percent|per cent)?`,
    `${number}\\s*%`,
  );
  const wallMm = take(
    `${length}\\s*(?:thick\\s*)?walls?`,
    `walls?\\s*(?:of|:|=)?\\s*${length}(?:\\s*thick)?`,
    `${length}(?:\\s*thick)?`,
  );
  const perimeters = take(
    `(\\d+)\\s*(?:walls?|perimeters?|shells?|outlines?|lines?|loops?)\\b`,
    `(?:walls?|perimeters?|shells?)\\s*[:=]?\\s*(\\d+)(?![\\d.])`,
  );
  const ribs = /\bribs?\b/.test(rest);
  const cells = /\b(cells?|honeycomb|gyroid|grid)\b/.test(rest);
  const notPrinted = /\b(not printed|unprinted|moulded|molded|machined|folded|cast|die[- ]cast)\b/.test(rest);
  rest = rest.replace(
    /\b(ribs?|cells?|honeycomb|gyroid|grid|solid|not printed|unprinted|moulded|molded|machined|folded|die[- ]cast|cast)\b/g,
    ' ',
  );

  const words = rest.split(/[^a-z0-9.+-]+/).filter((word) => word !== '' && !/^[.\-+]+$/.test(word));
  const material = findMaterial(words, materials);
  const known = material ? `${material.name} ${material.slug}`.toLowerCase() : '';
  const left = words.filter((word) => !filler.has(word) && !known.includes(word));

  const said =
    [perimeters, infill, layerHeightM, lineWidthM, closedLayers].some((value) => value !== null) || ribs || cells;
  const printed = !notPrinted && (said || solidPrint || material?.group === 'print-polymer');
  const share = infill === null ? (solidPrint ? 1 : null) : infill <= 1 && infill > 0 ? infill : infill / 100;
  const wallM = inMetres(wallMm);
  const pattern = ribs ? ('ribs' as const) : cells ? ('cells' as const) : null;

  if (material) understood.push(material.name);
  if (wallM !== null) understood.push(`wall ${String(wallMm)}\u00a0mm`);
  if (printed && perimeters !== null) understood.push(`${String(perimeters)} perimeters`);
  if (printed && share !== null) understood.push(`${String(Number((share * 100).toPrecision(4)))}\u00a0% infill`);
  if (printed && layerHeightM !== null) understood.push(`layers of ${String(layerHeightM * 1000)}\u00a0mm`);
  if (printed && lineWidthM !== null) understood.push(`lines of ${String(lineWidthM * 1000)}\u00a0mm`);
  if (printed && closedLayers !== null) understood.push(`${String(closedLayers)} closed layers`);
  if (printed && pattern !== null) understood.push(`infill of ${pattern}`);
  if (notPrinted) understood.push('not printed');

  return {
    material,
    wallM,
    print: printed ? { perimeters, infillShare: share, lineWidthM, layerHeightM, closedLayers, pattern } : null,
    understood,
    left,
  };
}
