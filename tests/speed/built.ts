/** The engine as it ships: compiled by `npm run build:server`, not by the runner of these benchmarks, which slows closures down. */
async function built<T>(module: string): Promise<T> {
  return (await import(new URL(`../../dist/server/engine/${module}.js`, import.meta.url).href)) as T;
}

export const { estimateAssembly } =
  await built<typeof import('../../server/engine/answers/estimate.js')>('answers/estimate');
export const { compileAssembly } =
  await built<typeof import('../../server/engine/assembly/compile.js')>('assembly/compile');
export const { resolveAssembly } =
  await built<typeof import('../../server/engine/assembly/resolve.js')>('assembly/resolve');
export const { firstGuess, solveSteady } =
  await built<typeof import('../../server/engine/network/newton.js')>('network/newton');
export const { PreparedNetwork } =
  await built<typeof import('../../server/engine/network/prepared.js')>('network/prepared');
export const { solveNetwork } = await built<typeof import('../../server/engine/network/solve.js')>('network/solve');
export const { forgetPlans } =
  await built<typeof import('../../server/engine/network/sparse/plan.js')>('network/sparse/plan');
