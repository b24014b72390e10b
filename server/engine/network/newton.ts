import { EngineError } from '../errors.js';
import type { PreparedNetwork } from './prepared.js';

/** No steady state is accepted above this [K]: the laws end there. */
export const hottest = 1500;
/** Lowest temperature that an iteration may visit [K]. */
const coldest = 20;
/** Largest step of one iteration [K]. */
const largestStep = 150;
const mostIterations = 80;
const mostHalvings = 10;
const mostTransientSteps = 400;
/** A solution’s last step [K], and its largest residual as a share of the heat that flows. */
const stepTolerance = 1e-10;
const residualTolerance = 1e-11;
/** Rounding that a residual cannot go below, as a multiple of Σ|conductance| × temperature. */
const rounding = 8 * Number.EPSILON;

export interface SteadyState {
  iterations: number;
  /** False where the slightest push would leave this state: no warm-up ends here. */
  stable: boolean;
  /** True where an unstable steady state was found first, and left for this one. */
  leftUnstable?: boolean;
}

function heatScale(network: PreparedNetwork): number {
  let scale = 1e-9;
  for (const heat of network.heat) scale += Math.abs(heat);
  for (let l = 0; l < network.flows.length; l++) {
    const fixed =
      (network.unknown[network.from[l] as number] as number) < 0 ||
      (network.unknown[network.to[l] as number] as number) < 0;
    if (fixed) scale += Math.abs(network.flows[l] as number);
  }
  return scale;
}

/** Largest residual beyond its tolerance: converged where this is at most 1. */
function excess(network: PreparedNetwork): number {
  const allowed = residualTolerance * heatScale(network);
  let worst = 0;
  for (let n = 0; n < network.nodeCount; n++) {
    const i = network.unknown[n] as number;
    if (i < 0) continue;
    const floor = rounding * (network.stiffness[i] as number) * (network.temperatures[n] as number);
    const value = Math.abs(network.residual[i] as number) / (allowed + floor);
    if (!(value <= worst)) worst = value;
  }
  return worst;
}

function norm(values: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += (values[i] as number) ** 2;
  return Math.sqrt(sum);
}

/** Room that the iterations need, made once per network. */
interface Workspace {
  base: Float64Array;
  step: Float64Array;
  weight: Float64Array;
}

const workspaces = new WeakMap<PreparedNetwork, Workspace>();

function workspaceOf(network: PreparedNetwork): Workspace {
  let workspace = workspaces.get(network);
  if (!workspace) {
    workspace = {
      base: new Float64Array(network.nodeCount),
      step: new Float64Array(network.unknownCount),
      weight: new Float64Array(network.unknownCount),
    };
    workspaces.set(network, workspace);
  }
  return workspace;
}

/** Moves the unknown temperatures by −scale × step from `base`, fenced off from 0 K. Returns the largest move. */
function move(network: PreparedNetwork, base: Float64Array, step: Float64Array, scale: number): number {
  let largest = 0;
  for (let n = 0; n < network.nodeCount; n++) {
    const i = network.unknown[n] as number;
    if (i < 0) continue;
    const before = base[n] as number;
    const after = Math.max(before - scale * (step[i] as number), coldest);
    network.temperatures[n] = after;
    const moved = Math.abs(after - before);
    if (moved > largest) largest = moved;
  }
  return largest;
}

/** First guess: the linear network, then a small stagger so that no two neighbours are equally warm. */
export function firstGuess(network: PreparedNetwork): void {
  const { temperatures, unknown, matrix, residual } = network;
  let sum = 0;
  let fixed = 0;
  for (let n = 0; n < network.nodeCount; n++) {
    if ((unknown[n] as number) < 0) {
      sum += temperatures[n] as number;
      fixed++;
    }
  }
  const mean = sum / Math.max(fixed, 1);
  for (let n = 0; n < network.nodeCount; n++) if ((unknown[n] as number) >= 0) temperatures[n] = mean;
  if (network.unknownCount === 0) return;
  network.linearise(mean + 20);
  matrix.factor();
  matrix.solve(residual);
  for (let n = 0; n < network.nodeCount; n++) {
    const i = unknown[n] as number;
    if (i < 0) continue;
    const guess = Math.min(Math.max(residual[i] as number, coldest), hottest);
    temperatures[n] = guess + 0.01 * (1 + (i % 7));
  }
}

