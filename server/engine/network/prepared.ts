import type { NetworkDocument, NetworkSource } from '../../../shared/schemas/network.js';
import { zeroCelsius } from '../constants.js';
import { converterLoss, type ConverterSource } from '../devices/converter.js';
import { blankLedState, ledState, type LedSource, type LedState } from '../devices/led.js';
import { resistanceAt } from '../devices/resistor.js';
import { SharedSupply } from '../devices/sharing.js';
import { linkLaw, type FlowOut, type LinkLaw } from './link-laws.js';
import { SparseLu } from './sparse/lu.js';
import { validateNetwork } from './validate.js';

/** Arrays on one supply; a lone one, or one with a current of its own, is a group of one. */
interface LedGroup {
  nodes: Int32Array;
  leds: LedSource[];
  /** Index of the supply, −1 for a current of its own. */
  supply: number;
  shared: SharedSupply;
  kelvin: Float64Array;
  states: LedState[];
}

interface OtherDevice {
  node: number;
  source: Exclude<NetworkSource, { kind: 'led' }>;
  supply: number;
}

/**
 * A network ready to be solved, and solved again with other drives: structure, order and workspace are made once;
 * `evaluate` allocates nothing.
 *
 * Temperatures are in kelvin, in the order of the document’s nodes.
 */
export class PreparedNetwork {
  readonly nodeCount: number;
  readonly nodeIndex: ReadonlyMap<string, number>;
  /** Position of each node among the unknown temperatures; −1 for a fixed one. */
  readonly unknown: Int32Array;
  readonly unknownCount: number;
  readonly temperatures: Float64Array;
  /** Heat leaving each unknown node through links less what is put into it [W]. */
  readonly residual: Float64Array;
  /** Σ |conductance| at each unknown node [W/K], for the rounding floor. */
  readonly stiffness: Float64Array;
  readonly matrix: SparseLu;
  readonly laws: readonly LinkLaw[];
  readonly from: Int32Array;
  readonly to: Int32Array;
  readonly flows: Float64Array;
  /** Film coefficient of convective links [W/(m² K)], else 0. */
  readonly films: Float64Array;
  /** What the drive varies: currents of supplies, sources’ own currents (by node), and given heats (by node). */
  readonly supplyCurrents: Float64Array;
  readonly ownCurrents: Float64Array;
  readonly givenHeat: Float64Array;
  /** Output power of converters that have one of their own [W], by node. */
  readonly outputs: Float64Array;
  /** Heat that each node makes or absorbs [W], light absorbed included, as of the last `evaluate`. */
  readonly heat: Float64Array;
  /** Light that leaves the network [W]. */
  lightOut = 0;
  readonly ledGroups: readonly LedGroup[];
  readonly others: readonly OtherDevice[];

  private readonly lightTo: Int32Array[][];
  private readonly lightShare: Float64Array[][];
  private readonly slotFromTo: Int32Array;
  private readonly slotToFrom: Int32Array;
  private readonly out: FlowOut = { flow: 0, byFrom: 0, byTo: 0, film: 0 };
  private readonly ohm = { value: 0, slope: 0 };

