/** A smooth function of one variable with its slope. */
export type WithSlope = (x: number, out: { value: number; slope: number }) => void;

/**
 * The same function from a table of its values and slopes, by cubic Hermite interpolation: continuous with continuous slope, and the
 * slope given is that of the interpolant. Outside the table the function itself answers.
 *
 * @param exact the function
 * @param range first and last abscissa of the table
 * @param intervals how many; the error falls with their fourth power
 */
export function tabulated(exact: WithSlope, range: readonly [number, number], intervals: number): WithSlope {
  const [first, last] = range;
  const step = (last - first) / intervals;
  const table = new Float64Array(2 * (intervals + 1));
  const at = { value: 0, slope: 0 };
  for (let i = 0; i <= intervals; i++) {
    exact(first + i * step, at);
    table[2 * i] = at.value;
    table[2 * i + 1] = at.slope * step;
  }
  return (x, out) => {
    const u = (x - first) / step;
    if (!(u >= 0 && u < intervals)) {
      exact(x, out);
      return;
    }
    const i = Math.floor(u);
    interpolate(table, 2 * i, 2, u - i, step, out);
  };
}

/** Cubic Hermite between the entries (value, slope × step) at `at` and `at + stride` of a table; `u` = 0 … 1 between them. */
export function interpolate(
  table: Float64Array,
  at: number,
  stride: number,
  u: number,
  step: number,
  out: { value: number; slope: number },
): void {
  const y0 = table[at] as number;
  const s0 = table[at + 1] as number;
  const y1 = table[at + stride] as number;
  const s1 = table[at + stride + 1] as number;
  const rise = y1 - y0;
  const c2 = 3 * rise - 2 * s0 - s1;
  const c3 = s0 + s1 - 2 * rise;
  out.value = y0 + u * (s0 + u * (c2 + u * c3));
  out.slope = (s0 + u * (2 * c2 + 3 * u * c3)) / step;
}
