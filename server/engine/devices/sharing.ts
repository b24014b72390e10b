import { zeroCelsius } from '../constants.js';
import type { LedSource } from './led.js';

/** Least series resistance of an array with its wiring [Ω]: without any, a share would be undefined. */
const leastOhm = 1e-6;

/**
 * Current shares of arrays in parallel on one supply: one common voltage V = V_f + I × wiring, currents sum to the supply’s; an
 * array whose V_f at zero current exceeds the common voltage stays dark.
 *
 * With V₀ = V_ref − r_d I_ref + κ (T − T_ref) and R = r_d + wiring, over the arrays that carry current:
 * V = (I + Σ V₀/R)/Σ 1/R, I_k = (V − V₀_k)/R_k.
 */
export class SharedSupply {
  /** Current of each array [A], and ∂I_k/∂T_j [A/K] in row-major order. */
  readonly currents: Float64Array;
  readonly byTemperature: Float64Array;
  /** Common voltage [V]. */
  voltage = 0;

  private readonly ohm: Float64Array;
  private readonly zeroCurrentVoltage: Float64Array;
  private readonly dark: Uint8Array;

  constructor(readonly leds: readonly LedSource[]) {
    const m = leds.length;
    this.currents = new Float64Array(m);
    this.byTemperature = new Float64Array(m * m);
    this.ohm = Float64Array.from(leds, (led) => Math.max(led.differentialOhm + led.wiringOhm, leastOhm));
    this.zeroCurrentVoltage = new Float64Array(m);
    this.dark = new Uint8Array(m);
  }

  /** Shares `current` [A] between the arrays at junction temperatures `kelvin`. */
  share(current: number, kelvin: Float64Array): void {
    const { leds, ohm, zeroCurrentVoltage, dark, currents, byTemperature } = this;
    const m = leds.length;
    if (m === 1) {
      // Alone it takes all; nothing is shared, and no digits are lost.
      currents[0] = current;
      byTemperature[0] = 0;
      return;
    }
    for (let k = 0; k < m; k++) {
      const led = leds[k] as LedSource;
      const dT = (kelvin[k] as number) - zeroCelsius - led.atC;
      zeroCurrentVoltage[k] = led.voltageV - led.differentialOhm * led.atCurrentA + led.voltagePerK * dT;
      dark[k] = 0;
    }
    let conductance = 0;
    // Each pass can only darken more arrays, so this ends.
    for (let changed = true; changed;) {
      changed = false;
      conductance = 0;
      let sum = current;
      for (let k = 0; k < m; k++) {
        if (dark[k]) continue;
        conductance += 1 / (ohm[k] as number);
        sum += (zeroCurrentVoltage[k] as number) / (ohm[k] as number);
      }
      this.voltage = sum / conductance;
      for (let k = 0; k < m; k++) {
        if (!dark[k] && this.voltage < (zeroCurrentVoltage[k] as number)) {
          dark[k] = 1;
          changed = true;
        }
      }
    }
    // I_k = (I + Σ (V₀_j − V₀_k)/R_j) / (R_k Σ 1/R): from differences of voltages, which keep their digits.
    for (let k = 0; k < m; k++) {
      const lit = !dark[k];
      let above = current;
      for (let j = 0; j < m; j++) {
        if (dark[j]) continue;
        above += ((zeroCurrentVoltage[j] as number) - (zeroCurrentVoltage[k] as number)) / (ohm[j] as number);
      }
      currents[k] = lit ? above / (conductance * (ohm[k] as number)) : 0;
      for (let j = 0; j < m; j++) {
        const kappa = (leds[j] as LedSource).voltagePerK;
        const common = dark[j] ? 0 : kappa / ((ohm[j] as number) * conductance);
        byTemperature[k * m + j] = lit ? (common - (k === j ? kappa : 0)) / (ohm[k] as number) : 0;
      }
    }
  }
}
