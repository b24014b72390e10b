import type { DeviceAnswer, LimitAnswer, SolveAnswer, Warning } from '../../../shared/schemas/network-answers.js';
import type { NetworkLimit } from '../../../shared/schemas/network.js';
import { zeroCelsius } from '../constants.js';
import { resistanceAt } from '../devices/resistor.js';
import { lookUp } from '../tables.js';
import type { SteadyState } from './newton.js';
import type { PreparedNetwork } from './prepared.js';
import { linkName } from './validate.js';

/** Current, voltage, power, heat and light of every device, by node. */
export function deviceAnswers(network: PreparedNetwork, stable: boolean): Record<string, DeviceAnswer> {
  const answers: Record<string, DeviceAnswer> = {};
  const ids = new Map(network.document.nodes.map(({ id }) => [network.numberOf(id), id]));
  const id = (node: number) => ids.get(node) ?? '';
  const { sources } = network;
  const ohm = { value: 0, slope: 0 };
  for (const { node, source, supply } of sources.others) {
    const currentA = (supply >= 0 ? sources.supplyCurrents[supply] : sources.ownCurrents[node]) ?? 0;
    if (source.kind === 'converter') {
      const outputW = sources.outputOf(node, source, currentA);
      const heatW = (sources.heat[node] ?? 0) - (sources.givenHeat[node] ?? 0);
      answers[id(node)] = { electricalW: outputW + heatW, heatW, ...(supply >= 0 ? { currentA } : {}) };
      continue;
    }
    resistanceAt(source, network.temperatures[node] ?? 0, ohm);
    const voltageV = currentA * ohm.value;
    const heatW = currentA * voltageV;
    answers[id(node)] = { currentA, voltageV, electricalW: heatW, heatW, senseV: voltageV };
  }
  for (const group of network.sources.ledGroups) {
    const total = group.shared.currents.reduce((sum, current) => sum + current, 0);
    group.nodes.forEach((node, k) => {
      const state = group.states[k];
      const currentA = group.shared.currents[k] ?? 0;
      if (!state) return;
      answers[id(node)] = {
        currentA,
        voltageV: state.voltage,
        electricalW: state.voltage * currentA,
        heatW: state.heat,
        lightW: state.light,
        share: total > 0 ? currentA / total : 1 / group.nodes.length,
        stable: group.nodes.length === 1 || stable,
      };
    });
  }
  return answers;
}

/** Power that a rating at this node speaks of [W]: of the device, else the given heat. */
function ratedPower(network: PreparedNetwork, node: number): number {
  for (const group of network.sources.ledGroups) {
    const k = group.nodes.indexOf(node);
    if (k >= 0) return (group.states[k]?.voltage ?? 0) * (group.shared.currents[k] ?? 0);
  }
  return network.sources.heat[node] ?? 0;
}

function ratedCurrent(network: PreparedNetwork, node: number): number {
  for (const group of network.sources.ledGroups) {
    const k = group.nodes.indexOf(node);
    if (k >= 0) return group.shared.currents[k] ?? 0;
  }
  const { sources } = network;
  const device = sources.others.find((other) => other.node === node);
  if (!device) return 0;
  return (device.supply >= 0 ? sources.supplyCurrents[device.supply] : sources.ownCurrents[node]) ?? 0;
}

/** Least share of a rating that a derating curve is taken to allow, so that a ratio stays a number. */
const leastShare = 1e-6;

/** A limit made ready to be read again and again. */
export interface LimitReader {
  id: string;
  kind: LimitAnswer['kind'];
  node?: string;
  /** Writes what the limit is read from, smooth in the drive: its value at `at`, and at `at + 1` what it is held against. */
  read: (out: Float64Array, at: number) => void;
  /** Negative where the limit holds: in K for temperatures, else a share of the rating; from what `read` gives. */
  excess: (value: number, against: number) => number;
  answer: () => LimitAnswer;
}

