import { firstGuess, PreparedNetwork, solveNetwork, solveSteady } from './built.js';
import { boardNetwork, boxNetwork } from './networks.js';
import { spreadOf } from './quantiles.js';

/** Networks alone, in this thread. Cold: from the document to all answers; warm: the drive changed by 2 %, from the last temperatures. */
function timed(work: () => unknown, times: number): number[] {
  for (let i = 0; i < times / 3 + 3; i++) work();
  return Array.from({ length: times }, () => {
    const began = performance.now();
    work();
    return performance.now() - began;
  });
}

const box = boxNetwork();
console.log(`box, ${String(box.nodes.length)} nodes, ${String(box.links.length)} links`);
console.log(
  `  cold, document to temperatures:  ${spreadOf(
    timed(() => coldTemperatures(box), 4000),
    3,
  )}`,
);
console.log(
  `  cold, document to all answers:   ${spreadOf(
    timed(() => solveNetwork(box), 4000),
    3,
  )}`,
);
console.log(`  warm:                            ${spreadOf(timed(warm(box), 4000), 3)}`);

function coldTemperatures(document: typeof box) {
  const network = new PreparedNetwork(document);
  firstGuess(network);
  solveSteady(network);
  return network;
}

function warm(document: typeof box) {
  const network = coldTemperatures(document);
  const { givenHeat } = network.sources;
  const before = Float64Array.from(givenHeat);
  let up = false;
  return () => {
    up = !up;
    for (let n = 0; n < givenHeat.length; n++) givenHeat[n] = (before[n] as number) * (up ? 1.02 : 1);
    return solveSteady(network);
  };
}

const figures: { nodes: number; ms: number }[] = [];
for (const [side, times] of [
  [10, 400],
  [22.36, 200],
  [44.73, 60],
  [100, 20],
] as const) {
  const document = boardNetwork(Math.round(side));
  const spread = timed(() => coldTemperatures(document), times);
  const heap = process.memoryUsage().heapUsed;
  const network = coldTemperatures(document);
  const grown = (process.memoryUsage().heapUsed - heap) / 2 ** 20;
  figures.push({ nodes: document.nodes.length, ms: [...spread].sort((a, b) => a - b)[times >> 1] ?? 0 });
  console.log(
    `board of ${String(document.nodes.length)} nodes, cold: ${spreadOf(spread, 2)}; heap +${grown.toFixed(0)} MB, ${String(network.matrix.fill)} entries in L and U`,
  );
}
const [small, , , large] = figures;
if (small && large) {
  const power = Math.log(large.ms / small.ms) / Math.log(large.nodes / small.nodes);
  console.log(`growth with the number of nodes: n^${power.toFixed(2)}`);
}
