import type * as Compile from '../../server/engine/assembly/compile.js';
import type * as Estimating from '../../server/engine/answers/estimate.js';
import type * as Newton from '../../server/engine/network/newton.js';
import type * as Plan from '../../server/engine/network/sparse/plan.js';
import type * as Prepared from '../../server/engine/network/prepared.js';
import type * as Resolve from '../../server/engine/assembly/resolve.js';
import type * as Solve from '../../server/engine/network/solve.js';

/** The engine as it ships: compiled by `npm run build:server`, not by the runner of these benchmarks, which slows closures down. */
async function built<T>(module: string): Promise<T> {
  return (await import(new URL(`../../dist/server/engine/${module}.js`, import.meta.url).href)) as T;
}

export const { estimateAssembly } = await built<typeof Estimating>('answers/estimate');
export const { compileAssembly } = await built<typeof Compile>('assembly/compile');
export const { resolveAssembly } = await built<typeof Resolve>('assembly/resolve');
export const { firstGuess, solveSteady } = await built<typeof Newton>('network/newton');
export const { PreparedNetwork } = await built<typeof Prepared>('network/prepared');
export const { solveNetwork } = await built<typeof Solve>('network/solve');
export const { forgetPlans } = await built<typeof Plan>('network/sparse/plan');