export function limitReader(network: PreparedNetwork, limit: NetworkLimit): LimitReader {
  const index = (id: string) => network.numberOf(id);
  if ('maxC' in limit) {
    const kelvin = network.reader(limit.node);
    const celsius = () => kelvin() - zeroCelsius;
    return {
      id: limit.id,
      kind: 'temperature',
      node: limit.node,
      read: (out, at) => {
        out[at] = celsius();
      },
      excess: (value) => value - limit.maxC,
      answer: () => ({
        id: limit.id,
        kind: 'temperature',
        node: limit.node,
        value: celsius(),
        limit: limit.maxC,
        margin: limit.maxC - celsius(),
      }),
    };
  }
  if ('maxA' in limit) {
    const supply = 'supply' in limit ? network.document.supplies.findIndex(({ id }) => id === limit.supply) : -1;
    const current = () =>
      'supply' in limit ? (network.sources.supplyCurrents[supply] ?? 0) : ratedCurrent(network, index(limit.node));
    const where = 'supply' in limit ? { supply: limit.supply } : { node: limit.node };
    return {
      id: limit.id,
      kind: 'current',
      ...('node' in limit ? { node: limit.node } : {}),
      read: (out, at) => {
        out[at] = current();
      },
      excess: (value) => value / limit.maxA - 1,
      answer: () => ({
        id: limit.id,
        kind: 'current',
        ...where,
        value: current(),
        limit: limit.maxA,
        margin: limit.maxA - current(),
      }),
    };
  }
  const node = index(limit.node);
  const { derating } = limit;
  const reference = derating ? network.reader(derating.referenceNode) : () => 0;
  const allowed = (celsius: number) => (derating ? lookUp(derating.points, celsius) : 1);
  const celsius = () => reference() - zeroCelsius;
  const used = () => ratedPower(network, node) / limit.maxW;
  return {
    id: limit.id,
    kind: 'power',
    node: limit.node,
    read: (out, at) => {
      out[at] = used();
      out[at + 1] = celsius();
    },
    excess: (value, against) => value - limit.maxShare * allowed(against),
    answer: () => {
      const value = used() / Math.max(allowed(celsius()), leastShare);
      return {
        id: limit.id,
        kind: 'power',
        node: limit.node,
        value,
        limit: limit.maxShare,
        margin: limit.maxShare - value,
      };
    },
  };
}

function rangeWarnings(network: PreparedNetwork): Warning[] {
  const { temperatures, document, films } = network;
  const warn = (link: string, texts: readonly string[]): Warning[] =>
    texts.map((text) => ({ code: 'outside-range', link, message: `${link}: ${text}` }));
  const ofLinks = document.links.flatMap((link, l) => {
    const placed = network.lawOf(l);
    if (!placed?.law.outside) return [];
    return warn(linkName(link, l), placed.law.outside(temperatures[placed.from] ?? 0, temperatures[placed.to] ?? 0));
  });
  const ofFilms = films.flatMap((film) => {
    const air = temperatures[film.air] ?? 0;
    return warn(film.id, film.law.outside?.(air + film.excess, air) ?? []);
  });
  return [...ofLinks, ...ofFilms];
}

/** Heat and light in and out: what sources and warmer fixed nodes give, and where it goes [W]. */
function heatBalance(network: PreparedNetwork): SolveAnswer['heatBalance'] {
  const { residual, unknownCount, rows, size } = network;
  const { heat, lightOut } = network.sources;
  let inW = lightOut;
  let outW = 0;
  let largestResidualW = 0;
  for (let n = 0; n < unknownCount; n++) {
    inW += heat[n] ?? 0;
    largestResidualW = Math.max(largestResidualW, Math.abs(residual[n] ?? 0));
  }
  for (let n = rows; n < size; n++) {
    const taken = -(residual[n] ?? 0);
    if (taken > 0) outW += taken;
    else inW -= taken;
  }
  return { inW, outW, lightOutW: lightOut, largestResidualW };
}

/** Temperatures of all nodes, then of all readings of grids. */
export function temperaturesC(network: PreparedNetwork): Record<string, number> {
  const answer: Record<string, number> = {};
  for (const { id } of network.document.nodes) {
    answer[id] = (network.temperatures[network.numberOf(id)] ?? 0) - zeroCelsius;
  }
  for (const id of network.readingIds) answer[id] = network.reader(id)() - zeroCelsius;
  return answer;
}

/** Everything a solved network says. */
export function networkAnswer(network: PreparedNetwork, state: SteadyState): SolveAnswer {
  const { links, limits } = network.document;
  const warnings = rangeWarnings(network);
  if (!state.stable) {
    warnings.push({
      code: 'not-stable',
      message: 'This steady state is not stable: the slightest mismatch would leave it',
    });
  }
  if (state.leftUnstable) {
    warnings.push({
      code: 'share-not-stable',
      message:
        'There is a further steady state that is not stable (arrays in parallel sharing evenly): the slightest mismatch leaves it for the one given here',
    });
  }
  const flowsW: Record<string, number> = {};
  const filmCoefficientsWPerM2K: Record<string, number> = {};
  const note = (name: string, { flow, film }: { flow: number; film?: number }) => {
    flowsW[name] = flow;
    if (film !== undefined) filmCoefficientsWPerM2K[name] = film;
  };
  links.forEach((link, l) => {
    note(linkName(link, l), network.linkFlow(l));
  });
  for (const surface of network.surfaceFlows()) note(surface.id, surface);
  return {
    converged: true,
    temperaturesC: temperaturesC(network),
    flowsW,
    filmCoefficientsWPerM2K,
    devices: deviceAnswers(network, state.stable),
    limits: limits.map((limit) => limitReader(network, limit).answer()),
    heatBalance: heatBalance(network),
    iterations: state.iterations,
    warnings,
  };
}
