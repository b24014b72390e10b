import type { DeviceAnswer, LimitAnswer, SolveAnswer, Warning } from '../../../shared/schemas/network-answers.js';
import type { NetworkLimit } from '../../../shared/schemas/network.js';
import { blankFilmAir, filmAir } from '../air.js';
import { gravity, zeroCelsius } from '../constants.js';
import type { Correlation } from '../convection/correlation.js';
import { resistanceAt } from '../devices/resistor.js';
import { lookUp } from '../tables.js';
import type { SteadyState } from './newton.js';
import type { PreparedNetwork } from './prepared.js';
import { linkName } from './validate.js';

/** Current, voltage, power, heat and light of every device, by node. */
export function deviceAnswers(network: PreparedNetwork, stable: boolean): Record<string, DeviceAnswer> {
  const answers: Record<string, DeviceAnswer> = {};
  const id = (node: number) => network.document.nodes[node]?.id ?? '';
  const ohm = { value: 0, slope: 0 };
  for (const { node, source, supply } of network.others) {
    const currentA = (supply >= 0 ? network.supplyCurrents[supply] : network.ownCurrents[node]) ?? 0;
    if (source.kind === 'converter') {
      const outputW = network.outputOf(node, source, currentA);
      const heatW = (network.heat[node] ?? 0) - (network.givenHeat[node] ?? 0);
      answers[id(node)] = { electricalW: outputW + heatW, heatW, ...(supply >= 0 ? { currentA } : {}) };
      continue;
    }
    resistanceAt(source, network.temperatures[node] ?? 0, ohm);
    const voltageV = currentA * ohm.value;
    const heatW = currentA * voltageV;
    answers[id(node)] = { currentA, voltageV, electricalW: heatW, heatW, senseV: voltageV };
  }
  for (const group of network.ledGroups) {
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
  for (const group of network.ledGroups) {
    const k = group.nodes.indexOf(node);
    if (k >= 0) return (group.states[k]?.voltage ?? 0) * (group.shared.currents[k] ?? 0);
  }
  return network.heat[node] ?? 0;
}

function ratedCurrent(network: PreparedNetwork, node: number): number {
  for (const group of network.ledGroups) {
    const k = group.nodes.indexOf(node);
    if (k >= 0) return group.shared.currents[k] ?? 0;
  }
  const device = network.others.find((other) => other.node === node);
  if (!device) return 0;
  return (device.supply >= 0 ? network.supplyCurrents[device.supply] : network.ownCurrents[node]) ?? 0;
}

/** Least share of a rating that a derating curve is taken to allow, so that a ratio stays a number. */
const leastShare = 1e-6;

/** A limit made ready to be read again and again. */
export interface LimitReader {
  id: string;
  kind: LimitAnswer['kind'];
  node?: string;
  /** Negative where the limit holds: in K for temperatures, else a share of the rating. Smooth in the drive. */
  excess: () => number;
  answer: () => LimitAnswer;
}

export function limitReader(network: PreparedNetwork, limit: NetworkLimit): LimitReader {
  const index = (id: string) => network.nodeIndex.get(id) ?? 0;
  if ('maxC' in limit) {
    const node = index(limit.node);
    const celsius = () => (network.temperatures[node] ?? 0) - zeroCelsius;
    return {
      id: limit.id,
      kind: 'temperature',
      node: limit.node,
      excess: () => celsius() - limit.maxC,
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
      'supply' in limit ? (network.supplyCurrents[supply] ?? 0) : ratedCurrent(network, index(limit.node));
    const where = 'supply' in limit ? { supply: limit.supply } : { node: limit.node };
    return {
      id: limit.id,
      kind: 'current',
      ...('node' in limit ? { node: limit.node } : {}),
      excess: () => current() / limit.maxA - 1,
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
  const reference = limit.derating ? index(limit.derating.referenceNode) : -1;
  const allowed = () =>
    limit.derating ? lookUp(limit.derating.points, (network.temperatures[reference] ?? 0) - zeroCelsius) : 1;
  const used = () => ratedPower(network, node) / limit.maxW;
  return {
    id: limit.id,
    kind: 'power',
    node: limit.node,
    excess: () => used() - limit.maxShare * allowed(),
    answer: () => {
      const value = used() / Math.max(allowed(), leastShare);
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
  const air = blankFilmAir();
  const { temperatures, from, to, document } = network;
  return network.laws.flatMap((law, l) => {
    if (!law.convective) return [];
    const a = temperatures[from[l] ?? 0] ?? 0;
    const b = temperatures[to[l] ?? 0] ?? 0;
    const link = document.links[l];
    const correlation: Correlation = a >= b ? law.convective.hot : law.convective.cold;
    const range = correlation.range.ra;
    if (!range || !link) return [];
    filmAir((a + b) / 2, document.pressurePa, gravity, air);
    const ra = air.rayleighFactor * Math.abs(a - b) * law.convective.lengthM ** 3;
    // Where next to nothing flows, being outside the range changes nothing.
    if (Math.abs(a - b) < 0.05 || (ra >= range[0] && ra <= range[1])) return [];
    const name = linkName(link, l);
    const message =
      `${name}: Ra = ${ra.toExponential(1)} lies outside the published range ` +
      `${range[0].toExponential(0)} … ${range[1].toExponential(0)} of ${correlation.id} (${correlation.shape})`;
    return [{ code: 'outside-range', link: name, message }];
  });
}

/** Heat and light in and out: what sources and warmer fixed nodes give, and where it goes [W]. */
function heatBalance(network: PreparedNetwork): SolveAnswer['heatBalance'] {
  const { unknown, flows, from, to, heat } = network;
  const intoFixed = new Float64Array(network.nodeCount);
  for (let l = 0; l < flows.length; l++) {
    const f = from[l] ?? 0;
    const t = to[l] ?? 0;
    if ((unknown[f] ?? 0) < 0) intoFixed[f] = (intoFixed[f] ?? 0) - (flows[l] ?? 0);
    if ((unknown[t] ?? 0) < 0) intoFixed[t] = (intoFixed[t] ?? 0) + (flows[l] ?? 0);
  }
  let inW = network.lightOut;
  let outW = 0;
  for (let n = 0; n < network.nodeCount; n++) {
    if ((unknown[n] ?? 0) >= 0) inW += heat[n] ?? 0;
    else if ((intoFixed[n] ?? 0) > 0) outW += intoFixed[n] ?? 0;
    else inW -= intoFixed[n] ?? 0;
  }
  const largestResidualW = network.residual.reduce((largest, value) => Math.max(largest, Math.abs(value)), 0);
  return { inW, outW, lightOutW: network.lightOut, largestResidualW };
}

export function temperaturesC(network: PreparedNetwork): Record<string, number> {
  return Object.fromEntries(
    network.document.nodes.map(({ id }, i) => [id, (network.temperatures[i] ?? 0) - zeroCelsius]),
  );
}

/** Everything a solved network says. */
export function networkAnswer(network: PreparedNetwork, state: SteadyState): SolveAnswer {
  const { links, limits } = network.document;
  const named = links.map((link, l) => [linkName(link, l), l] as const);
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
  return {
    converged: true,
    temperaturesC: temperaturesC(network),
    flowsW: Object.fromEntries(named.map(([name, l]) => [name, network.flows[l] ?? 0])),
    filmCoefficientsWPerM2K: Object.fromEntries(
      named.filter(([, l]) => network.laws[l]?.convective).map(([name, l]) => [name, network.films[l] ?? 0]),
    ),
    devices: deviceAnswers(network, state.stable),
    limits: limits.map((limit) => limitReader(network, limit).answer()),
    heatBalance: heatBalance(network),
    iterations: state.iterations,
    warnings,
  };
}
