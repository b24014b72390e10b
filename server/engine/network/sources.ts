import type { NetworkDocument, NetworkSource } from '../../../shared/schemas/network.js';
import { converterLoss, type ConverterSource } from '../devices/converter.js';
import { blankLedState, ledState, type LedSource, type LedState } from '../devices/led.js';
import { resistanceAt } from '../devices/resistor.js';
import { SharedSupply } from '../devices/sharing.js';
import type { Pairs } from './pairs.js';
import type { SparseLu } from './sparse/lu.js';

/** Arrays on one supply; a lone one, or one with a current of its own, is a group of one. Nodes in the network’s numbering. */
export interface LedGroup {
  nodes: Int32Array;
  leds: LedSource[];
  /** Index of the supply, −1 for a current of its own. */
  supply: number;
  shared: SharedSupply;
  kelvin: Float64Array;
  states: LedState[];
}

export interface OtherDevice {
  node: number;
  source: Exclude<NetworkSource, { kind: 'led' }>;
  supply: number;
}

/** Where a slope of heat goes in the matrix: −1 in `diagonal` for the diagonal itself. */
interface Coupling {
  row: number;
  column: number;
  handle: number;
  slot: number;
}

/** What makes heat in a network: given heats and devices, with what the drive varies. */
export class Sources {
  /** Currents of supplies [A], in the document’s order. */
  readonly supplyCurrents: Float64Array;
  /** Sources’ own currents [A], given heats [W] and converters’ own output powers [W], by node. */
  readonly ownCurrents: Float64Array;
  readonly givenHeat: Float64Array;
  readonly outputs: Float64Array;
  /** Heat that each node makes or absorbs [W], light absorbed included, as of the last `evaluate`. */
  readonly heat: Float64Array;
  /** Light that leaves the network [W]. */
  lightOut = 0;
  readonly ledGroups: readonly LedGroup[];
  readonly others: readonly OtherDevice[];

  private readonly lightTo: Int32Array[][];
  private readonly lightShare: Float64Array[][];
  /** Per group, array and column: first the array’s own node, then where its light falls. */
  private readonly couplings: Coupling[][][][];
  private readonly ohm = { value: 0, slope: 0 };

  /** @param index number of each node of the document; @param size how many numbers there are */
  constructor(document: NetworkDocument, index: (id: string) => number, size: number, pairs: Pairs) {
    const { nodes, supplies } = document;
    this.supplyCurrents = Float64Array.from(supplies, ({ currentA }) => currentA);
    this.ownCurrents = new Float64Array(size);
    this.givenHeat = new Float64Array(size);
    this.outputs = new Float64Array(size);
    this.heat = new Float64Array(size);
    const supplyIndex = new Map(supplies.map(({ id }, i) => [id, i]));
    const groups = new Map<string, { nodes: number[]; leds: LedSource[]; supply: number }>();
    const others: OtherDevice[] = [];
    for (const { id, heatW, source } of nodes) {
      if (heatW === undefined && !source) continue;
      const n = index(id);
      this.givenHeat[n] = heatW ?? 0;
      if (!source) continue;
      if (source.kind === 'converter') this.outputs[n] = source.outputW ?? 0;
      else this.ownCurrents[n] = source.currentA ?? 0;
      const supply = source.supply === undefined ? -1 : (supplyIndex.get(source.supply) as number);
      if (source.kind !== 'led') {
        others.push({ node: n, source, supply });
        continue;
      }
      const key = source.supply === undefined ? `own ${id}` : `supply ${source.supply}`;
      const group = groups.get(key) ?? { nodes: [], leds: [], supply };
      group.nodes.push(n);
      group.leds.push(source);
      groups.set(key, group);
    }
    this.others = others;
    this.ledGroups = [...groups.values()].map((group) => ({
      nodes: Int32Array.from(group.nodes),
      leds: group.leds,
      supply: group.supply,
      shared: new SharedSupply(group.leds),
      kelvin: new Float64Array(group.nodes.length),
      states: group.leds.map(blankLedState),
    }));
    this.lightTo = this.ledGroups.map(({ leds }) =>
      leds.map((led) => Int32Array.from(led.light, ({ node }) => index(node))),
    );
    this.lightShare = this.ledGroups.map(({ leds }) =>
      leds.map((led) => Float64Array.from(led.light, ({ share }) => share)),
    );
    this.couplings = this.ledGroups.map((group, g) =>
      Array.from(group.nodes, (node, k) =>
        Array.from(group.nodes, (column) =>
          [node, ...(this.lightTo[g]?.[k] as Int32Array)].map((row) => ({
            row,
            column,
            handle: row === column ? -2 : pairs.add(row, column),
            slot: 0,
          })),
        ),
      ),
    );
  }

