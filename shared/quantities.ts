import { readNumber } from './written-number.js';

/**
 * Reads quantities as people write them (`0,5`, `12 mm`, `½`, `20 %`, `104 F`) into the unit that a field stores.
 * Nothing here throws: what cannot be read comes back with a message in the user’s words.
 */

/** `unit` is what the document stores, `shown` what a bare number means and an answer is shown in; shown = stored × `perUnit`. */
interface Quantity {
  unit: string;
  shown: string;
  perUnit: number;
  /** “a length”, as messages say it. */
  noun: string;
  /** Units offered when the typed one does not fit. */
  examples: string;
}

export const quantities = {
  length: { unit: 'm', shown: 'mm', perUnit: 1000, noun: 'a length', examples: 'mm, cm, m or in' },
  altitude: { unit: 'm', shown: 'm', perUnit: 1, noun: 'an altitude', examples: 'm or ft' },
  temperature: { unit: '°C', shown: '°C', perUnit: 1, noun: 'a temperature', examples: '°C, °F or K' },
  power: { unit: 'W', shown: 'W', perUnit: 1, noun: 'a power', examples: 'W or mW' },
  current: { unit: 'A', shown: 'A', perUnit: 1, noun: 'a current', examples: 'A or mA' },
  area: { unit: 'm²', shown: 'mm²', perUnit: 1e6, noun: 'an area', examples: 'mm², cm² or m²' },
  speed: { unit: 'm/s', shown: 'm/s', perUnit: 1, noun: 'a speed', examples: 'm/s or km/h' },
  angle: { unit: '°', shown: '°', perUnit: 1, noun: 'an angle', examples: '°' },
  flow: { unit: 'm³/s', shown: 'l/s', perUnit: 1000, noun: 'a flow', examples: 'l/s or m³/h' },
  pressure: { unit: 'Pa', shown: 'Pa', perUnit: 1, noun: 'a pressure', examples: 'Pa or mbar' },
  arealResistance: {
    unit: 'K m²/W',
    shown: 'K cm²/W',
    perUnit: 1e4,
    noun: 'a resistance of an area',
    examples: 'K cm²/W',
  },
  irradiance: { unit: 'W/m²', shown: 'W/m²', perUnit: 1, noun: 'an irradiance', examples: 'W/m²' },
  share: { unit: '', shown: '%', perUnit: 100, noun: 'a share', examples: '%' },
  count: { unit: '', shown: '', perUnit: 1, noun: 'a number', examples: 'a bare number' },
} as const satisfies Record<string, Quantity>;

export type QuantityKind = keyof typeof quantities;

/** Converts between units written plainly (`degC`, `W/m^2`); see units.ts. */
export type UnitConverter = (value: number, from: string, to: string) => number | 'unknown-unit' | 'does-not-fit';

export type QuantityReading =
  | { status: 'empty' }
  /** The person wrote that it is not known. */
  | { status: 'unknown' }
  /** A unit that needs the conversion table, which is not there yet. */
  | { status: 'waiting' }
  | { status: 'read'; value: number; understood: string; note?: string }
  | { status: 'unclear'; message: string };

