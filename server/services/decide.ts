import type { EntityManager } from 'typeorm';
import type { z } from 'zod';
import type { Decision, decideSchema, withdrawSchema } from '../../shared/schemas/decision.js';
import { may } from '../../shared/roles.js';
import type { Actor, AppContext } from '../context.js';
import { conflict, forbidden, invalid, notFound } from '../errors.js';
import { addEvent, lockTeamRecord } from './decisionEvents.js';
import { getDecision } from './decisionReading.js';
import { confirmPassword } from './sessions.js';

type Decide = z.infer<typeof decideSchema>;

interface LockedDecision {
  version: number;
  state: string;
  assembly_id: string;
  revision_id: string;
  asked_by: string;
  decided_by_name: string | null;
}

async function lock(manager: EntityManager, actor: Actor, id: string): Promise<LockedDecision> {
  await lockTeamRecord(manager, actor.teamId);
  const [row] = await manager.query<LockedDecision[]>(
    `SELECT d.version, d.state, d.assembly_id, d.revision_id, d.asked_by, u.name AS decided_by_name
     FROM decisions d LEFT JOIN users u ON u.id = d.decided_by
     WHERE d.team_id = $1 AND d.id = $2 FOR UPDATE OF d`,
    [actor.teamId, id],
  );
  if (!row) throw notFound('decision');
  return row;
}

/** Tells the one who came second what has happened meanwhile. */
function refuseStale(
  row: Pick<LockedDecision, 'state' | 'version' | 'decided_by_name'>,
  expectedVersion: number,
): void {
  if (row.state === 'asked' && row.version === expectedVersion) return;
  const who = row.decided_by_name === null ? '' : ` by ${row.decided_by_name}`;
  const message =
    row.state === 'asked'
      ? 'This request was asked anew meanwhile: read it again'
      : `This decision is ${row.state.replaceAll('-', ' ')} already${who}`;
  throw conflict('decided-meanwhile', message, { state: row.state, version: row.version });
}

function refuseOpenFlags(decision: Decision, input: Decide): void {
  const taken = new Set(input.flagsTaken.map(({ id }) => id));
  const open = decision.redFlags.filter(({ id }) => !taken.has(id));
  if (open.length === 0) return;
  throw invalid(
    open.map(({ id, words }) => ({
      path: `/flagsTaken/${id.replaceAll('~', '~0').replaceAll('/', '~1')}`,
      message: `Tick and give a reason: ${words}`,
    })),
    'Every red flag must be ticked with a reason before this can be accepted',
  );
}

/** What is said must speak of things that the snapshot has. */
function refuseUnknown(decision: Decision, input: Decide): void {
  const flags = new Set(decision.redFlags.map(({ id }) => id));
  const scenarios = new Set(decision.snapshot.estimates.map(({ scenario }) => scenario));
  const errors = [
    ...input.flagsTaken.flatMap(({ id }, i) =>
      flags.has(id) ? [] : [{ path: `/flagsTaken/${String(i)}/id`, message: 'There is no such red flag here' }],
    ),
    ...input.conditions.flatMap(({ scenario }, i) =>
      scenario === undefined || scenarios.has(scenario)
        ? []
        : [{ path: `/conditions/${String(i)}/scenario`, message: 'There is no such scenario in what was asked' }],
    ),
  ];
  if (errors.length > 0) throw invalid(errors);
}

/** An accepted revision takes the place of the assembly’s earlier accepted ones. */
async function supersedeEarlier(
  manager: EntityManager,
  actor: Actor,
  id: string,
  assemblyId: string,
  at: Date,
): Promise<void> {
  const earlier = await manager.query<{ id: string }[]>(
    `SELECT id FROM decisions WHERE team_id = $1 AND assembly_id = $2 AND id <> $3
       AND state IN ('accepted', 'accepted-with-conditions') ORDER BY number`,
    [actor.teamId, assemblyId, id],
  );
  for (const old of earlier) {
    await manager.query(
      `UPDATE decisions SET state = 'superseded', version = version + 1 WHERE team_id = $1 AND id = $2`,
      [actor.teamId, old.id],
    );
    await addEvent(manager, {
      teamId: actor.teamId,
      decisionId: old.id,
      kind: 'superseded',
      actorId: actor.userId,
      at,
      reason: 'A newer revision was accepted',
    });
  }
}

/**
 * Records a reviewer’s outcome. Accepting needs every red flag ticked and the password again.
 *
 * @throws DomainError 403 where the reviewer is not independent, 409 where somebody was faster, 422 beside the field
 */
export async function decide(context: AppContext, actor: Actor, id: string, input: Decide): Promise<Decision> {
  const decision = await getDecision(context, actor, id);
  refuseStale({ ...decision, decided_by_name: decision.decidedBy?.name ?? null }, input.expectedVersion);
  if (!decision.mayDecide) throw forbidden(decision.mayDecideWhy, 'not-independent');
  refuseUnknown(decision, input);
  const accepts = input.outcome === 'accepted' || input.outcome === 'accepted-with-conditions';
  if (accepts) {
    refuseOpenFlags(decision, input);
    await confirmPassword(context, actor, input.password ?? '', '/password');
  }
  const at = context.now();
  await context.dataSource.transaction(async (manager) => {
    const row = await lock(manager, actor, id);
    refuseStale(row, input.expectedVersion);
    await manager.query(
      `UPDATE decisions SET state = $3, version = version + 1, decided_by = $4, decided_at = $5 WHERE team_id = $1 AND id = $2`,
      [actor.teamId, id, input.outcome, actor.userId, at],
    );
    await addEvent(manager, {
      teamId: actor.teamId,
      decisionId: id,
      kind: input.outcome,
      actorId: actor.userId,
      at,
      reason: input.reason,
      conditions: input.conditions,
      flagsTaken: input.flagsTaken,
    });
    if (accepts) await supersedeEarlier(manager, actor, id, row.assembly_id, at);
  });
  return getDecision(context, actor, id);
}

/** Takes a waiting request back: its asker or an administrator. */
export async function withdraw(
  context: AppContext,
  actor: Actor,
  id: string,
  input: z.infer<typeof withdrawSchema>,
): Promise<Decision> {
  const at = context.now();
  await context.dataSource.transaction(async (manager) => {
    const row = await lock(manager, actor, id);
    if (row.asked_by !== actor.userId && !may(actor.roles, 'administer')) {
      throw forbidden('Only who asked, or an administrator, may withdraw this', 'role-missing');
    }
    refuseStale(row, input.expectedVersion);
    await manager.query(
      `UPDATE decisions SET state = 'withdrawn', version = version + 1 WHERE team_id = $1 AND id = $2`,
      [actor.teamId, id],
    );
    await addEvent(manager, {
      teamId: actor.teamId,
      decisionId: id,
      kind: 'withdrawn',
      actorId: actor.userId,
      at,
      reason: input.reason,
    });
  });
  return getDecision(context, actor, id);
}