  /** @throws EngineError when the document cannot be solved as it stands */
  constructor(readonly document: NetworkDocument) {
    validateNetwork(document);
    const { nodes, links, supplies } = document;
    this.nodeCount = nodes.length;
    this.nodeIndex = new Map(nodes.map(({ id }, i) => [id, i]));
    const index = (id: string) => this.nodeIndex.get(id) as number;
    this.unknown = new Int32Array(nodes.length);
    let count = 0;
    nodes.forEach((node, i) => (this.unknown[i] = node.fixedC === undefined ? count++ : -1));
    this.unknownCount = count;
    this.temperatures = Float64Array.from(nodes, (node) => (node.fixedC ?? 25) + zeroCelsius);
    this.givenHeat = Float64Array.from(nodes, (node) => node.heatW ?? 0);
    this.outputs = Float64Array.from(nodes, ({ source }) => (source?.kind === 'converter' ? (source.outputW ?? 0) : 0));
    this.heat = new Float64Array(nodes.length);
    this.residual = new Float64Array(count);
    this.stiffness = new Float64Array(count);
    this.from = Int32Array.from(links, (link) => index(link.from));
    this.to = Int32Array.from(links, (link) => index(link.to));
    this.laws = links.map((link) => linkLaw(link, document));
    this.flows = new Float64Array(links.length);
    this.films = new Float64Array(links.length);
    this.supplyCurrents = Float64Array.from(supplies, ({ currentA }) => currentA);
    this.ownCurrents = Float64Array.from(nodes, ({ source }) =>
      source && source.kind !== 'converter' ? (source.currentA ?? 0) : 0,
    );

    const supplyIndex = new Map(supplies.map(({ id }, i) => [id, i]));
    const groups = new Map<string, { nodes: number[]; leds: LedSource[]; supply: number }>();
    const others: OtherDevice[] = [];
    nodes.forEach(({ source, id }, i) => {
      if (!source) return;
      const supply = source.supply === undefined ? -1 : (supplyIndex.get(source.supply) as number);
      if (source.kind !== 'led') {
        others.push({ node: i, source, supply });
        return;
      }
      const key = source.supply === undefined ? `own ${id}` : `supply ${source.supply}`;
      const group = groups.get(key) ?? { nodes: [], leds: [], supply };
      group.nodes.push(i);
      group.leds.push(source);
      groups.set(key, group);
    });
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

    this.matrix = new SparseLu(count, this.structure());
    const slot = (row: number, column: number) => {
      const i = this.unknown[row] as number;
      const j = this.unknown[column] as number;
      return i < 0 || j < 0 ? -1 : this.matrix.slot(i, j);
    };
    this.slotFromTo = Int32Array.from(links, (_, l) => slot(this.from[l] as number, this.to[l] as number));
    this.slotToFrom = Int32Array.from(links, (_, l) => slot(this.to[l] as number, this.from[l] as number));
  }

  /** Which unknowns meet in an equation: ends of a link; arrays on one supply with each other and with what their light heats. */
  private structure(): [number, number][] {
    const pairs: [number, number][] = [];
    const join = (a: number, b: number) => {
      const i = this.unknown[a] as number;
      const j = this.unknown[b] as number;
      if (i >= 0 && j >= 0 && i !== j) pairs.push([i, j]);
    };
    for (let l = 0; l < this.from.length; l++) join(this.from[l] as number, this.to[l] as number);
    this.ledGroups.forEach((group, g) => {
      const touched = new Set<number>(group.nodes);
      this.lightTo[g]?.forEach((nodes) => nodes.forEach((node) => touched.add(node)));
      for (const a of touched) for (const b of group.nodes) join(a, b);
    });
    return pairs;
  }

  /** Fills residual, flows and the matrix ∂residual/∂T at the present temperatures. */
  evaluate(): void {
    const { temperatures, unknown, residual, stiffness, matrix, out, from, to } = this;
    const { diagonal, offDiagonal } = matrix;
    residual.fill(0);
    stiffness.fill(0);
    diagonal.fill(0);
    offDiagonal.fill(0);
    for (let l = 0; l < from.length; l++) {
      const f = from[l] as number;
      const t = to[l] as number;
      out.film = 0;
      (this.laws[l] as LinkLaw).evaluate(temperatures[f] as number, temperatures[t] as number, out);
      this.flows[l] = out.flow;
      this.films[l] = out.film;
      const i = unknown[f] as number;
      const j = unknown[t] as number;
      if (i >= 0) {
        residual[i] = (residual[i] as number) + out.flow;
        diagonal[i] = (diagonal[i] as number) + out.byFrom;
        stiffness[i] = (stiffness[i] as number) + Math.abs(out.byFrom);
      }
      if (j >= 0) {
        residual[j] = (residual[j] as number) - out.flow;
        diagonal[j] = (diagonal[j] as number) - out.byTo;
        stiffness[j] = (stiffness[j] as number) + Math.abs(out.byTo);
      }
      const a = this.slotFromTo[l] as number;
      if (a >= 0) {
        const b = this.slotToFrom[l] as number;
        offDiagonal[a] = (offDiagonal[a] as number) + out.byTo;
        offDiagonal[b] = (offDiagonal[b] as number) - out.byFrom;
      }
    }
    this.evaluateHeat();
    for (let n = 0; n < this.nodeCount; n++) {
      const i = unknown[n] as number;
      if (i >= 0) residual[i] = (residual[i] as number) - (this.heat[n] as number);
    }
  }

