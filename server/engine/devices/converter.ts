import type { NetworkSource } from '../../../shared/schemas/network.js';
import { lookUp } from '../tables.js';

export type ConverterSource = Extract<NetworkSource, { kind: 'converter' }>;

/**
 * Loss of a converter [W]: P_out (1/η − 1) + quiescent, η a number or a table over P_out (linear between points).
 *
 * @param supplyCurrent current of its supply [A], which sets P_out = outputV × I where no output power is given
 */
export function converterLoss(converter: ConverterSource, supplyCurrent: number): number {
  const outputW = converter.outputW ?? (converter.outputV ?? 0) * supplyCurrent;
  const efficiency = lookUp(converter.efficiency, outputW);
  return outputW * (1 / efficiency - 1) + converter.quiescentW;
}
