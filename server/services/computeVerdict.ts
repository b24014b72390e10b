import { assemblyDocumentSchema } from '../../shared/schemas/assembly.js';
import type { Verdict } from '../../shared/schemas/estimate.js';
import type { AppContext } from '../context.js';
import { engineVersion } from '../engine/version.js';
import { DomainError } from '../errors.js';
import { findRuleSet, inlineDocument } from './values.js';

/** The verdict on a draft, or null where it cannot be computed as it stands. */
async function verdictOn(context: AppContext, typed: unknown): Promise<Verdict | null> {
  const parsed = assemblyDocumentSchema.safeParse(typed);
  if (!parsed.success) return null;
  try {
    const [rules, document] = await Promise.all([findRuleSet(context), inlineDocument(context, parsed.data)]);
    return (await context.workers.run('estimate', { document, rules })).verdict;
  } catch (error) {
    if (error instanceof DomainError && error.status === 422) return null;
    throw error;
  }
}

/** Computes the verdict on the draft as it stands and keeps it, unless the draft has moved on meanwhile. */
async function compute(context: AppContext, teamId: string, assemblyId: string): Promise<void> {
  const [draft] = await context.dataSource.query<{ version: number; document: unknown }[]>(
    `SELECT version, document FROM assembly_drafts WHERE team_id = $1 AND assembly_id = $2
     AND (verdict_version IS DISTINCT FROM version OR verdict_engine IS DISTINCT FROM $3)`,
    [teamId, assemblyId, engineVersion],
  );
  if (!draft) return;
  const verdict = await verdictOn(context, draft.document);
  await context.dataSource.query(
    `UPDATE assembly_drafts SET verdict = $4, verdict_version = $3, verdict_engine = $5
     WHERE team_id = $1 AND assembly_id = $2 AND version = $3`,
    [teamId, assemblyId, draft.version, verdict === null ? null : JSON.stringify(verdict), engineVersion],
  );
}

/** Assemblies whose verdict is being computed, and whether one more round is wanted after it. */
const running = new Map<string, { again: boolean }>();

/**
 * Brings the kept verdict of a draft up to date. Calls that come while one runs share a single further round, so that
 * somebody who types keeps no more than one thread busy.
 */
export async function refreshVerdict(context: AppContext, teamId: string, assemblyId: string): Promise<void> {
  const present = running.get(assemblyId);
  if (present) {
    present.again = true;
    return;
  }
  const own = { again: true };
  running.set(assemblyId, own);
  try {
    while (own.again) {
      own.again = false;
      await compute(context, teamId, assemblyId);
    }
  } finally {
    running.delete(assemblyId);
  }
}
