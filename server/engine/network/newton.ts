import { EngineError } from '../errors.js';
import type { PreparedNetwork } from './prepared.js';
import { coldest, hottest, refuseTooHot, runaway } from './runaway.js';

/** Largest step of one iteration [K]. */
const largestStep = 150;
const mostIterations = 80;
const mostHalvings = 10;
/** Iterations after which temperatures far above the hottest are taken for a runaway. */
const patience = 5;
/** In networks of so many unknowns a state on the way to an answer gets no second try. */
const large = 1500;
const mostTransientSteps = 400;
/** Unknowns times steps that the fallback may take. */
const transientBudget = 3e5;
/** A solution’s last step [K], and its largest residual as a share of the heat that flows. */
const stepTolerance = 1e-10;
const residualTolerance = 1e-11;
/** Rounding that a residual cannot go below, as a multiple of Σ|conductance| × temperature. */
const rounding = 8 * Number.EPSILON;
/** From this many unknowns on, a factorisation that still serves well is used again: while each step is this share of the last, or less. */
const worthReusing = 600;
const servesWell = 0.45;
/** In a large network one made on this very way to the answer is soon worth making again: Newton’s method is near its end then. */
const servesWellFresh = 0.1;

export interface SteadyState {
  iterations: number;
  /** False where the slightest push would leave this state: no warm-up ends here. */
  stable: boolean;
  /** True where an unstable steady state was found first, and left for this one. */
  leftUnstable?: boolean;
}

/** All heat that sources make and absorb, and that fixed temperatures take or give [W]. */
function heatScale(network: PreparedNetwork): number {
  const { residual, rows, size } = network;
  const { heat } = network.sources;
  // A tenth of a picowatt is as near as anyone can ask.
  let scale = 0.01;
  for (let n = 0; n < size; n++) scale += Math.abs(heat[n] as number);
  for (let n = rows; n < size; n++) scale += Math.abs(residual[n] as number);
  return scale;
}

/** Largest residual beyond its tolerance: converged where this is at most 1. */
function excess(network: PreparedNetwork, looser = 1): number {
  const { residual, stiffness, temperatures, unknownCount } = network;
  const allowed = residualTolerance * looser * heatScale(network);
  let worst = 0;
  for (let i = 0; i < unknownCount; i++) {
    const floor = rounding * (stiffness[i] as number) * (temperatures[i] as number);
    const value = Math.abs(residual[i] as number) / (allowed + floor);
    if (!(value <= worst)) worst = value;
  }
  return worst;
}

function norm(values: Float64Array, count: number): number {
  let sum = 0;
  for (let i = 0; i < count; i++) sum += (values[i] as number) ** 2;
  return Math.sqrt(sum);
}

/** Room that the iterations need, made once per network. */
interface Workspace {
  base: Float64Array;
  step: Float64Array;
  weight: Float64Array;
  /** The step before this one. */
  last: Float64Array;
}

const workspaces = new WeakMap<PreparedNetwork, Workspace>();

function workspaceOf(network: PreparedNetwork): Workspace {
  let workspace = workspaces.get(network);
  if (!workspace) {
    workspace = {
      base: new Float64Array(network.size),
      step: new Float64Array(network.rows),
      weight: new Float64Array(network.unknownCount),
      last: new Float64Array(network.unknownCount),
    };
    workspaces.set(network, workspace);
  }
  return workspace;
}

/** Fills `step` with the solution of J step = residual; the rows that only the matrix knows have no residual. */
function solveForStep(network: PreparedNetwork, step: Float64Array): void {
  const { residual, unknownCount, rows } = network;
  for (let i = 0; i < unknownCount; i++) step[i] = residual[i] as number;
  for (let i = unknownCount; i < rows; i++) step[i] = 0;
  network.matrix.solve(step);
}

function hottestOf({ temperatures, unknownCount }: PreparedNetwork): number {
  let highest = 0;
  for (let i = 0; i < unknownCount; i++) {
    const t = temperatures[i] as number;
    if (t > highest) highest = t;
  }
  return highest;
}

/** Moves the unknown temperatures by −scale × step from `base`, fenced off from 0 K. */
function move(network: PreparedNetwork, base: Float64Array, step: Float64Array, scale: number): void {
  const { temperatures, unknownCount } = network;
  for (let i = 0; i < unknownCount; i++) {
    const after = (base[i] as number) - scale * (step[i] as number);
    temperatures[i] = after > coldest ? after : coldest;
  }
  network.project();
}