  private evaluateHeat(): void {
    const { heat, givenHeat, unknown, matrix, temperatures, ohm } = this;
    heat.set(givenHeat);
    for (const device of this.others) {
      const current =
        device.supply >= 0 ? (this.supplyCurrents[device.supply] as number) : (this.ownCurrents[device.node] as number);
      if (device.source.kind === 'converter') {
        heat[device.node] =
          (heat[device.node] as number) +
          converterLoss(device.source, this.outputOf(device.node, device.source, current));
        continue;
      }
      resistanceAt(device.source, temperatures[device.node] as number, ohm);
      heat[device.node] = (heat[device.node] as number) + current * current * ohm.value;
      const i = unknown[device.node] as number;
      matrix.diagonal[i] = (matrix.diagonal[i] as number) - current * current * ohm.slope;
    }
    this.lightOut = 0;
    for (let g = 0; g < this.ledGroups.length; g++) this.evaluateGroup(g);
  }

  /** Output power of a converter [W]: its own, or output voltage × its supply’s current. */
  outputOf(node: number, converter: ConverterSource, current: number): number {
    return converter.outputW === undefined ? (converter.outputV ?? 0) * current : (this.outputs[node] as number);
  }

  private evaluateGroup(g: number): void {
    const group = this.ledGroups[g] as LedGroup;
    const { nodes, leds, shared, kelvin, states } = group;
    const { heat, temperatures } = this;
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
        const column = nodes[j] as number;
        this.addHeatSlope(node, column, state.heatByI * byI + self * state.heatByT);
        const lightSlope = state.lightByI * byI + self * state.lightByT;
        for (let p = 0; p < targets.length; p++) {
          this.addHeatSlope(targets[p] as number, column, (shares[p] as number) * lightSlope);
        }
      }
    }
  }

  /** Heat of `row` depends on the temperature of `column`. */
  private addHeatSlope(row: number, column: number, slope: number): void {
    if (slope === 0) return;
    const i = this.unknown[row] as number;
    const j = this.unknown[column] as number;
    if (i < 0 || j < 0) return;
    const { diagonal, offDiagonal } = this.matrix;
    if (i === j) diagonal[i] = (diagonal[i] as number) - slope;
    else {
      const slot = this.matrix.slot(i, j);
      offDiagonal[slot] = (offDiagonal[slot] as number) - slope;
    }
  }

  /** A plain linear network at about these temperatures, written into the matrix: for the first guess. */
  linearise(temperature: number): void {
    const { unknown, residual, matrix, temperatures, from, to } = this;
    matrix.diagonal.fill(0);
    matrix.offDiagonal.fill(0);
    this.evaluateHeat();
    // Only the heats are wanted, at their present temperature.
    matrix.diagonal.fill(0);
    matrix.offDiagonal.fill(0);
    residual.fill(0);
    for (let l = 0; l < from.length; l++) {
      const g = (this.laws[l] as LinkLaw).guess(temperature);
      const f = from[l] as number;
      const t = to[l] as number;
      const i = unknown[f] as number;
      const j = unknown[t] as number;
      if (i >= 0) {
        matrix.diagonal[i] = (matrix.diagonal[i] as number) + g;
        if (j < 0) residual[i] = (residual[i] as number) + g * (temperatures[t] as number);
      }
      if (j >= 0) {
        matrix.diagonal[j] = (matrix.diagonal[j] as number) + g;
        if (i < 0) residual[j] = (residual[j] as number) + g * (temperatures[f] as number);
      }
      const a = this.slotFromTo[l] as number;
      if (a >= 0) {
        const b = this.slotToFrom[l] as number;
        matrix.offDiagonal[a] = (matrix.offDiagonal[a] as number) - g;
        matrix.offDiagonal[b] = (matrix.offDiagonal[b] as number) - g;
      }
    }
    for (let n = 0; n < this.nodeCount; n++) {
      const i = unknown[n] as number;
      if (i >= 0) residual[i] = (residual[i] as number) + (this.heat[n] as number);
    }
  }
}
