import type { convectionShapes } from '../../../shared/schemas/network.js';
import type { CorrelationEntry } from '../../../shared/schemas/correlation.js';
import { gapCorrelations } from './air-gap.js';
import { channelCorrelations } from './channel.js';
import type { Correlation } from './correlation.js';
import { forcedCorrelations } from './forced.js';
import { horizontalCylinderCorrelations } from './horizontal-cylinder.js';
import { plateFacingDownCorrelations } from './plate-facing-down.js';
import { plateFacingUpCorrelations } from './plate-facing-up.js';
import { sphereCorrelations } from './sphere.js';
import { verticalCylinderCorrelations } from './vertical-cylinder.js';
import { verticalPlateCorrelations } from './vertical-plate.js';

export type ConvectionShape = (typeof convectionShapes)[number];

/** An inclined plate is made of the vertical and the level plate’s laws, in convection/film.ts; it has no evaluation of its own. */
const inclinedPlate: Correlation[] = [
  {
    id: 'raithby-hollands',
    shape: 'inclined-plate',
    formula: 'h = (h_v¹⁰ + h_h¹⁰)^(1/10): vertical law with g cos θ, level law with g sin θ, θ = |90° − tilt|',
    source: 'After Raithby & Hollands, Handbook of Heat Transfer, ch. 4 (recalled, to be verified); the blend is ours',
    range: { ra: [1, 1e11] },
    evaluate: () => {
      throw new RangeError('An inclined plate has no Nu(Ra) of its own');
    },
  },
];

/** Every natural-convection correlation, by shape: the first is the shape’s default, the second is what an answer is compared with. */
export const correlations: Record<ConvectionShape, Correlation[]> = {
  'vertical-plate': verticalPlateCorrelations,
  'plate-facing-up': plateFacingUpCorrelations,
  'plate-facing-down': plateFacingDownCorrelations,
  'inclined-plate': inclinedPlate,
  'horizontal-cylinder': horizontalCylinderCorrelations,
  'vertical-cylinder': verticalCylinderCorrelations,
  sphere: sphereCorrelations,
};

/** The shape that a surface has towards colder air, once it is the colder one itself. */
const turnedShape: Partial<Record<ConvectionShape, ConvectionShape>> = {
  'plate-facing-up': 'plate-facing-down',
  'plate-facing-down': 'plate-facing-up',
};

export function findCorrelation(shape: ConvectionShape, id: string | undefined): Correlation | undefined {
  return id === undefined ? correlations[shape][0] : correlations[shape].find((law) => law.id === id);
}

/** The law for a surface colder than its air: up and down change places, and the chosen law takes its mate. */
export function coldCorrelation(shape: ConvectionShape, law: Correlation): Correlation {
  const turned = turnedShape[shape];
  return turned === undefined ? law : (findCorrelation(turned, law.mate ?? law.id) ?? law);
}

/** The second published correlation of a shape. */
export function secondCorrelation(shape: ConvectionShape): Correlation | undefined {
  return correlations[shape][1];
}

/** All correlations, for the reader. */
export function correlationEntries(): CorrelationEntry[] {
  const natural = Object.values(correlations)
    .flat()
    .map(({ id, shape, formula, source, range }) => ({
      id,
      shape,
      regime: 'natural' as const,
      formula,
      source,
      range,
    }));
  const forced = Object.values(forcedCorrelations).map(({ id, shape, formula, source, range }) => ({
    id,
    shape,
    regime: 'forced' as const,
    formula,
    source,
    range,
  }));
  const gaps = gapCorrelations.map(({ range, ...entry }) => ({
    ...entry,
    regime: 'gap' as const,
    range: {
      ra: range.ra,
      aspect: [range.aspect[0], Number.isFinite(range.aspect[1]) ? range.aspect[1] : null] as const,
    },
  }));
  const channels = channelCorrelations.map(({ id, shape, formula, source, range }) => ({
    id,
    shape,
    regime: 'channel' as const,
    formula,
    source,
    range,
  }));
  return [...natural, ...forced, ...gaps, ...channels].map((entry) => ({
    ...entry,
    range: Object.fromEntries(
      Object.entries(entry.range as Record<string, readonly [number, number | null]>).map(([key, [from, to]]) => [
        key,
        [from, to] as [number, number | null],
      ]),
    ),
  }));
}
