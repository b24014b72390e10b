import type { System } from './link-arrays.js';
import type { FlowOut, LinkLaw } from './link-laws.js';
import type { Pairs } from './pairs.js';

/** Links whose law is a function of its own: convection, air gaps, ventilation, tabulated conduction. */
export class GeneralLinks {
  readonly laws: LinkLaw[] = [];
  readonly from: number[] = [];
  readonly to: number[] = [];
  private readonly handles: number[] = [];
  private forward: Int32Array = new Int32Array(0);
  private backward: Int32Array = new Int32Array(0);
  private readonly out: FlowOut = { flow: 0, byFrom: 0, byTo: 0, film: 0 };

  add(from: number, to: number, law: LinkLaw, pairs: Pairs): number {
    this.laws.push(law);
    this.from.push(from);
    this.to.push(to);
    this.handles.push(pairs.add(from, to));
    return this.laws.length - 1;
  }

  bind(pairs: Pairs): void {
    this.forward = pairs.forwardSlots(this.handles);
    this.backward = pairs.backwardSlots(this.handles);
  }

  evaluate({ temperatures, residual, stiffness, matrix }: System): void {
    const { laws, from, to, forward, backward, out } = this;
    const { diagonal, offDiagonal } = matrix;
    for (let l = 0; l < laws.length; l++) {
      const f = from[l] as number;
      const t = to[l] as number;
      (laws[l] as LinkLaw).evaluate(temperatures[f] as number, temperatures[t] as number, out);
      residual[f] = (residual[f] as number) + out.flow;
      residual[t] = (residual[t] as number) - out.flow;
      diagonal[f] = (diagonal[f] as number) + out.byFrom;
      diagonal[t] = (diagonal[t] as number) - out.byTo;
      stiffness[f] = (stiffness[f] as number) + Math.abs(out.byFrom);
      stiffness[t] = (stiffness[t] as number) + Math.abs(out.byTo);
      offDiagonal[forward[l] as number] = (offDiagonal[forward[l] as number] as number) + out.byTo;
      offDiagonal[backward[l] as number] = (offDiagonal[backward[l] as number] as number) - out.byFrom;
    }
  }

  /** As plain conductances near one temperature [K]. */
  linearise({ temperatures, residual, matrix }: System, kelvin: number): void {
    const { laws, from, to, forward, backward } = this;
    const { diagonal, offDiagonal } = matrix;
    for (let l = 0; l < laws.length; l++) {
      const f = from[l] as number;
      const t = to[l] as number;
      const g = (laws[l] as LinkLaw).guess(kelvin);
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
