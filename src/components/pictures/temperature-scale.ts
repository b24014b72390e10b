/** The one temperature scale of all pictures: slate-blue, plum, vermilion, straw. */
const stops: readonly (readonly [number, readonly [number, number, number]])[] = [
  [0, [43, 58, 85]],
  [0.35, [122, 75, 125]],
  [0.7, [217, 96, 59]],
  [1, [246, 217, 139]],
];

export interface TemperatureRange {
  low: number;
  high: number;
}

/** A range of round numbers that holds all temperatures [°C]. */
export function temperatureRange(temperaturesC: readonly number[]): TemperatureRange {
  const finite = temperaturesC.filter(Number.isFinite);
  if (finite.length === 0) return { low: 20, high: 60 };
  const low = Math.floor(Math.min(...finite) / 5) * 5;
  const high = Math.ceil(Math.max(...finite) / 5) * 5;
  return { low, high: high - low < 10 ? low + 10 : high };
}

export function temperatureColour(temperatureC: number, range: TemperatureRange): string {
  const share = Math.min(Math.max((temperatureC - range.low) / (range.high - range.low), 0), 1);
  const next = stops.findIndex(([at]) => at >= share);
  const upper = stops[next] ?? stops[0];
  const lower = stops[Math.max(next - 1, 0)] ?? upper;
  if (!upper || !lower) return 'currentColor';
  const span = upper[0] - lower[0];
  const within = span === 0 ? 0 : (share - lower[0]) / span;
  const mix = lower[1].map((channel, i) => Math.round(channel + ((upper[1][i] ?? channel) - channel) * within));
  return `rgb(${mix.join(' ')})`;
}

export const gradientStops = stops.map(([at, colour]) => ({ at, colour: `rgb(${colour.join(' ')})` }));
