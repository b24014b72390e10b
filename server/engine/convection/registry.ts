import type { convectionShapes } from '../../../shared/schemas/network.js';
import type { Correlation } from './correlation.js';
import { plateFacingDownCorrelations } from './plate-facing-down.js';
import { plateFacingUpCorrelations } from './plate-facing-up.js';
import { verticalPlateCorrelations } from './vertical-plate.js';

export type ConvectionShape = (typeof convectionShapes)[number];

/** Every correlation, by shape: the first is the shape’s default, the second is what an answer is compared with. */
export const correlations: Record<ConvectionShape, Correlation[]> = {
  'vertical-plate': verticalPlateCorrelations,
  'plate-facing-up': plateFacingUpCorrelations,
  'plate-facing-down': plateFacingDownCorrelations,
};

/** The shape that a surface has towards colder air, once it is the colder one itself. */
export const turnedShape: Record<ConvectionShape, ConvectionShape> = {
  'vertical-plate': 'vertical-plate',
  'plate-facing-up': 'plate-facing-down',
  'plate-facing-down': 'plate-facing-up',
};

export function findCorrelation(shape: ConvectionShape, id: string | undefined): Correlation | undefined {
  return id === undefined ? correlations[shape][0] : correlations[shape].find((law) => law.id === id);
}

/** The law for a surface colder than its air: up and down change places, and the chosen law takes its mate. */
export function coldCorrelation(shape: ConvectionShape, law: Correlation): Correlation {
  return findCorrelation(turnedShape[shape], law.mate ?? law.id) ?? law;
}

/** The second published correlation of a shape. */
export function secondCorrelation(shape: ConvectionShape): Correlation | undefined {
  return correlations[shape][1];
}
