import { eliminationPlan, type EliminationPlan } from './plan.js';

/** A pivot smaller than this share of the largest entry of its row is replaced: the row then has no say of its own. */
const leastPivot = 1e-14;

/**
 * P A Pᵀ = L U for a matrix of symmetric structure and unsymmetric values, without pivoting. Order, structure and workspace
 * are made once; `factor` and `solve` allocate nothing.
 *
 * Values are written into `diagonal[i]` and `offDiagonal[slot]` in the caller’s own numbering; of the p-th pair given to the
 * constructor, (i, j) has the slot `pairSlots[2p]` and (j, i) `pairSlots[2p + 1]`.
 */
export class SparseLu {
  /** A_ii and A_ij, to be filled by the caller before `factor`. */
  readonly diagonal: Float64Array;
  readonly offDiagonal: Float64Array;
  readonly pairSlots: Int32Array;
  /** Pivots of the last factorisation that were not positive: as many as there are multipliers, for a stable network. */
  negativePivots = 0;

  private readonly plan: EliminationPlan;
  private readonly uValue: Float64Array;
  private readonly lValue: Float64Array;
  private readonly pivot: Float64Array;
  private readonly work: Float64Array;

  /**
   * @param pairs i, j, i, j …, i ≠ j, repeats allowed
   * @param late rows to be eliminated last, in this order
   * @param beyond rows that the caller wishes to write to beyond the n of the matrix, which are never read
   */
  constructor(
    readonly n: number,
    pairs: Int32Array,
    late: readonly number[] = [],
    beyond = 0,
  ) {
    const plan = eliminationPlan(n, pairs, late);
    this.plan = plan;
    this.pairSlots = plan.pairSlots;
    this.diagonal = new Float64Array(n + beyond);
    this.offDiagonal = new Float64Array(plan.entries + 1);
    this.uValue = new Float64Array(plan.uColumn.length);
    this.lValue = new Float64Array(plan.lColumn.length);
    this.pivot = new Float64Array(n);
    this.work = new Float64Array(n);
  }

  /** Takes over the factors of a like matrix; false where its structure is another. */
  adopt(other: SparseLu): boolean {
    if (other.plan !== this.plan) return false;
    this.uValue.set(other.uValue);
    this.lValue.set(other.lValue);
    this.pivot.set(other.pivot);
    this.negativePivots = other.negativePivots;
    return true;
  }

  /** A slot that is never read, for entries of rows or columns that are not in the matrix. */
  get noSlot(): number {
    return this.plan.entries;
  }

  /** Entries of L and U beside the diagonal. */
  get fill(): number {
    return 2 * this.plan.uColumn.length;
  }

  /** L U = P A Pᵀ, row by row: scatter the row of A, take off L’s share of the rows above, gather. */
  factor(): void {
    const { n, work, pivot, lValue, uValue, diagonal, offDiagonal } = this;
    const { order, aStart, aColumn, aSlot, lStart, lColumn, uStart, uColumn } = this.plan;
    this.negativePivots = 0;
    for (let i = 0; i < n; i++) {
      const lEnd = lStart[i + 1] as number;
      const uEnd = uStart[i + 1] as number;
      for (let p = lStart[i] as number; p < lEnd; p++) work[lColumn[p] as number] = 0;
      for (let p = uStart[i] as number; p < uEnd; p++) work[uColumn[p] as number] = 0;
      const own = diagonal[order[i] as number] as number;
      let largest = Math.abs(own);
      work[i] = own;
      const aEnd = aStart[i + 1] as number;
      for (let p = aStart[i] as number; p < aEnd; p++) {
        const value = offDiagonal[aSlot[p] as number] as number;
        work[aColumn[p] as number] = value;
        const size = Math.abs(value);
        if (size > largest) largest = size;
      }
      for (let p = lStart[i] as number; p < lEnd; p++) {
        const k = lColumn[p] as number;
        const above = work[k] as number;
        if (above === 0) {
          lValue[p] = 0;
          continue;
        }
        const l = above / (pivot[k] as number);
        lValue[p] = l;
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
    const { n, work, pivot, lValue, uValue } = this;
    const { order, lStart, lColumn, uStart, uColumn } = this.plan;
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