/** First guess: the linear network, then a small stagger so that no two neighbours are equally warm. */
export function firstGuess(network: PreparedNetwork): void {
  const { temperatures, unknownCount, rows, size } = network;
  let sum = 0;
  for (let n = rows; n < size; n++) sum += temperatures[n] as number;
  const mean = sum / Math.max(size - rows, 1);
  for (let i = 0; i < unknownCount; i++) temperatures[i] = mean;
  if (unknownCount === 0) return;
  network.linearise(mean + 20);
  network.factored = false;
  network.matrix.factor();
  const { step } = workspaceOf(network);
  solveForStep(network, step);
  const stagger = network.isLinear ? 0 : 0.01;
  for (let i = 0; i < unknownCount; i++) {
    const guess = Math.min(Math.max(mean - (step[i] as number), coldest), hottest);
    temperatures[i] = guess + stagger * (1 + (i % 7));
  }
  network.project();
}

/** Starts a network from the state and the factors of a like one; from a first guess where there is none. */
export function startFrom(network: PreparedNetwork, near: PreparedNetwork | undefined): void {
  if (near?.size !== network.size || near.rows !== network.rows) {
    firstGuess(network);
    return;
  }
  const { temperatures, unknownCount } = network;
  for (let i = 0; i < unknownCount; i++) temperatures[i] = near.temperatures[i] as number;
  network.project();
  network.factored = near.factored && network.matrix.adopt(near.matrix);
}

/** Σ (residual / stiffness)²: how far the nodes are from rest in kelvins, so that a stiff node’s rounding does not hide a soft one. */
function mismatch(network: PreparedNetwork, weight: Float64Array): number {
  const { residual } = network;
  let sum = 0;
  for (let i = 0; i < weight.length; i++) sum += ((residual[i] as number) * (weight[i] as number)) ** 2;
  return sum;
}

function largestOf(step: Float64Array, count: number): number {
  let largest = 0;
  for (let i = 0; i < count; i++) {
    const size = Math.abs(step[i] as number);
    if (!(size <= largest)) largest = size;
  }
  return largest;
}

/**
 * The step that would follow, foretold for each node by how its last two compare: by the square of their ratio with a new matrix, by the
 * ratio itself with an old one. Node by node, since a node near ΔT = 0 of natural convection comes to rest only linearly.
 */
function foretoldStep(step: Float64Array, last: Float64Array, newMatrix: boolean): number {
  let largest = 0;
  for (let i = 0; i < last.length; i++) {
    const size = Math.abs(step[i] as number);
    const before = Math.abs(last[i] as number);
    const ratio = size < before ? size / before : 1;
    const next = size * (newMatrix ? ratio * ratio : ratio);
    if (next > largest) largest = next;
  }
  return largest;
}

/**
 * Newton’s method with a line search on the mismatch. Returns the iterations, or −1 where it got nowhere.
 *
 * It ends where the residual is within its tolerance and the step that would follow within its own (as the last two steps foretell it:
 * by their square where the matrix was new, by their ratio where it was not), or where rounding lets no step shrink further.
 */
function newton(network: PreparedNetwork, { base, step, weight, last }: Workspace, looser: number): number {
  const { unknownCount, stiffness } = network;
  network.evaluate();
  let done = excess(network, looser) <= 1;
  if (done && network.isLinear) return 1;
  let lastLargest = Infinity;
  let ratio = 1;
  let lastReused = false;
  let fresh = false;
  for (let iteration = 1; iteration <= mostIterations; iteration++) {
    for (let i = 0; i < unknownCount; i++) {
      const s = stiffness[i] as number;
      weight[i] = 1 / (s > 1e-15 ? s : 1e-15);
    }
    const before = mismatch(network, weight);
    base.set(network.temperatures);
    // One from a neighbouring state is given a first step, to be judged by the second.
    const reuse: boolean =
      network.factored &&
      unknownCount >= worthReusing &&
      (iteration === 1 ||
        ratio < (fresh && unknownCount >= large ? servesWellFresh : servesWell) ||
        (iteration === 2 && lastReused));
    if (!reuse) {
      network.matrix.factor();
      network.factored = true;
      fresh = true;
    }
    lastReused = reuse;
    solveForStep(network, step);
    const largest = largestOf(step, unknownCount);
    if (!Number.isFinite(before) || !Number.isFinite(largest)) return -1;
    if (done && largest <= stepTolerance * looser) return iteration;
    // Within the tolerance already: full steps, as long as each is shorter than the last.
    if (done && largest >= 0.9 * lastLargest) return iteration;
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
      // No step makes it better, and the step says that the answer lies within the tolerance: rounding is all that is left.
      if (largest <= stepTolerance * looser || excess(network, 100 * looser) <= 1) return iteration;
      if (!reuse) return -1;
      network.factored = false;
      ratio = 1;
      continue;
    }
    done = excess(network, looser) <= 1;
    if (!done && iteration >= patience && largest > 1 && hottestOf(network) > 1.3 * hottest) return -1;
    ratio = largest / lastLargest;
    if (done && scale === 1 && iteration > 1 && foretoldStep(step, last, !reuse) <= stepTolerance * looser)
      return iteration;
    for (let i = 0; i < unknownCount; i++) last[i] = step[i] as number;
    lastLargest = largest;
  }
  return excess(network, looser) <= 1 ? mostIterations : -1;
}

