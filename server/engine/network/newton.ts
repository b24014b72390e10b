import { EngineError } from '../errors.js';
import type { PreparedNetwork } from './prepared.js';

/** No steady state is accepted above this [K]: the laws end there. */
export const hottest = 1500;
/** Lowest temperature that an iteration may visit [K]. */
const coldest = 20;
/** Largest step of one iteration [K]. */
const largestStep = 150;
const mostIterations = 60;
const mostTransientSteps = 400;
/** A solution’s last step [K], and its largest residual as a share of the heat that flows. */
const stepTolerance = 1e-9;
const residualTolerance = 1e-11;
/** Rounding that a residual cannot go below, as a multiple of Σ|conductance| × temperature. */
const rounding = 8 * Number.EPSILON;

export interface SteadyState {
  iterations: number;
  /** False where the slightest push would leave this state: no warm-up ends here. */
  stable: boolean;
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

/** Newton’s method with a line search on the residual. Returns the iterations, or −1 where it got nowhere. */
function newton(network: PreparedNetwork, base: Float64Array, step: Float64Array): number {
  network.evaluate();
  for (let iteration = 1; iteration <= mostIterations; iteration++) {
    const before = norm(network.residual);
    if (!Number.isFinite(before)) return -1;
    const done = excess(network);
    base.set(network.temperatures);
    step.set(network.residual);
    network.matrix.factor();
    network.matrix.solve(step);
    let largest = 0;
    for (let i = 0; i < step.length; i++) largest = Math.max(largest, Math.abs(step[i] as number));
    if (!Number.isFinite(largest)) return -1;
    let scale = largest > largestStep ? largestStep / largest : 1;
    let accepted = false;
    for (let halving = 0; halving < 8; halving++) {
      const moved = move(network, base, step, scale);
      network.evaluate();
      if (norm(network.residual) < before * (1 - 1e-4 * scale) || (done <= 1 && moved <= stepTolerance)) {
        accepted = true;
        break;
      }
      scale /= 2;
    }
    if (!accepted) {
      // At the rounding floor no step can do better: that is an answer. Elsewhere it is not.
      network.temperatures.set(base);
      network.evaluate();
      return done <= 1 ? iteration : -1;
    }
    if (excess(network) <= 1 && largest * scale <= stepTolerance) return iteration;
  }
  return -1;
}

/**
 * Pseudo-transient continuation: implicit steps of a warm-up with one heat capacity everywhere, growing as the residual falls. Ends
 * near a state that a warm-up reaches. Returns the steps, or −1.
 */
function transient(network: PreparedNetwork, base: Float64Array, step: Float64Array): number {
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
    let largest = 0;
    for (let i = 0; i < step.length; i++) largest = Math.max(largest, Math.abs(step[i] as number));
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
  const base = new Float64Array(network.nodeCount);
  const step = new Float64Array(network.unknownCount);
  let iterations = newton(network, base, step);
  let stable = iterations > 0 && factorHere(network);
  if (iterations > 0 && stable) {
    refuseTooHot(network);
    return { iterations, stable };
  }
  const found = iterations > 0 ? Float64Array.from(network.temperatures) : null;
  const spent = Math.max(iterations, 0);
  if (found) stagger(network);
  else firstGuess(network);
  const steps = transient(network, base, step);
  iterations = newton(network, base, step);
  if (iterations > 0) {
    stable = factorHere(network);
    refuseTooHot(network);
    return { iterations: spent + Math.max(steps, 0) + iterations, stable };
  }
  const hot = network.temperatures.some((temperature) => !(temperature < hottest));
  if (hot || steps < 0) throw runaway(network);
  throw new EngineError('not-converged', 'The network did not come to rest: no steady state was found');
}

/** The node with a temperature-dependent source that is hottest; else the hottest of all. */
function runawayNode(network: PreparedNetwork): string {
  const { nodes } = network.document;
  const sources = nodes.map((node, i) => ({
    node,
    t: network.temperatures[i] as number,
    source: node.source !== undefined,
  }));
  const candidates = sources.some(({ source }) => source) ? sources.filter(({ source }) => source) : sources;
  return candidates.reduce((a, b) => (b.t > a.t || Number.isNaN(b.t) ? b : a)).node.id;
}

function runaway(network: PreparedNetwork): EngineError {
  const node = runawayNode(network);
  const i = network.nodeIndex.get(node) as number;
  const message = `“${node}” runs away: there is no steady state below ${String(hottest)} K at this drive`;
  return new EngineError('runaway', message, [{ path: `/nodes/${String(i)}`, message, node }]);
}

function refuseTooHot(network: PreparedNetwork): void {
  for (let n = 0; n < network.nodeCount; n++) {
    if ((network.unknown[n] as number) >= 0 && !((network.temperatures[n] as number) < hottest)) throw runaway(network);
  }
}
