import { pointerSegments, valueAt } from './document-path.js';

/** Names of document fields as the sheet’s labels have them, for messages that stand away from their field. */

const words: Record<string, string> = {
  name: 'name',
  note: 'note',
  outerM: 'size',
  pose: 'pose',
  up: 'face that looks up',
  tiltDeg: 'tilt',
  towards: 'face it leans towards',
  fill: 'fill',
  fan: 'fan',
  curve: 'fan curve',
  flowM3PerS: 'flow',
  vents: 'vent',
  freeAreaM2: 'free area',
  heightM: 'height',
  dischargeCoefficient: 'discharge coefficient',
  screenShare: 'free share of the screen',
  surfaceC: 'temperature of the surface',
  jointKM2PerW: 'joint',
  gapM: 'gap',
  layerKM2PerW: 'resistance of the cover',
  facing: 'facing',
  fins: 'fins',
  zones: 'zone',
  leads: 'leads',
  crossSectionM2: 'cross-section',
  insideM: 'length inside',
  outsideM: 'length outside',
  insulationMaxC: 'insulation limit',
  airSpeedMPerS: 'air speed',
  skyC: 'sky',
  direction: 'direction of the sun',
  elevationDeg: 'elevation',
  azimuthDeg: 'azimuth',
  touched: 'time of touch',
  wallM: 'wall',
  material: 'material',
  finish: 'finish',
  finishOutside: 'finish outside',
  finishInside: 'finish inside',
  print: 'print settings',
  perimeters: 'perimeters',
  lineWidthM: 'line width',
  layerHeightM: 'layer height',
  closedLayers: 'closed layers',
  infillShare: 'infill',
  pattern: 'infill pattern',
  bedFace: 'face on the print bed',
  exposure: 'exposure',
  loadState: 'load',
  sizeM: 'size',
  thicknessM: 'thickness',
  standOffM: 'stand-off',
  layers: 'layer',
  stack: 'joint',
  contactShare: 'contact share',
  coverage: 'coverage',
  mount: 'mounted',
  on: 'on',
  xM: 'position across',
  yM: 'position along',
  type: 'part type',
  supply: 'supply',
  count: 'count',
  arrangement: 'arrangement',
  heatW: 'heat',
  lightKeptShare: 'light kept inside',
  currentA: 'current',
  maxA: 'rating',
  airC: 'air',
  surroundingsC: 'surroundings',
  altitudeM: 'altitude',
  sun: 'sun',
  irradianceWPerM2: 'irradiance',
  onto: 'onto',
  glazingTransmittance: 'glazing',
  mustHold: 'must hold',
  parts: 'parts',
  carriers: 'carriers',
  supplies: 'supplies',
  scenarios: 'scenarios',
  limits: 'limits',
};

const items: Record<string, string> = {
  parts: 'part',
  carriers: 'carrier',
  supplies: 'supply',
  scenarios: 'scenario',
  limits: 'limit',
  leads: 'lead',
  vents: 'vent',
};

const axes = ['width', 'depth', 'height'];

function nameOf(value: unknown): string | undefined {
  if (typeof value !== 'object' || value === null) return undefined;
  const { name, id } = value as { name?: unknown; id?: unknown };
  if (typeof name === 'string' && name !== '') return name;
  return typeof id === 'string' ? id : undefined;
}

/** “Top face, wall”, “scenario Hot stall, air”: a pointer into the assembly document in words. */
export function fieldName(pointer: string, document: unknown): string {
  const said: string[] = [];
  const segments = pointerSegments(pointer);
  segments.forEach((segment, i) => {
    const before = segments[i - 1] ?? '';
    if (segment === 'housing' || segment === 'faces' || segment === 'inline' || segment === 'version') return;
    if (before === 'faces') said.push(`${segment} face`);
    else if (before === 'outerM') said[said.length - 1] = axes[Number(segment)] ?? 'size';
    else if (before === 'sizeM') said[said.length - 1] = segment === '0' ? 'length' : 'width';
    else if (/^\d+$/.test(segment)) {
      const item = nameOf(valueAt(document, `/${segments.slice(0, i + 1).join('/')}`)) ?? String(Number(segment) + 1);
      if (items[before]) said[said.length - 1] = `${items[before]} ${item}`;
      else said.push(item);
    } else said.push(words[segment] ?? segment);
  });
  const text = said.join(', ');
  return text === '' ? 'The whole document' : text.charAt(0).toUpperCase() + text.slice(1);
}
