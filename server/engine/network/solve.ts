import type { SolveAnswer } from '../../../shared/schemas/network-answers.js';
import type { NetworkDocument } from '../../../shared/schemas/network.js';
import { channelCorrelations } from '../convection/channel.js';
import { secondCorrelation, type ConvectionShape } from '../convection/registry.js';
import { EngineError } from '../errors.js';
import { networkAnswer, temperaturesC } from './answer.js';
import { firstGuess, solveSteady, startFrom } from './newton.js';
import { PreparedNetwork } from './prepared.js';

/** The same network by the second correlation of each shape. */
export function withSecondCorrelations(document: NetworkDocument): NetworkDocument {
  return {
    ...document,
    links: document.links.map((link) => {
      const second =
        link.kind === 'convection'
          ? secondCorrelation(link.shape)
          : link.kind === 'channel'
            ? channelCorrelations[1]
            : undefined;
      return second ? { ...link, correlation: second.id } : link;
    }),
    grids: document.grids.map((grid) => ({
      ...grid,
      surfaces: grid.surfaces.map((surface) => {
        const second = surface.kind === 'convection' ? secondCorrelation(surface.shape as ConvectionShape) : undefined;
        return second ? { ...surface, correlation: second.id } : surface;
      }),
    })),
  };
}

/** Sets every drive of the network to a share of what its document says. */
function scaleAll(network: PreparedNetwork, share: number): void {
  const { document, sources } = network;
  document.supplies.forEach(({ currentA }, i) => (sources.supplyCurrents[i] = currentA * share));
  for (const { id, heatW, source } of document.nodes) {
    if (heatW === undefined && !source) continue;
    const n = network.numberOf(id);
    sources.givenHeat[n] = (heatW ?? 0) * share;
    if (source?.kind === 'converter') sources.outputs[n] = (source.outputW ?? 0) * share;
    else if (source) sources.ownCurrents[n] = (source.currentA ?? 0) * share;
  }
}

/** Bisections of the search for the highest drive: in a large network fewer, so that a refusal comes soon. */
const bisections = { small: 10, large: 4, largeFrom: 1000 };
const mostHalvings = 30;
/** How much less exactly the states on the way are solved. */
const onTheWay = 1e5;

/** A share of the present drives at which there still is a steady state, near the largest: halved until there is one, then bisected. */
function highestShare(network: PreparedNetwork): number {
  const holdsAt = (share: number): boolean => {
    scaleAll(network, share);
    firstGuess(network);
    try {
      solveSteady(network, onTheWay);
      return true;
    } catch (error) {
      if (error instanceof EngineError) return false;
      throw error;
    }
  };
  let fails = 1;
  let holds = 0;
  for (let i = 0; i < mostHalvings && holds === 0; i++) {
    if (holdsAt(fails / 2)) holds = fails / 2;
    else fails /= 2;
  }
  if (holds === 0) return 0;
  const steps = network.unknownCount < bisections.largeFrom ? bisections.small : bisections.large;
  for (let step = 0; step < steps; step++) {
    const share = (holds + fails) / 2;
    if (holdsAt(share)) holds = share;
    else fails = share;
  }
  return holds;
}

interface SolveOptions {
  /** The whole solution once more with each shape’s second correlation. */
  compare?: boolean;
  /** A like network to start from, as it was solved. */
  near?: PreparedNetwork | undefined;
}

/** Solves, and hands over the solved network beside its answer. */
export function solveWith(
  document: NetworkDocument,
  options: SolveOptions = {},
): { network: PreparedNetwork; answer: SolveAnswer } {
  const network = new PreparedNetwork(document);
  startFrom(network, options.near);
  let answer: SolveAnswer;
  try {
    answer = networkAnswer(network, solveSteady(network));
  } catch (error) {
    if (error instanceof EngineError && error.code === 'runaway') throw withHighestDrive(error, network);
    throw error;
  }
  if (!options.compare) return { network, answer };
  const second = new PreparedNetwork(withSecondCorrelations(document));
  startFrom(second, network);
  solveSteady(second);
  return { network, answer: { ...answer, compared: { temperaturesC: temperaturesC(second) } } };
}

/**
 * The steady state of a network document.
 *
 * @param options `compare`: the whole solution once more with each shape’s second correlation
 * @returns temperatures [°C], flows [W], film coefficients [W/(m² K)], devices, limits, heat balance and warnings
 * @throws EngineError naming the node or link: invalid document, no path to a fixed temperature, runaway, not converged
 */
export function solveNetwork(document: NetworkDocument, options: SolveOptions = {}): SolveAnswer {
  return solveWith(document, options).answer;
}

function withHighestDrive(error: EngineError, network: PreparedNetwork): EngineError {
  const share = highestShare(network);
  const message = `${error.message}; it has one up to ${(100 * share).toPrecision(3)} % of it`;
  return new EngineError(
    'runaway',
    message,
    error.errors.map((entry) => ({ ...entry, message })),
  );
}
