import type { CorrelationList } from '../../shared/schemas/correlation.js';
import { correlationEntries } from '../engine/convection/registry.js';
import type { AssemblyDocument } from '../../shared/schemas/assembly.js';
import type { Estimate, EstimateRequest } from '../../shared/schemas/estimate.js';
import type { CeilingAnswer, CeilingRequest } from '../../shared/schemas/network-answers.js';
import type { AppContext } from '../context.js';
import { DomainError } from '../errors.js';
import type { EngineTasks } from '../workers/engine-tasks.js';
import { findRuleSet, inlineDocument } from './values.js';

/** An estimate of a document that is nowhere saved. */
export async function estimateDocument(context: AppContext, request: EstimateRequest): Promise<Estimate> {
  const rules = await findRuleSet(context, request.ruleSet);
  const document = await inlineDocument(context, request.assembly, '/assembly');
  try {
    return await context.workers.run('estimate', { document, rules, scenario: request.scenario }, '/assembly');
  } catch (error) {
    if (error instanceof DomainError) {
      // The scenario stands beside the assembly in the request, not inside it.
      for (const entry of error.errors) if (entry.path === '/assembly/scenario') entry.path = '/scenario';
    }
    throw error;
  }
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

/** Where in a ceiling request an error of the engine stands: the engine sees further limits at the end of the document’s own. */
function placeInCeilingRequest(path: string, documentLimits: number): string {
  if (path.startsWith('/drive')) return path;
  const [, index, rest = ''] = /^\/limits\/(\d+)(.*)$/.exec(path) ?? [];
  const further = Number(index) - documentLimits;
  return further >= 0 ? `/limits/${String(further)}${rest}` : `/document${path}`;
}

/** The drive ceiling of a network document. Drive and further limits stand beside the document in the request. */
export async function networkCeiling(context: AppContext, request: CeilingRequest): Promise<CeilingAnswer> {
  try {
    return await context.workers.run('ceiling', request);
  } catch (error) {
    if (error instanceof DomainError) {
      for (const entry of error.errors) {
        entry.path = placeInCeilingRequest(entry.path, request.document.limits.length);
      }
    }
    throw error;
  }
}

/** The engine’s registry of correlations. */
export function listCorrelations(): CorrelationList {
  const items = correlationEntries();
  return { items, total: items.length };
}
