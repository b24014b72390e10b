import type { Standing } from '../../../shared/schemas/value.js';

/** A sourced value as the schemas write it. */
interface Sourced {
  value: unknown;
  standing: Standing;
  source: string;
  note?: string;
}

export interface ValueRow {
  key: string;
  label: string;
  value: string;
  unit: string;
  standing: Standing;
  source: string;
  note: string;
}

/** What each property is called, and its unit, for the reader. */
const properties: Record<string, [label: string, unit: string]> = {
  conductivityWPerMK: ['Conductivity', 'W/(m K)'],
  conductivityThroughLayersWPerMK: ['Conductivity across the layers', 'W/(m K)'],
  densityKgPerM3: ['Density', 'kg/m³'],
  specificHeatJPerKgK: ['Specific heat', 'J/(kg K)'],
  glassTransitionC: ['Glass transition', '°C'],
  heatDeflection045C: ['Heat deflection at 0.45 MPa', '°C'],
  heatDeflection180C: ['Heat deflection at 1.8 MPa', '°C'],
  longTermServiceC: ['Long-term service', '°C'],
  contactResistanceKM2PerW: ['Contact resistance', 'K m²/W'],
  emissivity: ['Emissivity, infrared', ''],
  solarAbsorptance: ['Solar absorptance', ''],
  footprintM: ['Body on its mounting face', 'm'],
  heightM: ['Height', 'm'],
  internalKPerW: ['Inside to mounting face', 'K/W'],
  capacityJPerK: ['Heat capacity', 'J/K'],
  voltageV: ['Forward voltage', 'V'],
  atCurrentA: ['at a current of', 'A'],
  atC: ['at a temperature of', '°C'],
  differentialOhm: ['Differential resistance', 'Ω'],
  voltagePerK: ['Voltage coefficient', 'V/K'],
  efficiency: ['Efficiency', ''],
  efficiencyPerK: ['Efficiency by temperature', '1/K'],
  efficiencyPerA: ['Efficiency by current', '1/A'],
  resistanceOhm: ['Resistance', 'Ω'],
  perK: ['Temperature coefficient', '1/K'],
  outputV: ['Output voltage', 'V'],
  quiescentW: ['Quiescent power', 'W'],
  points: ['Derating curve, °C and share', ''],
  maxC: ['Largest temperature', '°C'],
  smallestMarginK: ['Smallest margin', 'K'],
  largestStressRatio: ['Largest stress ratio', ''],
  wallMarginK: ['Smallest margin of walls', 'K'],
  touchMarginK: ['Smallest margin to touch limits', 'K'],
};

const ratings: Record<string, [string, string]> = {
  currentA: ['Rated current', 'A'],
  powerW: ['Rated power', 'W'],
  voltageV: ['Rated voltage', 'V'],
  outputW: ['Rated output', 'W'],
};

function isSourced(value: unknown): value is Sourced {
  return typeof value === 'object' && value !== null && 'standing' in value && 'source' in value && 'value' in value;
}

/** A number, a pair, or a table, as text. */
export function valueText(value: unknown): string {
  if (typeof value === 'number') return String(value).replace('-', '−');
  if (!Array.isArray(value)) return String(value);
  if (value.every((entry) => typeof entry === 'number')) return value.map((entry) => valueText(entry)).join(' × ');
  return value
    .map((entry) => (Array.isArray(entry) ? entry.map((part) => valueText(part)).join(' → ') : valueText(entry)))
    .join('; ');
}

function labelOf(key: string, around: Record<string, unknown>): [string, string] {
  if (key === 'max' && typeof around.quantity === 'string') return ratings[around.quantity] ?? ['Rating', ''];
  const [label, unit] = properties[key] ?? [key, ''];
  const words = [around.spot, around.class, around.surface, around.contactTime]
    .filter((word): word is string => typeof word === 'string')
    .map((word) => word.replace('-', ' '));
  return [words.length > 0 && key !== 'footprintM' ? `${label}, ${words.join(', ')}` : label, unit];
}

/** Every sourced value of a content, wherever it stands in it, in its order. */
export function valueRows(content: unknown, path = '', top = true): ValueRow[] {
  if (typeof content !== 'object' || content === null) return [];
  const around = content as Record<string, unknown>;
  return Object.entries(around).flatMap(([key, entry]) => {
    if (!isSourced(entry)) return valueRows(entry, `${path}/${key}`, false);
    const load = path.endsWith('/polymerMarginK');
    const [label, unit] = load ? [`Polymer margin, ${key.replace('-', ' ')}`, 'K'] : labelOf(key, top ? {} : around);
    const { standing, source, note } = entry;
    return [{ key: `${path}/${key}`, label, value: valueText(entry.value), unit, standing, source, note: note ?? '' }];
  });
}
