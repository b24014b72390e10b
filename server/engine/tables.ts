/** A number, or a table [[x, value], …] with rising x, linear between points and flat outside. */
export function lookUp(value: number | readonly (readonly [number, number])[], x: number): number {
  if (typeof value === 'number') return value;
  const first = value[0];
  const last = value.at(-1);
  if (!first || !last) throw new RangeError('An empty table');
  if (x <= first[0]) return first[1];
  if (x >= last[0]) return last[1];
  const i = value.findIndex((point) => point[0] >= x);
  const [x0, v0] = value[i - 1] ?? first;
  const [x1, v1] = value[i] ?? last;
  return v0 + ((v1 - v0) * (x - x0)) / (x1 - x0);
}
