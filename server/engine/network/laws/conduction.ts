import type { NetworkLink } from '../../../../shared/schemas/network.js';
import { zeroCelsius } from '../../constants.js';
import { linear, type LinkLaw } from './law.js';

/** Half width over which a table’s corners are rounded [K], at most a quarter of the way to the next point. */
const corner = 0.5;

/**
 * q = k(T̄) A ΔT/L with k linear between the points of its table and flat outside, at the mean of both temperatures. The corners at the points are
 * rounded by a parabola over ±0.5 K, so that the slope is continuous.
 */
function tabulated(points: readonly (readonly [number, number])[], areaOverLength: number): LinkLaw {
  const kelvin = points.map(([celsius]) => celsius + zeroCelsius);
  const values = points.map(([, value]) => value);
  const last = kelvin.length - 1;
  // Slope of the piece that ends at each point, and of the last, flat one.
  const slopes = kelvin.map((t, i) =>
    i === 0 ? 0 : ((values[i] as number) - (values[i - 1] as number)) / (t - (kelvin[i - 1] as number)),
  );
  slopes.push(0);
  const halves = kelvin.map((t, i) =>
    Math.min(
      corner,
      i > 0 ? (t - (kelvin[i - 1] as number)) / 4 : Infinity,
      i < last ? ((kelvin[i + 1] as number) - t) / 4 : Infinity,
    ),
  );
  const at = { value: 0, slope: 0 };
  const lookUp = (temperature: number) => {
    let i = 0;
    while (i <= last && (kelvin[i] as number) < temperature) i++;
    const anchor = Math.min(i, last);
    at.slope = slopes[i] as number;
    at.value = (values[anchor] as number) + at.slope * (temperature - (kelvin[anchor] as number));
    for (const p of [i - 1, i]) {
      if (p < 0 || p > last) continue;
      const x = temperature - (kelvin[p] as number);
      const half = halves[p] as number;
      if (Math.abs(x) >= half) continue;
      const before = slopes[p] as number;
      const after = slopes[p + 1] as number;
      at.slope = (before + after) / 2 + ((after - before) * x) / (2 * half);
      at.value =
        (values[p] as number) + ((before + after) / 2) * x + ((after - before) * (x * x + half * half)) / (4 * half);
    }
  };
  return {
    evaluate: (from, to, out) => {
      lookUp((from + to) / 2);
      const difference = from - to;
      const bend = (at.slope / 2) * areaOverLength * difference;
      out.flow = at.value * areaOverLength * difference;
      out.byFrom = at.value * areaOverLength + bend;
      out.byTo = -at.value * areaOverLength + bend;
    },
    guess: (temperature) => {
      lookUp(temperature);
      return at.value * areaOverLength;
    },
  };
}

export function conductionLaw(link: Extract<NetworkLink, { kind: 'conduction' }>): LinkLaw {
  const areaOverLength = link.areaM2 / link.lengthM;
  return typeof link.conductivityWPerMK === 'number'
    ? linear(link.conductivityWPerMK * areaOverLength)
    : tabulated(link.conductivityWPerMK, areaOverLength);
}