/**
 * Pseudo-transient continuation: implicit steps of a warm-up with one heat capacity everywhere, growing as the residual falls. Ends
 * near a state that a warm-up reaches. Returns the steps, or −1.
 */
function transient(network: PreparedNetwork, { base, step }: Workspace): number {
  const { unknownCount } = network;
  network.evaluate();
  let pace = 0;
  for (let i = 0; i < unknownCount; i++) pace = Math.max(pace, network.stiffness[i] as number);
  pace = Math.max(pace, 1e-9);
  // In a large network each step is dear: what has not come near its state by then is refused.
  const most = Math.min(mostTransientSteps, Math.max(30, Math.ceil(transientBudget / unknownCount)));
  for (let steps = 1; steps <= most; steps++) {
    const before = norm(network.residual, unknownCount);
    base.set(network.temperatures);
    const { diagonal } = network.matrix;
    for (let i = 0; i < unknownCount; i++) diagonal[i] = (diagonal[i] as number) + pace;
    network.factored = false;
    network.matrix.factor();
    solveForStep(network, step);
    const largest = largestOf(step, unknownCount);
    if (!Number.isFinite(largest)) return -1;
    if (network.matrix.negativePivots > network.expectedNegativePivots || largest > 50) {
      // Too long a step: it would leap over the state that a warm-up reaches.
      pace *= 4;
      network.temperatures.set(base);
      network.evaluate();
      if (pace > 1e15) return -1;
      continue;
    }
    move(network, base, step, 1);
    network.evaluate();
    for (let i = 0; i < unknownCount; i++) if ((network.temperatures[i] as number) > hottest * 1.05) return -1;
    if (largest < 1e-6 && excess(network) < 1e6) return steps;
    const after = norm(network.residual, unknownCount);
    pace *= Math.min(Math.max(after / before, 0.1), 1.5) * 0.7;
  }
  return -1;
}

/**
 * How the solved state answers to a change of the drive: J dT = −∂residual/∂drive, with the matrix as last factored.
 *
 * @param change makes the change; the caller undoes it
 * @param by size of the change
 * @param step dT per unit of change, on return [K]
 */
export function tangent(network: PreparedNetwork, change: () => void, by: number, step: Float64Array): void {
  const { residual, unknownCount, rows } = network;
  change();
  network.evaluate();
  for (let i = 0; i < unknownCount; i++) step[i] = -(residual[i] as number) / by;
  for (let i = unknownCount; i < rows; i++) step[i] = 0;
  network.matrix.solve(step);
}

/** Sets one array of each shared supply a little warmer, so that an unstable equal share is left. */
function stagger(network: PreparedNetwork): void {
  for (const { nodes } of network.sources.ledGroups) {
    nodes.forEach((node, k) => {
      network.temperatures[node] = (network.temperatures[node] as number) + 5 / (k + 1);
    });
  }
}

/** Of the matrix as it was last factored, within the last step of the answer. */
function isStable(network: PreparedNetwork): boolean {
  return network.matrix.negativePivots === network.expectedNegativePivots;
}

/**
 * Solves for the steady state from the network’s present temperatures (see `firstGuess`), leaving temperatures and devices as
 * of the answer.
 *
 * Newton first; where it fails, or ends in a state that the slightest push would leave, a pseudo-transient warm-up
 * and Newton again.
 *
 * @param looser how many times looser the tolerances may be, for states on the way to an answer
 * @throws EngineError `runaway` or `not-converged`: there is never an unconverged answer
 */
export function solveSteady(network: PreparedNetwork, looser = 1): SteadyState {
  if (network.unknownCount === 0) {
    network.evaluate();
    return { iterations: 0, stable: true };
  }
  const workspace = workspaceOf(network);
  let iterations = newton(network, workspace, looser);
  if (iterations > 0 && isStable(network)) {
    refuseTooHot(network);
    return { iterations, stable: true };
  }
  if (iterations <= 0 && looser > 1 && network.unknownCount >= large) {
    throw new EngineError('not-converged', 'No steady state was found on the way');
  }
  const found = iterations > 0;
  const spent = Math.max(iterations, 0);
  if (found) stagger(network);
  else firstGuess(network);
  const steps = transient(network, workspace);
  iterations = newton(network, workspace, looser);
  if (iterations > 0) {
    refuseTooHot(network);
    return {
      iterations: spent + Math.max(steps, 0) + iterations,
      stable: isStable(network),
      leftUnstable: found,
    };
  }
  let extreme = false;
  for (let i = 0; i < network.unknownCount; i++) {
    const t = network.temperatures[i] as number;
    if (!(t < hottest) || t <= coldest * 1.001) extreme = true;
  }
  if (extreme || steps < 0) throw runaway(network);
  throw new EngineError('not-converged', 'The network did not come to rest: no steady state was found');
}
