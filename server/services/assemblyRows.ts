import type { EntityManager } from 'typeorm';
import type { AssemblySummary } from '../../shared/schemas/assembly-records.js';
import { engineVersion } from '../engine/version.js';

/** A row of `summarySelect`. */
export interface SummaryRow {
  id: string;
  name: string;
  archived_at: Date | null;
  created_by: string;
  created_by_name: string;
  draft_version: number;
  updated_at: Date;
  updated_by: string;
  updated_by_name: string;
  verdict: AssemblySummary['verdict'];
  verdict_version: number | null;
  verdict_engine: string | null;
  revision: number | null;
  revision_draft_version: number | null;
  decision_id: string | null;
  decision_number: number | null;
  decision_state: string | null;
  decision_revision: number | null;
}

/** Every assembly of team $1 with its draft, newest revision and newest decision. */
export const summaryFrom = `
  FROM assemblies a
  JOIN assembly_drafts d ON d.team_id = a.team_id AND d.assembly_id = a.id
  JOIN users cu ON cu.id = a.created_by
  JOIN users uu ON uu.id = d.updated_by
  LEFT JOIN LATERAL (
    SELECT number, draft_version FROM revisions
    WHERE team_id = a.team_id AND assembly_id = a.id ORDER BY number DESC LIMIT 1
  ) r ON true
  LEFT JOIN LATERAL (
    SELECT x.id, x.number, x.state, xr.number AS revision FROM decisions x
    JOIN revisions xr ON xr.team_id = x.team_id AND xr.id = x.revision_id
    WHERE x.team_id = a.team_id AND x.assembly_id = a.id ORDER BY x.number DESC LIMIT 1
  ) x ON true
  WHERE a.team_id = $1`;

export const summaryColumns = `
  a.id, a.name, a.archived_at, a.created_by, cu.name AS created_by_name,
  d.version AS draft_version, d.updated_at, d.updated_by, uu.name AS updated_by_name,
  d.verdict, d.verdict_version, d.verdict_engine,
  r.number AS revision, r.draft_version AS revision_draft_version,
  x.id AS decision_id, x.number AS decision_number, x.state AS decision_state, x.revision AS decision_revision`;

/** True while the kept verdict is not on this draft by this engine. */
export function verdictIsOld(row: SummaryRow): boolean {
  return row.verdict_version !== row.draft_version || row.verdict_engine !== engineVersion;
}

export function presentSummary(row: SummaryRow): AssemblySummary {
  return {
    id: row.id,
    name: row.name,
    revision: row.revision,
    verdict: row.verdict,
    decision:
      row.decision_id === null
        ? null
        : {
            id: row.decision_id,
            number: row.decision_number ?? 0,
            state: row.decision_state as NonNullable<AssemblySummary['decision']>['state'],
            revision: row.decision_revision ?? 0,
          },
    draftAhead: row.revision === null || row.revision_draft_version !== row.draft_version,
    archived: row.archived_at !== null,
    createdBy: { id: row.created_by, name: row.created_by_name },
    updatedBy: { id: row.updated_by, name: row.updated_by_name },
    updatedAt: row.updated_at.toISOString(),
  };
}

/** Remembers that a person changed an assembly: he or she is not independent of it any more. */
export async function noteContribution(
  manager: EntityManager,
  entry: { teamId: string; assemblyId: string; userId: string; at: Date; version: number },
): Promise<void> {
  await manager.query(
    `INSERT INTO assembly_contributions (team_id, assembly_id, user_id, last_edited_at, last_version)
     VALUES ($1, $2, $3, $4, $5) ON CONFLICT (team_id, assembly_id, user_id)
     DO UPDATE SET last_edited_at = EXCLUDED.last_edited_at, last_version = EXCLUDED.last_version`,
    [entry.teamId, entry.assemblyId, entry.userId, entry.at, entry.version],
  );
}
