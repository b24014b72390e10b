import type { AssemblyDocument } from '../../shared/schemas/assembly.js';
import type { Estimate, EstimateRequest } from '../../shared/schemas/estimate.js';
import type { AppContext } from '../context.js';
import type { EngineTasks } from '../workers/engine-tasks.js';
import { findRuleSet, inlineDocument } from './values.js';

/** An estimate of a document that is nowhere saved. */
export async function estimateDocument(context: AppContext, request: EstimateRequest): Promise<Estimate> {
  const rules = await findRuleSet(context, request.ruleSet);
  const document = await inlineDocument(context, request.assembly, '/assembly');
  try {
    return await context.workers.run('estimate', { document, rules, scenario: request.scenario }, '/assembly');
  } catch (error) {
    throw withScenarioPath(error);
  }
}

/** The scenario stands beside the assembly in the request, not inside it. */
function withScenarioPath(error: unknown): unknown {
  if (error instanceof Error && 'errors' in error && Array.isArray(error.errors)) {
    for (const entry of error.errors as { path: string }[]) {
      if (entry.path === '/assembly/scenario') entry.path = '/scenario';
    }
  }
  return error;
}

/** The networks of a document, one per scenario. */
export async function compileDocument(
  context: AppContext,
  assembly: AssemblyDocument,
): Promise<EngineTasks['compile']['output']> {
  const rules = await findRuleSet(context);
  const document = await inlineDocument(context, assembly);
  return context.workers.run('compile', { document, rules });
}
