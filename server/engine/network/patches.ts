import type { System } from './link-arrays.js';
import type { Pairs } from './pairs.js';

/**
 * Nodes that stand for the mean of some cells: T_P = Σ w T over them, and what flows into the node enters them by the same weights.
 * In the matrix each brings one multiplier row q beside its own, the heat that it hands to the cells: a bordered system
 * that stays sparse. The multiplier is eliminated after the cells, so that its pivot is negative and not zero.
 */
export class Patches {
  readonly nodes: number[] = [];
  readonly multipliers: number[] = [];
  readonly cells: Int32Array[] = [];
  readonly weights: Float64Array[] = [];
  private readonly own: number[] = [];
  private readonly handles: number[][] = [];

  /** @param weights sum to 1 */
  add(node: number, multiplier: number, cells: Int32Array, weights: Float64Array, pairs: Pairs): void {
    this.nodes.push(node);
    this.multipliers.push(multiplier);
    this.cells.push(cells);
    this.weights.push(weights);
    this.own.push(pairs.add(node, multiplier));
    this.handles.push(Array.from(cells, (cell) => pairs.add(cell, multiplier)));
  }

  /** The constant entries: row P has +q, row q says T_P − Σ w T = 0, each cell has −w q. */
  addMatrix(offDiagonal: Float64Array, pairs: Pairs): void {
    this.handles.forEach((handles, p) => {
      const own = this.own[p] as number;
      offDiagonal[pairs.forward(own)] = 1;
      offDiagonal[pairs.backward(own)] = 1;
      handles.forEach((handle, c) => {
        const weight = this.weights[p]?.[c] as number;
        offDiagonal[pairs.forward(handle)] = -weight;
        offDiagonal[pairs.backward(handle)] = -weight;
      });
    });
  }

  /** Sets the nodes to the means of their cells. */
  project(temperatures: Float64Array): void {
    for (let p = 0; p < this.nodes.length; p++) {
      const cells = this.cells[p] as Int32Array;
      const weights = this.weights[p] as Float64Array;
      let mean = 0;
      for (let c = 0; c < cells.length; c++)
        mean += (weights[c] as number) * (temperatures[cells[c] as number] as number);
      temperatures[this.nodes[p] as number] = mean;
    }
  }

  /** Hands what is left over at each node to its cells. */
  distribute({ residual }: System): void {
    for (let p = 0; p < this.nodes.length; p++) {
      const node = this.nodes[p] as number;
      const left = residual[node] as number;
      residual[node] = 0;
      const cells = this.cells[p] as Int32Array;
      const weights = this.weights[p] as Float64Array;
      for (let c = 0; c < cells.length; c++) {
        const cell = cells[c] as number;
        residual[cell] = (residual[cell] as number) + (weights[c] as number) * left;
      }
    }
  }
}
