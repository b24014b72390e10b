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

/** Computes the verdict on one version of a draft and keeps it, unless the draft has moved on. */
export async function refreshVerdict(
  context: AppContext,
  draft: { teamId: string; assemblyId: string; version: number; document: unknown },
): Promise<void> {
  const verdict = await verdictOn(context, draft.document);
  await context.dataSource.query(
    `UPDATE assembly_drafts SET verdict = $4, verdict_version = $3, verdict_engine = $5
     WHERE team_id = $1 AND assembly_id = $2 AND version = $3`,
    [draft.teamId, draft.assemblyId, draft.version, verdict === null ? null : JSON.stringify(verdict), engineVersion],
  );
}
