import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { z } from 'zod';
import type { askDecisionSchema, Decision } from '../../shared/schemas/decision.js';
import type { Actor, AppContext } from '../context.js';
import { conflict, notFound } from '../errors.js';
import { draftConflict, getAssembly } from './assemblies.js';
import { addEvent, lockTeamRecord } from './decisionEvents.js';
import { getDecision } from './decisionReading.js';
import { finishedDocument, insertRevision } from './revisions.js';
import { freeze, type Frozen } from './snapshot.js';

type Ask = z.infer<typeof askDecisionSchema>;

async function earlierAsk({ dataSource }: AppContext, actor: Actor, requestId: string | undefined) {
  if (requestId === undefined) return undefined;
  const [row] = await dataSource.query<{ id: string }[]>(
    'SELECT id FROM decisions WHERE team_id = $1 AND asked_by = $2 AND request_id = $3',
    [actor.teamId, actor.userId, requestId],
  );
  return row?.id;
}

/** Puts a returned request up again with a new snapshot, or adds a decision under the team’s next number. */
async function record(
  manager: EntityManager,
  actor: Actor,
  at: Date,
  ask: Ask,
  revisionId: string,
  frozen: Frozen,
  kind: 'asked' | 'self-checked',
): Promise<string> {
  const shared = [
    revisionId,
    ask.statement,
    JSON.stringify(ask.covers),
    JSON.stringify(frozen.outline),
    actor.userId,
    at,
  ];
  let id = ask.decisionId;
  if (id === undefined) {
    id = randomUUID();
    await manager.query(
      `INSERT INTO decisions (team_id, id, number, version, state, assembly_id, revision_id, statement, covers, outline,
         asked_by, asked_at, decided_by, decided_at, request_id)
       SELECT $1, $2, coalesce(max(number), 0) + 1, 1, $3, $4, $5, $6, $7, $8, $9, $10, NULL, NULL, $11
       FROM decisions WHERE team_id = $1`,
      [actor.teamId, id, kind, ask.assemblyId, ...shared, ask.requestId ?? null],
    );
  } else {
    const [, changed] = await manager.query<[unknown, number]>(
      `UPDATE decisions SET state = 'asked', version = version + 1, revision_id = $4, statement = $5, covers = $6,
         outline = $7, asked_by = $8, asked_at = $9, decided_by = NULL, decided_at = NULL, request_id = $10
       WHERE team_id = $1 AND id = $2 AND assembly_id = $3 AND state = 'returned'`,
      [actor.teamId, id, ask.assemblyId, ...shared, ask.requestId ?? null],
    );
    if (changed === 0) throw conflict('not-returned', 'Only a request that was returned can be asked again');
  }
  await addEvent(manager, {
    teamId: actor.teamId,
    decisionId: id,
    kind,
    actorId: actor.userId,
    at,
    reason: ask.statement,
    revisionId,
    snapshot: frozen,
  });
  return id;
}

async function refuseSecondRequest(manager: EntityManager, actor: Actor, ask: Ask): Promise<void> {
  const [waiting] = await manager.query<{ number: number }[]>(
    `SELECT number FROM decisions WHERE team_id = $1 AND assembly_id = $2 AND state = 'asked'`,
    [actor.teamId, ask.assemblyId],
  );
  if (waiting) {
    throw conflict('already-asked', `Decision ${String(waiting.number)} on this assembly already waits for a reviewer`);
  }
}

async function askAs(context: AppContext, actor: Actor, ask: Ask, kind: 'asked' | 'self-checked'): Promise<Decision> {
  const earlier = await earlierAsk(context, actor, ask.requestId);
  if (earlier !== undefined) return getDecision(context, actor, earlier);
  const { draft } = await getAssembly(context, actor, ask.assemblyId);
  if (draft.version !== ask.expectedVersion) throw await draftConflict(context, actor, ask.assemblyId);
  if (ask.decisionId !== undefined) await getDecision(context, actor, ask.decisionId);
  // The estimates take their time, so they are made before the transaction; it then checks that the draft has not moved.
  const frozen = await freeze(context, finishedDocument(draft.document), ask.covers);
  const at = context.now();
  const id = await context.dataSource.transaction(async (manager) => {
    await lockTeamRecord(manager, actor.teamId);
    // A second press that came while the first was computing.
    const repeated = await manager.query<{ id: string }[]>(
      'SELECT id FROM decisions WHERE team_id = $1 AND asked_by = $2 AND request_id = $3',
      [actor.teamId, actor.userId, ask.requestId ?? null],
    );
    if (repeated[0]) return repeated[0].id;
    if (kind === 'asked') await refuseSecondRequest(manager, actor, ask);
    const revision = await insertRevision(manager, actor, at, {
      assemblyId: ask.assemblyId,
      expectedVersion: ask.expectedVersion,
      note: ask.statement.slice(0, 4000),
    });
    return revision === null ? null : record(manager, actor, at, ask, revision.id, frozen, kind);
  });
  if (id === null) throw await draftConflict(context, actor, ask.assemblyId);
  return getDecision(context, actor, id);
}

/** Asks for a decision: makes a revision of the draft and freezes its snapshot. */
export async function askForDecision(context: AppContext, actor: Actor, ask: Ask): Promise<Decision> {
  return askAs(context, actor, ask, 'asked');
}

/** A team of one records that it checked for itself. This is never an accepted decision. */
export async function selfCheck(context: AppContext, actor: Actor, ask: Ask): Promise<Decision> {
  const [{ count }] = await context.dataSource.query<[{ count: string }]>(
    'SELECT count(*) FROM memberships WHERE team_id = $1',
    [actor.teamId],
  );
  if (Number(count) !== 1) throw conflict('not-alone', 'Only a team of one checks for itself: ask a reviewer');
  if (ask.decisionId !== undefined) throw notFound('decision');
  return askAs(context, actor, ask, 'self-checked');
}
