/** A stretch of one axis that something lies on, with the cell size that its ends ask for. Lengths in m. */
export interface Stretch {
  from: number;
  to: number;
  cell: number;
  /** True for a source: its middle is to be a cell’s middle, so that its hottest point is computed and not missed. */
  source: boolean;
  /** Lines of what lies there: within it lines are taken from these, so that no cell of it lies on two. */
  lines?: Float64Array;
}

/** Ratio of neighbouring cells as they grow away from what asked for small ones. */
const growth = 1.6;
/** Ends nearer to each other than this share of the axis are taken as one. */
const same = 1e-7;
/** Fewest cells across a source. */
const acrossSource = 5;

function sizesBetween(length: number, first: number, last: number, largest: number, odd: boolean): number[] {
  // No end is coarser than the growth from the other end allows.
  const reach = (growth - 1) * length;
  let a = Math.min(first, last + reach, largest, length);
  let b = Math.min(last, first + reach, largest) / growth;
  const left = [a];
  const right: number[] = [];
  let sum = a;
  while (sum < length * (1 - 1e-9)) {
    const nextA = Math.min(a * growth, largest);
    const nextB = Math.min(b * growth, largest);
    if (nextB <= nextA) {
      b = nextB;
      right.unshift(b);
      sum += b;
    } else {
      a = nextA;
      left.push(a);
      sum += a;
    }
  }
  const sizes = [...left, ...right];
  if (odd) {
    if (sizes.length < acrossSource) return Array.from({ length: acrossSource }, () => length / acrossSource);
    if (sizes.length % 2 === 0) {
      // One more in the middle, as large as its neighbour.
      const middle = left.length;
      sizes.splice(middle, 0, sizes[middle - 1] as number);
    }
  }
  const total = sizes.reduce((all, size) => all + size, 0);
  return sizes.map((size) => (size * length) / total);
}

/** Of the given lines those nearest to the wanted ones, rising, none twice. */
function takenFrom(given: readonly number[], wanted: readonly number[]): number[] {
  const nearest = wanted.map((x) =>
    given.reduce((best, line) => (Math.abs(line - x) < Math.abs(best - x) ? line : best)),
  );
  return [...new Set(nearest)].sort((p, q) => p - q);
}

/**
 * Grid lines along one axis: through every end of every stretch, with cells as small as these ask for beside them, growing away.
 *
 * @param length length of the axis [m]
 * @param stretches what lies along it; parts beyond the axis are cut off
 * @param ends cell size asked for at both ends of the axis [m]
 * @param refine divides every cell by this number
 * @returns rising positions from 0 to `length` [m]
 */
export function gridLines(
  length: number,
  stretches: readonly Stretch[],
  ends: readonly [number, number],
  refine = 1,
): Float64Array {
  const wanted: { at: number; cell: number }[] = [
    { at: 0, cell: ends[0] },
    { at: length, cell: ends[1] },
  ];
  const ask = (at: number, cell: number) => {
    const x = Math.min(Math.max(at, 0), length);
    const known = wanted.find((line) => Math.abs(line.at - x) <= same * length);
    if (known) known.cell = Math.min(known.cell, cell);
    else wanted.push({ at: x, cell });
  };
  for (const { from, to, cell } of stretches) {
    if (to <= 0 || from >= length) continue;
    ask(from, cell);
    ask(to, cell);
  }
  wanted.sort((a, b) => a.at - b.at);
  const largest = length / 6;
  const lines = [0];
  for (let s = 1; s < wanted.length; s++) {
    const a = wanted[s - 1] as (typeof wanted)[number];
    const b = wanted[s] as (typeof wanted)[number];
    const middle = (a.at + b.at) / 2;
    const inside = stretches.filter(({ from, to, source }) => source && from < middle && middle < to);
    const least = inside.reduce((cell, stretch) => Math.min(cell, stretch.cell), Infinity);
    const sizes = sizesBetween(
      b.at - a.at,
      Math.min(a.cell, least),
      Math.min(b.cell, least),
      largest,
      inside.length > 0,
    );
    let x = a.at;
    const inner = sizes.slice(0, -1).map((size) => (x += size));
    const given = stretches
      .filter(({ from, to }) => from < middle && middle < to)
      .flatMap((stretch) => Array.from(stretch.lines ?? []))
      .filter((line) => line > a.at + same * length && line < b.at - same * length);
    const between = given.length > 0 ? takenFrom(given, inner) : inner;
    for (const line of [...between, b.at]) {
      const from = lines.at(-1) as number;
      for (let r = 1; r <= refine; r++) lines.push(r === refine ? line : from + ((line - from) * r) / refine);
    }
  }
  return Float64Array.from(lines);
}
