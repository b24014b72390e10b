import type { Estimate } from '../../../shared/schemas/estimate.js';
import type { SolveAnswer } from '../../../shared/schemas/network-answers.js';
import type { NetworkDocument } from '../../../shared/schemas/network.js';
import type { NodeInfo } from '../assembly/builder.js';
import { exchanges } from './exchanges.js';

type HeatPath = Estimate['paths'][number];

/** From every node, the cooler neighbour that takes the most heat from it [W]. */
function mainOutflows(document: NetworkDocument, answer: SolveAnswer): Map<string, { to: string; flowW: number }> {
  const best = new Map<string, { to: string; flowW: number }>();
  const offer = (from: string, to: string, flowW: number) => {
    if (flowW > (best.get(from)?.flowW ?? 0)) best.set(from, { to, flowW });
  };
  for (const { from, to, flowW } of exchanges(document, answer)) {
    offer(from, to, flowW);
    offer(to, from, -flowW);
  }
  return best;
}

/**
 * The temperature steps from each part’s hottest node to the room, along the way that most of its heat takes.
 *
 * @returns one path per part; `heatW` is the heat that leaves the part’s hottest node
 */
export function heatPaths(
  parts: readonly string[],
  document: NetworkDocument,
  answer: SolveAnswer,
  nodes: readonly NodeInfo[],
): HeatPath[] {
  const outflow = mainOutflows(document, answer);
  const label = new Map(nodes.map((node) => [node.id, node.label]));
  const limitC = new Map<string, number>();
  for (const limit of document.limits) {
    if ('maxC' in limit) limitC.set(limit.node, Math.min(limit.maxC, limitC.get(limit.node) ?? Infinity));
  }
  return parts.map((part) => {
    const steps: HeatPath['steps'] = [];
    const seen = new Set<string>();
    let node: string | undefined = `part.${part}.junction`;
    const heatW = outflow.get(node)?.flowW ?? 0;
    while (node !== undefined && !seen.has(node)) {
      seen.add(node);
      const limit = limitC.get(node);
      steps.push({
        node,
        label: label.get(node) ?? node,
        temperatureC: answer.temperaturesC[node] ?? NaN,
        ...(limit === undefined ? {} : { limitC: limit }),
      });
      node = outflow.get(node)?.to;
    }
    return { part, heatW, steps };
  });
}