  bind(pairs: Pairs): void {
    for (const coupling of this.couplings.flat(3)) {
      coupling.slot = coupling.handle === -2 ? -1 : pairs.forward(coupling.handle);
    }
  }

  get any(): boolean {
    return this.others.length > 0 || this.ledGroups.length > 0;
  }

  /** Heats at these temperatures, and their slopes taken off the matrix. */
  evaluate(temperatures: Float64Array, matrix: SparseLu): void {
    const { heat, givenHeat, ohm } = this;
    heat.set(givenHeat);
    this.lightOut = 0;
    for (const device of this.others) {
      const current =
        device.supply >= 0 ? (this.supplyCurrents[device.supply] as number) : (this.ownCurrents[device.node] as number);
      const { node } = device;
      if (device.source.kind === 'converter') {
        heat[node] = (heat[node] as number) + converterLoss(device.source, this.outputOf(node, device.source, current));
        continue;
      }
      resistanceAt(device.source, temperatures[node] as number, ohm);
      heat[node] = (heat[node] as number) + current * current * ohm.value;
      matrix.diagonal[node] = (matrix.diagonal[node] as number) - current * current * ohm.slope;
    }
    for (let g = 0; g < this.ledGroups.length; g++) this.evaluateGroup(g, temperatures, matrix);
  }

  /** Output power of a converter [W]: its own, or output voltage × its supply’s current. */
  outputOf(node: number, converter: ConverterSource, current: number): number {
    return converter.outputW === undefined ? (converter.outputV ?? 0) * current : (this.outputs[node] as number);
  }

  private evaluateGroup(g: number, temperatures: Float64Array, matrix: SparseLu): void {
    const group = this.ledGroups[g] as LedGroup;
    const { nodes, leds, shared, kelvin, states } = group;
    const { heat } = this;
    const m = nodes.length;
    for (let k = 0; k < m; k++) kelvin[k] = temperatures[nodes[k] as number] as number;
    shared.share(
      group.supply >= 0
        ? (this.supplyCurrents[group.supply] as number)
        : (this.ownCurrents[nodes[0] as number] as number),
      kelvin,
    );
    for (let k = 0; k < m; k++) {
      const state = states[k] as LedState;
      ledState(leds[k] as LedSource, kelvin[k] as number, shared.currents[k] as number, state);
      const node = nodes[k] as number;
      heat[node] = (heat[node] as number) + state.heat;
      let leaving = 1;
      const targets = this.lightTo[g]?.[k] as Int32Array;
      const shares = this.lightShare[g]?.[k] as Float64Array;
      for (let p = 0; p < targets.length; p++) {
        const share = shares[p] as number;
        leaving -= share;
        heat[targets[p] as number] = (heat[targets[p] as number] as number) + share * state.light;
      }
      this.lightOut += Math.max(leaving, 0) * state.light;
      for (let j = 0; j < m; j++) {
        const byI = shared.byTemperature[k * m + j] as number;
        const self = k === j ? 1 : 0;
        const rows = this.couplings[g]?.[k]?.[j] as Coupling[];
        this.takeOff(rows[0] as Coupling, state.heatByI * byI + self * state.heatByT, matrix);
        const lightSlope = state.lightByI * byI + self * state.lightByT;
        for (let p = 0; p < targets.length; p++) {
          this.takeOff(rows[p + 1] as Coupling, (shares[p] as number) * lightSlope, matrix);
        }
      }
    }
  }

  private takeOff({ row, slot }: Coupling, slope: number, { diagonal, offDiagonal }: SparseLu): void {
    if (slot < 0) diagonal[row] = (diagonal[row] as number) - slope;
    else offDiagonal[slot] = (offDiagonal[slot] as number) - slope;
  }
}
