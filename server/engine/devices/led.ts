import type { NetworkSource } from '../../../shared/schemas/network.js';
import { zeroCelsius } from '../constants.js';

export type LedSource = Extract<NetworkSource, { kind: 'led' }>;

/** Largest optical efficiency; and half the width over which the efficiency bends into 0 or into this. */
const mostEfficient = 0.95;
const bend = 0.02;

/** What an array does at a junction temperature and a current, with slopes by temperature [1/K] and current [1/A]. */
export interface LedState {
  voltage: number;
  efficiency: number;
  heat: number;
  light: number;
  heatByT: number;
  heatByI: number;
  lightByT: number;
  lightByI: number;
}

export function blankLedState(): LedState {
  return { voltage: 0, efficiency: 0, heat: 0, light: 0, heatByT: 0, heatByI: 0, lightByT: 0, lightByI: 0 };
}

/**
 * x held within 0 … 0.95 with a continuous slope. Zero stays zero: over the first 0.02 a cubic takes the slope from 0 to 1; at the
 * upper end a parabola over ±0.02 bends into 0.95.
 */
function holdEfficiency(x: number, out: { value: number; slope: number }): void {
  if (x <= 0) {
    out.value = 0;
    out.slope = 0;
  } else if (x < bend) {
    const u = x / bend;
    out.value = bend * u * u * (2 - u);
    out.slope = u * (4 - 3 * u);
  } else if (x <= mostEfficient - bend) {
    out.value = x;
    out.slope = 1;
  } else if (x < mostEfficient + bend) {
    out.value = mostEfficient - (mostEfficient + bend - x) ** 2 / (4 * bend);
    out.slope = (mostEfficient + bend - x) / (2 * bend);
  } else {
    out.value = mostEfficient;
    out.slope = 0;
  }
}

const held = { value: 0, slope: 0 };

/**
 * LED array: V_f = V_ref + r_d (I − I_ref) + κ (T − T_ref); η = η_ref (1 + a (T − T_ref)) (1 + b (I − I_ref)), kept smoothly
 * within 0 … 0.95; heat V_f I (1 − η), light V_f I η.
 *
 * @param t junction temperature [K]
 * @param current I [A]
 *
 * **Source** linear model of data sheets’ typical curves; heat by JEDEC JESD51-51 (a thermal resistance refers to the heat).
 */
export function ledState(led: LedSource, t: number, current: number, out: LedState): void {
  const dT = t - zeroCelsius - led.atC;
  const dI = current - led.atCurrentA;
  const byT = 1 + led.efficiencyPerK * dT;
  const byI = 1 + led.efficiencyPerA * dI;
  holdEfficiency(led.efficiency * byT * byI, held);
  const eta = held.value;
  const etaByT = held.slope * led.efficiency * led.efficiencyPerK * byI;
  const etaByI = held.slope * led.efficiency * byT * led.efficiencyPerA;
  const voltage = led.voltageV + led.differentialOhm * dI + led.voltagePerK * dT;
  const power = voltage * current;
  const powerByT = led.voltagePerK * current;
  const powerByI = voltage + led.differentialOhm * current;
  out.voltage = voltage;
  out.efficiency = eta;
  out.heat = power * (1 - eta);
  out.light = power * eta;
  out.heatByT = powerByT * (1 - eta) - power * etaByT;
  out.heatByI = powerByI * (1 - eta) - power * etaByI;
  out.lightByT = powerByT * eta + power * etaByT;
  out.lightByI = powerByI * eta + power * etaByI;
}