/** Σ (residual / stiffness)²: how far the nodes are from rest in kelvins, so that a stiff node’s rounding does not hide a soft one. */
function mismatch(network: PreparedNetwork, weight: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < weight.length; i++) sum += ((network.residual[i] as number) * (weight[i] as number)) ** 2;
  return sum;
}

function largestOf(step: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < step.length; i++) {
    const size = Math.abs(step[i] as number);
    if (!(size <= largest)) largest = size;
  }
  return largest;
}

/**
 * Newton’s method with a line search on the mismatch. Returns the iterations, or −1 where it got nowhere.
 *
 * It ends where the residual is within its tolerance and the step is within its own, or where rounding lets no step shrink further.
 */
function newton(network: PreparedNetwork, { base, step, weight }: Workspace): number {
  network.evaluate();
  let lastLargest = Infinity;
  for (let iteration = 1; iteration <= mostIterations; iteration++) {
    const done = excess(network) <= 1;
    for (let i = 0; i < weight.length; i++) weight[i] = 1 / Math.max(network.stiffness[i] as number, 1e-15);
    const before = mismatch(network, weight);
    base.set(network.temperatures);
    step.set(network.residual);
    network.matrix.factor();
    network.matrix.solve(step);
    const largest = largestOf(step);
    if (!Number.isFinite(before) || !Number.isFinite(largest)) return -1;
    if (done && largest <= stepTolerance) return iteration;
    // Within the tolerance already: full steps, as long as each is shorter than the last.
    if (done && largest >= 0.9 * lastLargest) return iteration;
    lastLargest = largest;
    let scale = largest > largestStep ? largestStep / largest : 1;
    let accepted = false;
    for (let halving = 0; halving < mostHalvings; halving++) {
      move(network, base, step, scale);
      network.evaluate();
      if (done || mismatch(network, weight) < before * (1 - 1e-4 * scale)) {
        accepted = true;
        break;
      }
      scale /= 2;
    }
    if (!accepted) {
      network.temperatures.set(base);
      network.evaluate();
      return -1;
    }
  }
  return excess(network) <= 1 ? mostIterations : -1;
}

/**
 * Pseudo-transient continuation: implicit steps of a warm-up with one heat capacity everywhere, growing as the residual falls. Ends
 * near a state that a warm-up reaches. Returns the steps, or −1.
 */
function transient(network: PreparedNetwork, { base, step }: Workspace): number {
  network.evaluate();
  let pace = 0;
  for (let i = 0; i < network.unknownCount; i++) pace = Math.max(pace, network.stiffness[i] as number);
  pace = Math.max(pace, 1e-9);
  for (let steps = 1; steps <= mostTransientSteps; steps++) {
    const before = norm(network.residual);
    base.set(network.temperatures);
    step.set(network.residual);
    const { diagonal } = network.matrix;
    for (let i = 0; i < diagonal.length; i++) diagonal[i] = (diagonal[i] as number) + pace;
    network.matrix.factor();
    network.matrix.solve(step);
    const largest = largestOf(step);
    if (!Number.isFinite(largest)) return -1;
    if (network.matrix.negativePivots > 0 || largest > 50) {
      // Too long a step: it would leap over the state that a warm-up reaches.
      pace *= 4;
      network.temperatures.set(base);
      network.evaluate();
      if (pace > 1e15) return -1;
      continue;
    }
    move(network, base, step, 1);
    network.evaluate();
    for (const temperature of network.temperatures) if (temperature > hottest * 1.05) return -1;
    if (largest < 1e-6 && excess(network) < 1e6) return steps;
    const after = norm(network.residual);
    pace *= Math.min(Math.max(after / before, 0.1), 1.5) * 0.7;
  }
  return -1;
}

