import type { EntityManager } from 'typeorm';
import type { DecisionState } from '../../shared/schemas/assembly-records.js';

export interface NewEvent {
  teamId: string;
  decisionId: string;
  kind: DecisionState;
  actorId: string;
  at: Date;
  reason: string;
  conditions?: unknown[];
  flagsTaken?: unknown[];
  revisionId?: string;
  snapshot?: { text: string; sha256: string };
}

/** Serialises everything that numbers a team’s decisions and events: held to the end of the transaction. */
export async function lockTeamRecord(manager: EntityManager, teamId: string): Promise<void> {
  await manager.query('SELECT pg_advisory_xact_lock(hashtextextended($1, 4310))', [teamId]);
}

/** Adds the team’s next event. The caller holds the team’s record lock. */
export async function addEvent(manager: EntityManager, event: NewEvent): Promise<void> {
  await manager.query(
    `INSERT INTO decision_events
       (team_id, sequence, decision_id, kind, actor_id, at, reason, conditions, flags_taken, revision_id, snapshot, snapshot_sha256)
     SELECT $1, coalesce(max(sequence), 0) + 1, $2, $3, $4, $5, $6, $7, $8, $9, $10, $11 FROM decision_events WHERE team_id = $1`,
    [
      event.teamId,
      event.decisionId,
      event.kind,
      event.actorId,
      event.at,
      event.reason,
      JSON.stringify(event.conditions ?? []),
      JSON.stringify(event.flagsTaken ?? []),
      event.revisionId ?? null,
      event.snapshot?.text ?? null,
      event.snapshot?.sha256 ?? null,
    ],
  );
}
