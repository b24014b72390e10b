import { may } from '../../shared/roles.js';
import type { Decision, DecisionSummary } from '../../shared/schemas/decision.js';
import type { ListQuery } from '../../shared/schemas/list.js';
import type { Actor, AppContext } from '../context.js';
import { notFound } from '../errors.js';
import { mayDecide } from '../policies/independence.js';
import { containing, orderBy, pageOf } from './listing.js';
import { readSnapshot } from './snapshot.js';

interface DecisionRow {
  id: string;
  number: number;
  version: number;
  state: DecisionSummary['state'];
  assembly_id: string;
  assembly_name: string;
  revision_id: string;
  revision: number;
  statement: string;
  covers: Decision['covers'];
  outline: Pick<DecisionSummary, 'binds' | 'guardedCeiling' | 'driveUnit' | 'drive'>;
  asked_by: string;
  asked_by_name: string;
  asked_at: Date;
  decided_by: string | null;
  decided_by_name: string | null;
  decided_at: Date | null;
}

const columns = `
  d.id, d.number, d.version, d.state, d.assembly_id, a.name AS assembly_name, d.revision_id, r.number AS revision,
  d.statement, d.covers, d.outline, d.asked_by, au.name AS asked_by_name, d.asked_at,
  d.decided_by, du.name AS decided_by_name, d.decided_at`;

const from = `
  FROM decisions d
  JOIN assemblies a ON a.team_id = d.team_id AND a.id = d.assembly_id
  JOIN revisions r ON r.team_id = d.team_id AND r.id = d.revision_id
  JOIN users au ON au.id = d.asked_by
  LEFT JOIN users du ON du.id = d.decided_by
  WHERE d.team_id = $1`;

const sortColumns: Record<string, string> = {
  number: 'd.number',
  assembly: 'lower(a.name)',
  state: 'd.state',
  askedAt: 'd.asked_at',
  decidedAt: 'd.decided_at',
  guardedCeiling: `(d.outline->>'guardedCeiling')::float8`,
};

function present(row: DecisionRow): DecisionSummary {
  return {
    id: row.id,
    number: row.number,
    version: row.version,
    state: row.state,
    assembly: { id: row.assembly_id, name: row.assembly_name },
    revision: row.revision,
    statement: row.statement,
    askedBy: { id: row.asked_by, name: row.asked_by_name },
    askedAt: row.asked_at.toISOString(),
    decidedBy: row.decided_by === null ? null : { id: row.decided_by, name: row.decided_by_name ?? '' },
    decidedAt: row.decided_at?.toISOString() ?? null,
    ...row.outline,
  };
}

/** The team’s register. `search` looks at assembly, what binds, statement, people and the number. */
export async function listDecisions(
  { dataSource }: AppContext,
  actor: Actor,
  query: ListQuery & { state?: string | undefined },
): Promise<{ items: DecisionSummary[]; total: number; page: number }> {
  const order = orderBy(query.sort, sortColumns, '-number');
  const parameters: unknown[] = [actor.teamId];
  let where = from;
  if (query.state) {
    parameters.push(query.state);
    where += ` AND d.state = $${String(parameters.length)}`;
  }
  if (query.search) {
    parameters.push(containing(query.search));
    const p = `$${String(parameters.length)}`;
    where += ` AND (a.name ILIKE ${p} OR d.outline->>'binds' ILIKE ${p} OR d.statement ILIKE ${p}
      OR au.name ILIKE ${p} OR du.name ILIKE ${p} OR d.number::text ILIKE ${p})`;
  }
  const [{ count }] = await dataSource.query<[{ count: string }]>(`SELECT count(*) ${where}`, parameters);
  const rows = await dataSource.query<DecisionRow[]>(
    `SELECT ${columns} ${where} ${order}, d.number DESC ${pageOf(query)}`,
    parameters,
  );
  return { items: rows.map(present), total: Number(count), page: query.page };
}

interface EventRow {
  sequence: number;
  kind: DecisionSummary['state'];
  actor_id: string;
  actor_name: string;
  at: Date;
  reason: string;
  conditions: Decision['conditions'];
  flags_taken: { id: string; reason: string }[];
  revision: number | null;
  snapshot: string | null;
  snapshot_sha256: string | null;
}

export async function contributorIds(
  { dataSource }: Pick<AppContext, 'dataSource'>,
  teamId: string,
  revisionId: string,
): Promise<string[]> {
  const rows = await dataSource.query<{ user_id: string }[]>(
    'SELECT user_id FROM revision_contributors WHERE team_id = $1 AND revision_id = $2',
    [teamId, revisionId],
  );
  return rows.map((row) => row.user_id);
}

/** One decision with its newest snapshot and its whole history. @throws DomainError 404 */
export async function getDecision(context: AppContext, actor: Actor, id: string): Promise<Decision> {
  const { dataSource } = context;
  const [row] = await dataSource.query<DecisionRow[]>(`SELECT ${columns} ${from} AND d.id = $2`, [actor.teamId, id]);
  if (!row) throw notFound('decision');
  const events = await dataSource.query<EventRow[]>(
    `SELECT e.sequence, e.kind, e.actor_id, u.name AS actor_name, e.at, e.reason, e.conditions, e.flags_taken,
       r.number AS revision, e.snapshot, e.snapshot_sha256
     FROM decision_events e JOIN users u ON u.id = e.actor_id
     LEFT JOIN revisions r ON r.team_id = e.team_id AND r.id = e.revision_id
     WHERE e.team_id = $1 AND e.decision_id = $2 ORDER BY e.sequence`,
    [actor.teamId, id],
  );
  const asked = events.findLast((event) => event.snapshot !== null);
  const snapshot = readSnapshot(asked?.snapshot ?? 'null');
  const facts = {
    state: row.state,
    askedBy: row.asked_by,
    contributorIds: await contributorIds(context, actor.teamId, row.revision_id),
  };
  const verdict = mayDecide(actor, facts);
  return {
    ...present(row),
    covers: row.covers,
    events: events.map((event) => ({
      sequence: event.sequence,
      kind: event.kind,
      actor: { id: event.actor_id, name: event.actor_name },
      at: event.at.toISOString(),
      reason: event.reason,
      conditions: event.conditions,
      flagsTaken: event.flags_taken,
      revision: event.revision,
      snapshotSha256: event.snapshot_sha256,
    })),
    snapshot,
    snapshotSha256: asked?.snapshot_sha256 ?? '',
    redFlags: snapshot.redFlags,
    conditions: events.findLast((event) => event.kind === 'accepted-with-conditions')?.conditions ?? [],
    mayDecide: verdict.may,
    mayDecideWhy: verdict.why,
    mayWithdraw: row.state === 'asked' && (row.asked_by === actor.userId || may(actor.roles, 'administer')),
  };
}