/** Sets one array of each shared supply a little warmer, so that an unstable equal share is left. */
function stagger(network: PreparedNetwork): void {
  for (const { nodes } of network.ledGroups) {
    nodes.forEach((node, k) => {
      network.temperatures[node] = (network.temperatures[node] as number) + 5 / (k + 1);
    });
  }
}

function factorHere(network: PreparedNetwork): boolean {
  network.matrix.factor();
  return network.matrix.negativePivots === 0;
}

/**
 * Solves for the steady state from the network’s present temperatures (see `firstGuess`), leaving temperatures, flows and devices as
 * of the answer.
 *
 * Newton first; where it fails, or ends in a state that the slightest push would leave, a pseudo-transient warm-up
 * and Newton again.
 *
 * @throws EngineError `runaway` or `not-converged`: there is never an unconverged answer
 */
export function solveSteady(network: PreparedNetwork): SteadyState {
  if (network.unknownCount === 0) {
    network.evaluate();
    return { iterations: 0, stable: true };
  }
  const workspace = workspaceOf(network);
  let iterations = newton(network, workspace);
  let stable = iterations > 0 && factorHere(network);
  if (iterations > 0 && stable) {
    refuseTooHot(network);
    return { iterations, stable };
  }
  const found = iterations > 0 ? Float64Array.from(network.temperatures) : null;
  const spent = Math.max(iterations, 0);
  if (found) stagger(network);
  else firstGuess(network);
  const steps = transient(network, workspace);
  iterations = newton(network, workspace);
  if (iterations > 0) {
    stable = factorHere(network);
    refuseTooHot(network);
    return { iterations: spent + Math.max(steps, 0) + iterations, stable, leftUnstable: found !== null };
  }
  const extreme = network.temperatures.some((t) => !(t < hottest) || t <= coldest * 1.001);
  if (extreme || steps < 0) throw runaway(network);
  throw new EngineError('not-converged', 'The network did not come to rest: no steady state was found');
}

function unknownNodes(network: PreparedNetwork) {
  return network.document.nodes.flatMap((node, i) =>
    (network.unknown[i] as number) < 0
      ? []
      : [
          {
            id: node.id,
            t: network.temperatures[i] as number,
            heat: network.heat[i] as number,
            source: node.source !== undefined,
          },
        ],
  );
}

/** What runs away: of the nodes with a source the hottest, else the hottest of all; a cooler that nothing can feed is named as such. */
function runaway(network: PreparedNetwork): EngineError {
  const nodes = unknownNodes(network);
  const coldestNode = nodes.reduce((a, b) => (b.t < a.t ? b : a));
  const sink = nodes.reduce((a, b) => (b.heat < a.heat ? b : a));
  const cooled = coldestNode.t <= coldest * 1.001 && sink.heat < 0;
  const heated = nodes.some(({ source }) => source) ? nodes.filter(({ source }) => source) : nodes;
  const node = cooled ? sink.id : heated.reduce((a, b) => (b.t > a.t || Number.isNaN(b.t) ? b : a)).id;
  const message = cooled
    ? `“${node}” takes away more heat than can reach it above 0 K`
    : `“${node}” runs away: there is no steady state below ${String(hottest)} K at this drive`;
  const i = network.nodeIndex.get(node) as number;
  return new EngineError(cooled ? 'outside-range' : 'runaway', message, [
    { path: `/nodes/${String(i)}`, message, node },
  ]);
}

function refuseTooHot(network: PreparedNetwork): void {
  for (let n = 0; n < network.nodeCount; n++) {
    if ((network.unknown[n] as number) >= 0 && !((network.temperatures[n] as number) < hottest)) throw runaway(network);
  }
}
