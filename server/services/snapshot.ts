import type { AssemblyDocument } from '../../shared/schemas/assembly.js';
import { type coversSchema, snapshotSchema } from '../../shared/schemas/decision.js';
import type { Estimate, Verdict } from '../../shared/schemas/estimate.js';
import type { z } from 'zod';
import type { AppContext } from '../context.js';
import { engineVersion } from '../engine/version.js';
import { canonicalJson, rounded, sha256 } from '../records/canonical.js';
import { redFlags } from './redFlags.js';
import { findRuleSet, inlineDocument } from './values.js';

export interface Frozen {
  text: string;
  sha256: string;
  outline: Pick<Verdict, 'guardedCeiling' | 'driveUnit' | 'drive'> & { binds: string };
}

/** The scenario that speaks for a snapshot: the must-hold one with least headroom. */
function worst(estimates: readonly Estimate[]): Estimate | undefined {
  const must = estimates.filter(({ scenario, scenarios }) =>
    scenarios.some((s) => s.scenario === scenario && s.mustHold),
  );
  const order = (estimate: Estimate) => estimate.verdict.headroom ?? Infinity;
  return [...(must.length > 0 ? must : estimates)].sort((a, b) => order(a) - order(b))[0];
}

/**
 * Everything that a decision rests on, frozen: the document with its values in place, rule set, every scenario’s estimate, red
 * flags; as canonical JSON with its hash.
 */
export async function freeze(
  context: AppContext,
  document: AssemblyDocument,
  covers: z.infer<typeof coversSchema>,
): Promise<Frozen> {
  const rules = await findRuleSet(context);
  const inlined = await inlineDocument(context, document);
  const estimates = await context.workers.run('estimateAll', { document: inlined, rules });
  const snapshot = {
    format: 'trimwick-snapshot/1',
    assembly: inlined,
    ruleSet: rules,
    covers,
    engineVersion,
    estimates,
    redFlags: redFlags(estimates, { document: inlined, rules }),
  };
  // Numbers are rounded once, here, and never computed again for the hash.
  const text = canonicalJson(rounded(snapshot));
  const speaking = worst(estimates)?.verdict;
  return {
    text,
    sha256: sha256(text),
    outline: {
      binds: speaking?.bindsLabel ?? 'no limit',
      guardedCeiling: speaking?.guardedCeiling ?? null,
      driveUnit: speaking?.driveUnit ?? 'A',
      drive: speaking?.drive ?? 0,
    },
  };
}

export function readSnapshot(text: string): z.infer<typeof snapshotSchema> {
  return snapshotSchema.parse(JSON.parse(text));
}
