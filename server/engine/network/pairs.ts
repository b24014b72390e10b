import type { SparseLu } from './sparse/lu.js';

/**
 * Collects which unknowns meet in an equation, before the matrix exists. `add` gives a handle; once the matrix is there, `slots` turns
 * handles into where (i, j) and (j, i) stand. A pair with an end outside the matrix has the slot that is never read.
 */
export class Pairs {
  private list = new Int32Array(1024);
  private length = 0;
  private slotsOfPairs: Int32Array = new Int32Array(0);
  private none = 0;

  /** @param count rows of the matrix: what is not below it lies outside */
  constructor(private readonly n: number) {}

  add(i: number, j: number): number {
    const { n } = this;
    if (i >= n || j >= n || i === j) return -1;
    if (this.length === this.list.length) {
      const longer = new Int32Array(2 * this.length);
      longer.set(this.list);
      this.list = longer;
    }
    this.list[this.length] = i;
    this.list[this.length + 1] = j;
    this.length += 2;
    return this.length / 2 - 1;
  }

  toArray(): Int32Array {
    return this.list.slice(0, this.length);
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

  forwardSlots(handles: readonly number[]): Int32Array {
    const slots = new Int32Array(handles.length);
    for (let k = 0; k < handles.length; k++) slots[k] = this.forward(handles[k] as number);
    return slots;
  }

  backwardSlots(handles: readonly number[]): Int32Array {
    const slots = new Int32Array(handles.length);
    for (let k = 0; k < handles.length; k++) slots[k] = this.backward(handles[k] as number);
    return slots;
  }
}
