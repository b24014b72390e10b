import type { NetworkSource } from '../../../shared/schemas/network.js';
import { zeroCelsius } from '../constants.js';

export type ResistorSource = Extract<NetworkSource, { kind: 'resistor' }>;

/** Resistance of the whole bank at its reference temperature [Ω]. */
export function bankResistance(bank: ResistorSource): number {
  return bank.arrangement === 'parallel' ? bank.resistanceOhm / bank.count : bank.resistanceOhm * bank.count;
}

/** Resistance of the bank at T [K]: R (1 + α (T − T_ref)), never below zero; and its slope [Ω/K]. */
export function resistanceAt(bank: ResistorSource, t: number, out: { value: number; slope: number }): void {
  const cold = bankResistance(bank);
  const factor = 1 + bank.perK * (t - zeroCelsius - bank.atC);
  out.value = Math.max(cold * factor, 0);
  out.slope = factor > 0 ? cold * bank.perK : 0;
}
