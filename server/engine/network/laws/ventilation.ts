import type { NetworkLink } from '../../../../shared/schemas/network.js';
import { gasConstant } from '../../air.js';
import { buoyantFlow, carriedHeat, closedFanCurve, fanFlow, openingsInSeries } from '../../ventilation.js';
import { linear, type LinkLaw } from './law.js';

type Ventilation = Extract<NetworkLink, { kind: 'ventilation' }>;

/** Heat capacity flow of a cubic metre per second, for the first guess [W s/(m³ K)]. */
const guessedPerFlow = 1100;

/** Effective area of the openings, C_d included [m²]: one alone, or two in series. */
function effectiveArea({ inletAreaM2, outletAreaM2, dischargeCoefficient }: Ventilation): number {
  if (inletAreaM2 === undefined || outletAreaM2 === undefined) {
    return dischargeCoefficient * (inletAreaM2 ?? outletAreaM2 ?? 0);
  }
  return dischargeCoefficient * openingsInSeries(inletAreaM2, outletAreaM2);
}

export function ventilationLaw(link: Ventilation, pressurePa: number): LinkLaw {
  const flow = { value: 0, byInside: 0, byOutside: 0 };
  if (link.flowM3PerS !== undefined) {
    if (link.flowM3PerS === 0) return linear(0);
    flow.value = link.flowM3PerS;
    return {
      evaluate: (from, to, out) => {
        carriedHeat(from, to, pressurePa, flow, out);
      },
      guess: () => guessedPerFlow * flow.value,
    };
  }
  const area = effectiveArea(link);
  if (area === 0) return linear(0);
  if (link.fanCurve) {
    const fanCurve = closedFanCurve(link.fanCurve);
    const working = { value: 0, byLogDensity: 0 };
    return {
      evaluate: (from, to, out) => {
        fanFlow(pressurePa / (gasConstant * from), area, fanCurve, working);
        flow.value = working.value;
        // ρ falls as 1/T.
        flow.byInside = -working.byLogDensity / from;
        flow.byOutside = 0;
        carriedHeat(from, to, pressurePa, flow, out);
      },
      guess: (temperature) => {
        fanFlow(pressurePa / (gasConstant * temperature), area, fanCurve, working);
        return guessedPerFlow * working.value;
      },
    };
  }
  const openings = { effectiveArea: area, height: link.heightM ?? 0 };
  if (openings.height === 0) return linear(0);
  const guess = guessedPerFlow * area * Math.sqrt((2 * 9.80665 * openings.height * 10) / 300);
  return {
    evaluate: (from, to, out) => {
      buoyantFlow(from, to, openings, flow);
      carriedHeat(from, to, pressurePa, flow, out);
    },
    guess: () => guess,
  };
}
