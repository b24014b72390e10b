import { EngineError } from '../errors.js';
import type { PreparedNetwork } from './prepared.js';

/** No steady state is accepted above this [K]: the laws end there. */
export const hottest = 1500;
/** Lowest temperature that an iteration may visit [K]. */
export const coldest = 20;

function unknownNodes(network: PreparedNetwork) {
  return network.document.nodes.flatMap((node) => {
    if (node.fixedC !== undefined) return [];
    const n = network.numberOf(node.id);
    return [
      {
        id: node.id,
        t: network.temperatures[n] as number,
        heat: network.sources.heat[n] as number,
        source: node.source !== undefined,
      },
    ];
  });
}

/** What runs away: of the nodes with a source the hottest, else the hottest of all; a cooler that nothing can feed is named as such. */
export function runaway(network: PreparedNetwork): EngineError {
  const nodes = unknownNodes(network);
  const coldestNode = nodes.reduce((a, b) => (b.t < a.t ? b : a));
  const sink = nodes.reduce((a, b) => (b.heat < a.heat ? b : a));
  const cooled = coldestNode.t <= coldest * 1.001 && sink.heat < 0;
  const heated = nodes.some(({ source }) => source) ? nodes.filter(({ source }) => source) : nodes;
  const node = cooled ? sink.id : heated.reduce((a, b) => (b.t > a.t || Number.isNaN(b.t) ? b : a)).id;
  const message = cooled
    ? `“${node}” takes away more heat than can reach it above 0 K`
    : `“${node}” runs away: there is no steady state below ${String(hottest)} K at this drive`;
  const i = network.document.nodes.findIndex(({ id }) => id === node);
  return new EngineError(cooled ? 'outside-range' : 'runaway', message, [
    { path: `/nodes/${String(i)}`, message, node },
  ]);
}

/** @throws EngineError `runaway` where a solved temperature lies above the hottest accepted */
export function refuseTooHot(network: PreparedNetwork): void {
  for (let i = 0; i < network.unknownCount; i++) {
    if (!((network.temperatures[i] as number) < hottest)) throw runaway(network);
  }
}