const unknownWords = /^(\?+|-|–|unknown|not known|don[’']?t know|dont know|no idea|n\/a|k\.?\s?a\.?)$/i;

/** What people write for a unit, as the conversion table has it. Prefixes of W and A keep their case: mW is not MW. */
const written: Record<string, string> = {
  mm: 'mm',
  cm: 'cm',
  dm: 'dm',
  km: 'km',
  in: 'in',
  'in.': 'in',
  '"': 'in',
  '”': 'in',
  '″': 'in',
  inch: 'in',
  inches: 'in',
  zoll: 'in',
  ft: 'ft',
  "'": 'ft',
  '’': 'ft',
  '′': 'ft',
  feet: 'ft',
  thou: 'mil',
  watts: 'W',
  watt: 'W',
  amp: 'A',
  amps: 'A',
  ampere: 'A',
  amperes: 'A',
  milliamps: 'mA',
  metre: 'm',
  metres: 'm',
  meter: 'm',
  meters: 'm',
  millimetre: 'mm',
  millimetres: 'mm',
  millimeter: 'mm',
  millimeters: 'mm',
  centimetre: 'cm',
  centimetres: 'cm',
  percent: '%',
  'per cent': '%',
  pct: '%',
};

/** Single letters that mean something else to the conversion table (farad, coulomb). */
const writtenTemperature: Record<string, string> = {
  c: 'degC',
  '°': 'degC',
  '°c': 'degC',
  '℃': 'degC',
  deg: 'degC',
  degc: 'degC',
  'deg c': 'degC',
  degrees: 'degC',
  'degrees c': 'degC',
  celsius: 'degC',
  'degrees celsius': 'degC',
  f: 'degF',
  '°f': 'degF',
  '℉': 'degF',
  degf: 'degF',
  'deg f': 'degF',
  'degrees f': 'degF',
  fahrenheit: 'degF',
  'degrees fahrenheit': 'degF',
  k: 'K',
  kelvin: 'K',
};

const superscripts: Record<string, string> = { '²': '^2', '³': '^3', '⁻': '^-' };

/** A unit as typed, in plain signs. */
function plainUnit(typed: string, kind: QuantityKind): string {
  const lower = typed.toLowerCase();
  if (kind === 'temperature') {
    return writtenTemperature[lower.replace(/^°\s+/, '°')] ?? writtenTemperature[lower.replace(/\s+/g, ' ')] ?? typed;
  }
  return (written[lower] ?? typed)
    .replace(/[µμ]/g, 'u')
    .replace(/[ΩΩ]/g, 'ohm')
    .replace(/°C/g, 'degC')
    .replace(/[²³⁻]/g, (sign) => superscripts[sign] ?? sign)
    .replace(/[·×]/g, '*');
}

/** Shares need no conversion table: `20 %`, or a bare `0.2` that can only be meant as a share. */
function readShare(value: number, unit: string, bare: boolean): { value: number; note?: string } | null {
  if (unit === '%') return { value: value / 100 };
  if (!bare) return null;
  if (Math.abs(value) <= 1 && value !== 0) {
    return { value, note: `read as a share of the whole; for less than one in a hundred write “${String(value)} %”` };
  }
  return { value: value / 100 };
}

/** A stored value as a person reads it: `12 mm`, `40 °C`, `20 %`. */
export function formatQuantity(value: number, kind: QuantityKind): string {
  const { shown, perUnit } = quantities[kind];
  const number = formatNumber(value * perUnit);
  return shown === '' ? number : `${number}\u00a0${shown}`;
}

/** At most six significant figures, a true minus sign. */
export function formatNumber(value: number): string {
  const rounded = Number(value.toPrecision(6));
  return String(rounded === 0 ? 0 : rounded).replace(/-/g, '−');
}

/** A stored value as text to edit: as `formatQuantity`, with signs that a keyboard has. */
export function editableQuantity(value: number, kind: QuantityKind): string {
  return formatQuantity(value, kind).replace('\u00a0', ' ').replace('−', '-');
}

function convert(
  value: number,
  typedUnit: string,
  kind: QuantityKind,
  converter: UnitConverter | undefined,
): { value: number; note?: string } | { waiting: true } | { message: string } {
  const { unit, perUnit, noun, examples, shown } = quantities[kind];
  const bare = typedUnit === '';
  const plain = plainUnit(typedUnit, kind);
  if (kind === 'share') {
    const share = readShare(value, plain, bare);
    return share ?? { message: `“${typedUnit}” does not fit ${noun}: write it in ${examples}` };
  }
  if (bare) return { value: value / perUnit };
  if (kind === 'count') return { message: `A bare number is meant here, without “${typedUnit}”` };
  const stored = plainUnit(unit, kind);
  if (plain === plainUnit(shown, kind)) return { value: value / perUnit };
  if (plain === stored) return { value };
  if (plain === '%') return { message: `“%” does not fit ${noun}: write it in ${examples}` };
  if (!converter) return { waiting: true };
  const converted = converter(value, plain, stored);
  if (converted === 'unknown-unit') {
    return { message: `The unit “${typedUnit}” is not known: write ${noun} in ${examples}` };
  }
  if (converted === 'does-not-fit') return { message: `“${typedUnit}” is not ${noun}: write it in ${examples}` };
  return { value: converted };
}

/**
 * Reads one typed quantity into its stored unit.
 *
 * @param text as typed or pasted
 * @param kind which quantity the field holds
 * @param converter for units other than the field’s own; without it such a reading comes back as `waiting`
 */
export function readQuantity(text: string, kind: QuantityKind, converter?: UnitConverter): QuantityReading {
  const trimmed = text.replace(/[\u00a0\u2009\u202f]/g, ' ').trim();
  if (trimmed === '') return { status: 'empty' };
  if (unknownWords.test(trimmed)) return { status: 'unknown' };
  const number = readNumber(trimmed);
  if ('message' in number) return { status: 'unclear', message: number.message };
  if (/^(±|\+\/-)/.test(number.rest)) {
    return { status: 'unclear', message: 'One value is meant here, without its tolerance' };
  }
  if (/^(-|–|\.\.|…|to\b)\s*\d/.test(number.rest)) {
    return { status: 'unclear', message: 'One value is meant here, not a range: give the worse end' };
  }
  const leftover = /\d/.exec(number.rest.replace(/[a-zΩµμ)²³]\^?-?\d/gi, ''));
  if (leftover) return { status: 'unclear', message: `“${trimmed}” is more than one number: give one value` };
  const converted = convert(number.value, number.rest, kind, converter);
  if ('message' in converted) return { status: 'unclear', message: converted.message };
  if ('waiting' in converted) return { status: 'waiting' };
  if (!Number.isFinite(converted.value)) return { status: 'unclear', message: 'This number is too large' };
  const note = [number.note, converted.note].filter((words) => words !== undefined).join('; ');
  return {
    status: 'read',
    // Twelve figures: enough for any wall, and no 0.0024000000000000002 in the document.
    value: Number(converted.value.toPrecision(12)),
    understood: formatQuantity(converted.value, kind),
    ...(note === '' ? {} : { note }),
  };
}

/** A checker’s message with its lengths in the field’s own unit: “at least 0.0001 m” becomes “at least 0.1 mm”. */
export function inFieldUnit(message: string, kind: QuantityKind): string {
  const { unit, shown, perUnit } = quantities[kind];
  if (perUnit === 1) return message;
  const end =
    unit === '' ? '(?<=(?:at least|at most|than) )(-?[\\d.]+(?:e[+-]?\\d+)?)$' : `(-?[\\d.]+(?:e[+-]?\\d+)?) ${unit}$`;
  const pattern = new RegExp(end);
  return message.replace(pattern, (_, number: string) => `${formatNumber(Number(number) * perUnit)} ${shown}`);
}
