import { stefanBoltzmann } from '../constants.js';
import type { Pairs } from './pairs.js';
import type { SparseLu } from './sparse/lu.js';

/** What the laws write into: residuals, stiffness and matrix, all in the network’s own numbering. */
export interface System {
  temperatures: Float64Array;
  residual: Float64Array;
  stiffness: Float64Array;
  matrix: SparseLu;
}

/** Links of one law, as arrays: a network of a grid has tens of thousands. */
abstract class LinkArrays {
  protected readonly froms: number[] = [];
  protected readonly tos: number[] = [];
  protected readonly factors: number[] = [];
  private readonly handles: number[] = [];
  from: Int32Array = new Int32Array(0);
  to: Int32Array = new Int32Array(0);
  factor = new Float64Array(0);
  protected forward: Int32Array = new Int32Array(0);
  protected backward: Int32Array = new Int32Array(0);

  /** @returns its position among the links of this law */
  add(from: number, to: number, factor: number, pairs: Pairs): number {
    this.froms.push(from);
    this.tos.push(to);
    this.factors.push(factor);
    this.handles.push(pairs.add(from, to));
    return this.froms.length - 1;
  }

  bind(pairs: Pairs): void {
    this.from = new Int32Array(this.froms);
    this.to = new Int32Array(this.tos);
    this.factor = new Float64Array(this.factors);
    this.forward = pairs.forwardSlots(this.handles);
    this.backward = pairs.backwardSlots(this.handles);
  }

  get length(): number {
    return this.froms.length;
  }
}

/** q = G (T₁ − T₂). The matrix of all of them never changes, so it is kept and copied. */
export class LinearLinks extends LinkArrays {
  /** Flow of one link [W]. */
  flow(l: number, temperatures: Float64Array): number {
    const difference =
      (temperatures[this.from[l] as number] as number) - (temperatures[this.to[l] as number] as number);
    return (this.factor[l] as number) * difference;
  }

  addMatrix(diagonal: Float64Array, offDiagonal: Float64Array): void {
    const { from, to, factor, forward, backward } = this;
    for (let l = 0; l < from.length; l++) {
      const f = from[l] as number;
      const t = to[l] as number;
      const g = factor[l] as number;
      diagonal[f] = (diagonal[f] as number) + g;
      diagonal[t] = (diagonal[t] as number) + g;
      offDiagonal[forward[l] as number] = (offDiagonal[forward[l] as number] as number) - g;
      offDiagonal[backward[l] as number] = (offDiagonal[backward[l] as number] as number) - g;
    }
  }

  addResidual({ temperatures, residual }: System): void {
    const { from, to, factor } = this;
    for (let l = 0; l < from.length; l++) {
      const f = from[l] as number;
      const t = to[l] as number;
      const flow = (factor[l] as number) * ((temperatures[f] as number) - (temperatures[t] as number));
      residual[f] = (residual[f] as number) + flow;
      residual[t] = (residual[t] as number) - flow;
    }
  }
}

/** q = σ F (T₁⁴ − T₂⁴), F = effective emissivity × area [m²]. */
export class RadiativeLinks extends LinkArrays {
  /** Flow of one link [W]. */
  flow(l: number, temperatures: Float64Array): number {
    const a = temperatures[this.from[l] as number] as number;
    const b = temperatures[this.to[l] as number] as number;
    return stefanBoltzmann * (this.factor[l] as number) * (a * a + b * b) * (a + b) * (a - b);
  }

  evaluate({ temperatures, residual, stiffness, matrix }: System): void {
    const { from, to, factor, forward, backward } = this;
    const { diagonal, offDiagonal } = matrix;
    for (let l = 0; l < from.length; l++) {
      const f = from[l] as number;
      const t = to[l] as number;
      const a = temperatures[f] as number;
      const b = temperatures[t] as number;
      const sigma = stefanBoltzmann * (factor[l] as number);
      const a2 = a * a;
      const b2 = b * b;
      // (T₁² + T₂²)(T₁ + T₂)(T₁ − T₂) keeps its digits where both are near.
      const flow = sigma * (a2 + b2) * (a + b) * (a - b);
      const byFrom = 4 * sigma * a2 * a;
      const byTo = 4 * sigma * b2 * b;
      residual[f] = (residual[f] as number) + flow;
      residual[t] = (residual[t] as number) - flow;
      diagonal[f] = (diagonal[f] as number) + byFrom;
      diagonal[t] = (diagonal[t] as number) + byTo;
      stiffness[f] = (stiffness[f] as number) + byFrom;
      stiffness[t] = (stiffness[t] as number) + byTo;
      offDiagonal[forward[l] as number] = (offDiagonal[forward[l] as number] as number) - byTo;
      offDiagonal[backward[l] as number] = (offDiagonal[backward[l] as number] as number) - byFrom;
    }
  }

  /** As plain conductances 4 σ F T³ about one temperature [K]. */
  linearise({ temperatures, residual, matrix }: System, kelvin: number): void {
    const { from, to, factor, forward, backward } = this;
    const { diagonal, offDiagonal } = matrix;
    for (let l = 0; l < from.length; l++) {
      const f = from[l] as number;
      const t = to[l] as number;
      const g = 4 * stefanBoltzmann * (factor[l] as number) * kelvin ** 3;
      const flow = g * ((temperatures[f] as number) - (temperatures[t] as number));
      residual[f] = (residual[f] as number) + flow;
      residual[t] = (residual[t] as number) - flow;
      diagonal[f] = (diagonal[f] as number) + g;
      diagonal[t] = (diagonal[t] as number) + g;
      offDiagonal[forward[l] as number] = (offDiagonal[forward[l] as number] as number) - g;
      offDiagonal[backward[l] as number] = (offDiagonal[backward[l] as number] as number) - g;
    }
  }
}
