import { minimumDegree } from './minimum-degree.js';

/** A pivot smaller than this share of the largest entry of its row is replaced: the row then has no say of its own. */
const leastPivot = 1e-14;

/**
 * P A Pᵀ = L U for a matrix of symmetric structure and unsymmetric values, without pivoting. Order, structure and workspace
 * are made once; `factor` and `solve` allocate nothing.
 *
 * Values are written into `diagonal[i]` and `offDiagonal[slot(i, j)]` in the caller’s own numbering.
 */
export class SparseLu {
  /** A_ii and A_ij, to be filled by the caller before `factor`. */
  readonly diagonal: Float64Array;
  readonly offDiagonal: Float64Array;
  /** Pivots of the last factorisation that were not positive: zero for a stable network. */
  negativePivots = 0;

  private readonly position: Int32Array;
  private readonly order: Int32Array;
  private readonly slots = new Map<number, number>();
  /** Rows of A in elimination order: columns (positions) and slots. */
  private readonly aStart: Int32Array;
  private readonly aColumn: Int32Array;
  private readonly aSlot: Int32Array;
  /** Rows of U right of the diagonal, and rows of L left of it, ascending. */
  private readonly uStart: Int32Array;
  private readonly uColumn: Int32Array;
  private readonly uValue: Float64Array;
  private readonly lStart: Int32Array;
  private readonly lColumn: Int32Array;
  private readonly lValue: Float64Array;
  private readonly pivot: Float64Array;
  private readonly work: Float64Array;

  constructor(
    readonly n: number,
    pairs: readonly (readonly [number, number])[],
  ) {
    const { order, pattern } = minimumDegree(n, pairs);
    this.order = order;
    this.position = new Int32Array(n);
    order.forEach((row, k) => (this.position[row] = k));
    const at = (row: number) => this.position[row] as number;

    // U: the pattern of each eliminated row, in positions. L: its transpose.
    const upper = pattern.map((rows) => Int32Array.from(rows, at).sort());
    const lower: number[][] = Array.from({ length: n }, () => []);
    upper.forEach((columns, k) => columns.forEach((column) => lower[column]?.push(k)));
    [this.uStart, this.uColumn] = compress(upper);
    [this.lStart, this.lColumn] = compress(lower);
    this.uValue = new Float64Array(this.uColumn.length);
    this.lValue = new Float64Array(this.lColumn.length);

    const rows: { column: number; slot: number }[][] = Array.from({ length: n }, () => []);
    for (const [i, j] of pairs) {
      for (const [row, column] of [
        [i, j],
        [j, i],
      ] as const) {
        if (row === column || this.slots.has(row * n + column)) continue;
        const slot = this.slots.size;
        this.slots.set(row * n + column, slot);
        rows[at(row)]?.push({ column: at(column), slot });
      }
    }
    [this.aStart, this.aColumn] = compress(rows.map((row) => row.map(({ column }) => column)));
    this.aSlot = Int32Array.from(rows.flatMap((row) => row.map(({ slot }) => slot)));
    this.diagonal = new Float64Array(n);
    this.offDiagonal = new Float64Array(this.slots.size);
    this.pivot = new Float64Array(n);
    this.work = new Float64Array(n);
  }

  /** Where A_ij stands in `offDiagonal`; −1 where the structure has no such entry. */
  slot(row: number, column: number): number {
    return this.slots.get(row * this.n + column) ?? -1;
  }

  /** L U = P A Pᵀ, row by row: scatter the row of A, take off L’s share of the rows above, gather. */
  factor(): void {
    const { n, work, pivot, order } = this;
    const { aStart, aColumn, aSlot, lStart, lColumn, lValue, uStart, uColumn, uValue } = this;
    this.negativePivots = 0;
    for (let i = 0; i < n; i++) {
      const lEnd = lStart[i + 1] as number;
      const uEnd = uStart[i + 1] as number;
      for (let p = lStart[i] as number; p < lEnd; p++) work[lColumn[p] as number] = 0;
      for (let p = uStart[i] as number; p < uEnd; p++) work[uColumn[p] as number] = 0;
      let largest = Math.abs(this.diagonal[order[i] as number] as number);
      work[i] = this.diagonal[order[i] as number] as number;
      const aEnd = aStart[i + 1] as number;
      for (let p = aStart[i] as number; p < aEnd; p++) {
        const value = this.offDiagonal[aSlot[p] as number] as number;
        work[aColumn[p] as number] = value;
        if (Math.abs(value) > largest) largest = Math.abs(value);
      }
      for (let p = lStart[i] as number; p < lEnd; p++) {
        const k = lColumn[p] as number;
        const l = (work[k] as number) / (pivot[k] as number);
        lValue[p] = l;
        if (l === 0) continue;
        const end = uStart[k + 1] as number;
        for (let q = uStart[k] as number; q < end; q++) {
          const column = uColumn[q] as number;
          work[column] = (work[column] as number) - l * (uValue[q] as number);
        }
      }
      for (let p = uStart[i] as number; p < uEnd; p++) uValue[p] = work[uColumn[p] as number] as number;
      let d = work[i] as number;
      if (Math.abs(d) <= leastPivot * largest || d === 0) d = largest > 0 ? 1e-9 * largest : 1;
      if (d < 0) this.negativePivots++;
      pivot[i] = d;
    }
  }

  /** Solves A x = b; x is b on entry and the solution on exit, in the caller’s numbering. */
  solve(x: Float64Array): void {
    const { n, work, pivot, order, lStart, lColumn, lValue, uStart, uColumn, uValue } = this;
    for (let i = 0; i < n; i++) {
      let sum = x[order[i] as number] as number;
      const end = lStart[i + 1] as number;
      for (let p = lStart[i] as number; p < end; p++)
        sum -= (lValue[p] as number) * (work[lColumn[p] as number] as number);
      work[i] = sum;
    }
    for (let i = n - 1; i >= 0; i--) {
      let sum = work[i] as number;
      const end = uStart[i + 1] as number;
      for (let p = uStart[i] as number; p < end; p++)
        sum -= (uValue[p] as number) * (work[uColumn[p] as number] as number);
      work[i] = sum / (pivot[i] as number);
      x[order[i] as number] = work[i] as number;
    }
  }
}

function compress(rows: readonly ArrayLike<number>[]): [Int32Array, Int32Array] {
  const start = new Int32Array(rows.length + 1);
  rows.forEach((row, i) => (start[i + 1] = (start[i] as number) + row.length));
  const columns = new Int32Array(start[rows.length] as number);
  rows.forEach((row, i) => {
    for (let p = 0; p < row.length; p++) columns[(start[i] as number) + p] = row[p] as number;
  });
  return [start, columns];
}
