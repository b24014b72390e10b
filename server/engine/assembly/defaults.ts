import type { Material } from '../../../shared/schemas/material.js';
import { dryJointMetal, dryJointPrinted } from '../conduction/contact.js';

/**
 * What stands in where the person does not know: a cautious value, and the typical one that it is compared with.
 * Numbers in the document’s own units.
 */
export interface Default<T extends number | string> {
  label: string;
  cautious: T;
  typical: T;
  unit: string;
  source: string;
}

const practice = 'common practice, no source';

function preset<T extends number | string>(
  label: string,
  cautious: T,
  typical: T,
  unit: string,
  source = practice,
): Default<T> {
  return { label, cautious, typical, unit, source };
}

export const defaults = {
  wallM: preset('Wall thickness', 0.003, 0.002, 'm'),
  material: preset('Wall material', 'unknown print polymer', 'PETG-like print polymer', ''),
  emissivityPolymer: preset('Emissivity of the polymer', 0.85, 0.92, ''),
  emissivityMetal: preset('Emissivity of the metal', 0.05, 0.2, ''),
  emissivityOther: preset('Emissivity', 0.8, 0.9, ''),
  solarAbsorptance: preset('Solar absorptance', 0.95, 0.7, ''),
  perimeters: preset('Perimeters', 2, 3, ''),
  lineWidthM: preset('Line width', 0.0004, 0.00045, 'm'),
  layerHeightM: preset('Layer height', 0.0002, 0.0002, 'm'),
  closedLayers: preset('Closed layers', 3, 5, ''),
  infillShare: preset('Infill share', 0.1, 0.2, ''),
  pattern: preset('Infill pattern', 'cells', 'ribs', ''),
  bedFace: preset('Direction of printing', 'heat crosses the layers', 'heat runs along the layers', ''),
  loadState: preset('Load on the wall', 'screw-clamped', 'self-weight', ''),
  touched: preset('Time of touch', '1 min', '10 s', ''),
  jointPrinted: preset('Dry joint on a print', dryJointPrinted, dryJointPrinted / 2, 'K m²/W'),
  jointMetal: preset('Dry joint on metal', dryJointMetal, dryJointMetal / 2, 'K m²/W'),
  bondLineM: preset('Bond-line thickness', 0.0003, 0.0001, 'm'),
  standOffM: preset('Stand-off', 0.005, 0.008, 'm'),
  heatW: preset('Heat', 10, 5, 'W'),
  lightKeptShare: preset('Light kept inside', 0.3, 0.15, ''),
  positions: preset('Positions', 'spread evenly', 'spread evenly', ''),
  airC: preset('Air temperature', 40, 25, '°C'),
} as const;

const fromPractice = <T>(value: T) => ({ value, standing: 'common-practice' as const, source: practice });

/** The softest polymer in common use, and the least conducting. */
export const unknownPolymer: Material = {
  slug: 'unknown-print-polymer',
  name: 'Unknown print polymer',
  group: 'print-polymer',
  morphology: 'amorphous',
  conductivityWPerMK: fromPractice(0.15),
  conductivityThroughLayersWPerMK: fromPractice(0.11),
  densityKgPerM3: fromPractice(1200),
  specificHeatJPerKgK: fromPractice(1500),
  glassTransitionC: fromPractice(55),
  heatDeflection045C: fromPractice(52),
  heatDeflection180C: fromPractice(50),
};

/** What an unknown print polymer most often is. */
export const typicalPolymer: Material = {
  ...unknownPolymer,
  slug: 'typical-print-polymer',
  name: 'PETG-like print polymer',
  conductivityWPerMK: fromPractice(0.21),
  conductivityThroughLayersWPerMK: fromPractice(0.17),
  glassTransitionC: fromPractice(78),
  heatDeflection045C: fromPractice(70),
  heatDeflection180C: fromPractice(64),
};

/** Emissivity of a part’s own body: lacquer, moulding, anodised metal. */
export const bodyEmissivity = 0.85;

/** Film coefficient with which the spreading in a plate is computed, W/(m² K): natural convection and radiation. */
export const spreadingFilm = 10;
