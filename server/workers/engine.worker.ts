import { findCeiling } from '../engine/answers/ceiling.js';
import { estimateAssembly } from '../engine/answers/estimate.js';
import { compileAssembly } from '../engine/assembly/compile.js';
import { resolveAssembly } from '../engine/assembly/resolve.js';
import { EngineError } from '../engine/errors.js';
import { solveNetwork } from '../engine/network/solve.js';
import type { EngineTaskName, EngineTasks, TaskAnswer } from './engine-tasks.js';

type Handlers = { [K in EngineTaskName]: (input: EngineTasks[K]['input']) => EngineTasks[K]['output'] };

const handlers: Handlers = {
  solve: ({ document, compare }) => solveNetwork(document, { compare }),
  ceiling: ({ document, drive, limits }) => findCeiling(document, drive, { limits }),
  estimate: ({ document, rules, scenario }) => estimateAssembly(document, rules, { scenario }),
  estimateAll: ({ document, rules }) =>
    document.scenarios.map(({ id }) => estimateAssembly(document, rules, { scenario: id })),
  compile: ({ document, rules }) => {
    const resolved = resolveAssembly(document);
    const compiled = resolved.scenarios.map((scenario) => ({
      scenario: scenario.id,
      ...compileAssembly(resolved, scenario, rules),
    }));
    return {
      networks: compiled.map(({ scenario, network }) => ({ scenario, network })),
      warnings: compiled[0]?.warnings ?? [],
    };
  },
};

/** Runs one task; what the engine refuses comes back as data. */
export default function runTask<K extends EngineTaskName>(task: {
  name: K;
  input: EngineTasks[K]['input'];
}): TaskAnswer<EngineTasks[K]['output']> {
  try {
    return { ok: true, value: handlers[task.name](task.input) };
  } catch (error) {
    if (!(error instanceof EngineError)) throw error;
    return { ok: false, error: { code: error.code, message: error.message, errors: error.errors } };
  }
}
