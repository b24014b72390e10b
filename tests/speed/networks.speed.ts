import type { NetworkDocument } from '../../shared/schemas/network.js';
import { firstGuess, forgetPlans, PreparedNetwork, solveNetwork, solveSteady } from './built.js';
import { boardNetwork, boxNetwork } from './networks.js';
import { spreadOf } from './quantiles.js';

/**
 * Networks alone, in this thread. Cold: from the document, its order of elimination included; known: the same where the structure has been
 * met before; warm: the drive changed by 2 %, from the last temperatures.
 */
function timed(work: () => unknown, times: number): number[] {
  for (let i = 0; i < times / 3 + 3; i++) work();
  return Array.from({ length: times }, () => {
    const began = performance.now();
    work();
    return performance.now() - began;
  });
}

function known(document: NetworkDocument) {
  const network = new PreparedNetwork(document);
  firstGuess(network);
  solveSteady(network);
  return network;
}

function cold(document: NetworkDocument) {
  forgetPlans();
  return known(document);
}

function warm(document: NetworkDocument) {
  const network = known(document);
  const { givenHeat } = network.sources;
  const before = Float64Array.from(givenHeat);
  let up = false;
  return () => {
    up = !up;
    for (let n = 0; n < givenHeat.length; n++) givenHeat[n] = (before[n] as number) * (up ? 1.02 : 1);
    return solveSteady(network);
  };
}

const box = boxNetwork();
console.log(`box, ${String(box.nodes.length)} nodes, ${String(box.links.length)} links`);
for (const [label, work] of [
  ['cold, to temperatures', () => cold(box)],
  ['known, to temperatures', () => known(box)],
  ['known, to all answers', () => solveNetwork(box)],
  ['warm', warm(box)],
] as const) {
  console.log(`  ${label.padEnd(24)} ${spreadOf(timed(work, 4000), 3)}`);
}

const figures: { nodes: number; ms: number }[] = [];
for (const [side, times] of [
  [10, 400],
  [22, 200],
  [45, 60],
  [100, 20],
] as const) {
  const document = boardNetwork(side);
  const spread = timed(() => cold(document), times);
  const heap = process.memoryUsage().heapUsed;
  const network = cold(document);
  const grown = (process.memoryUsage().heapUsed - heap) / 2 ** 20;
  figures.push({ nodes: document.nodes.length, ms: [...spread].sort((a, b) => a - b)[times >> 1] ?? 0 });
  const size = `board of ${String(document.nodes.length)} nodes, cold`.padEnd(30);
  const extra = `heap +${Math.max(grown, 0).toFixed(0)} MB, ${String(network.matrix.fill)} entries in L and U`;
  console.log(`${size} ${spreadOf(spread, 2)}; ${extra}`);
}
const [, small, , large] = figures;
if (small && large) {
  const power = Math.log(large.ms / small.ms) / Math.log(large.nodes / small.nodes);
  console.log(`growth from ${String(small.nodes)} nodes: n^${power.toFixed(2)}`);
}
