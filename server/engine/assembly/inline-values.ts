import { EngineError } from '../errors.js';

/** The content of a value given in place; a version id must have been replaced by its content before. */
export function contentOf<T>(ref: { inline: T } | { version: string }, path: string): T {
  if ('inline' in ref) return ref.inline;
  throw new EngineError('unknown-reference', 'A value version was not looked up', [
    { path: `${path}/version`, message: 'This value version is not known' },
  ]);
}

/** A number, or a table [[°C, value], …] linear between points and flat outside, at a temperature [°C]. */
export function atTemperature(value: number | readonly (readonly [number, number])[], temperatureC: number): number {
  if (typeof value === 'number') return value;
  const first = value[0];
  const last = value.at(-1);
  if (!first || !last) throw new RangeError('An empty table');
  if (temperatureC <= first[0]) return first[1];
  if (temperatureC >= last[0]) return last[1];
  const i = value.findIndex((point) => point[0] >= temperatureC);
  const [t0, v0] = value[i - 1] ?? first;
  const [t1, v1] = value[i] ?? last;
  return v0 + ((v1 - v0) * (temperatureC - t0)) / (t1 - t0);
}
