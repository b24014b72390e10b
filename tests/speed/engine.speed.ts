import { compileAssembly, estimateAssembly, resolveAssembly, solveNetwork } from './built.js';
import { bySlug, readDemo, readRuleSets } from '../data/files.js';
import { spreadOf } from './quantiles.js';

/** The engine alone, in this thread, on the demo lantern: one solution of its network, and one whole estimate. */
const rules = bySlug(readRuleSets(), 'plain-workshop');
const document = readDemo('stall-lantern');
const resolved = resolveAssembly(document);
const [scenario] = resolved.scenarios;
if (!scenario) throw new Error('The demo lantern has no scenario');
const { network } = compileAssembly(resolved, scenario, rules);

function timed(work: () => unknown, times: number): number[] {
  for (let i = 0; i < times / 5; i++) work();
  return Array.from({ length: times }, () => {
    const began = performance.now();
    work();
    return performance.now() - began;
  });
}

const solving = timed(() => solveNetwork(network), 500);
console.log(`demo lantern, ${String(network.nodes.length)} nodes, solve: ${spreadOf(solving, 2)}`);
const estimating = timed(() => estimateAssembly(document, rules), 50);
console.log(`demo lantern, estimate with ceilings:   ${spreadOf(estimating, 1)}`);
