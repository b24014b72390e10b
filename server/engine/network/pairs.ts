import type { SparseLu } from './sparse/lu.js';

/**
 * Collects which unknowns meet in an equation, before the matrix exists. `add` gives a handle; once the matrix is there, `slots` turns
 * handles into where (i, j) and (j, i) stand. A pair with an end outside the matrix has the slot that is never read.
 */
export class Pairs {
  private readonly list: number[] = [];
  private slotsOfPairs: Int32Array = new Int32Array(0);
  private none = 0;

  /** @param count rows of the matrix: what is not below it lies outside */
  constructor(private readonly count: () => number) {}

  add(i: number, j: number): number {
    const n = this.count();
    if (i >= n || j >= n || i === j) return -1;
    this.list.push(i, j);
    return this.list.length / 2 - 1;
  }

  toArray(): Int32Array {
    return Int32Array.from(this.list);
  }

  bind(matrix: SparseLu): void {
    this.slotsOfPairs = matrix.pairSlots;
    this.none = matrix.noSlot;
  }

  /** Slot of (i, j) of the pair added as (i, j). */
  forward(handle: number): number {
    return handle < 0 ? this.none : (this.slotsOfPairs[2 * handle] as number);
  }

  /** Slot of (j, i). */
  backward(handle: number): number {
    return handle < 0 ? this.none : (this.slotsOfPairs[2 * handle + 1] as number);
  }
}
