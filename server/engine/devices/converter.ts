import type { NetworkSource } from '../../../shared/schemas/network.js';
import { lookUp } from '../tables.js';

export type ConverterSource = Extract<NetworkSource, { kind: 'converter' }>;

/**
 * Loss of a converter [W]: P_out (1/η − 1) + quiescent, η a number or a table over P_out (linear between points).
 *
 * @param outputW output power P_out [W]
 */
export function converterLoss(converter: ConverterSource, outputW: number): number {
  const efficiency = lookUp(converter.efficiency, outputW);
  return outputW * (1 / efficiency - 1) + converter.quiescentW;
}
