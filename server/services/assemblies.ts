import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { Assembly, AssemblySummary } from '../../shared/schemas/assembly-records.js';
import type { ListQuery } from '../../shared/schemas/list.js';
import { inBackground, type Actor, type AppContext } from '../context.js';
import { conflict, notFound } from '../errors.js';
import { canonicalJson } from '../records/canonical.js';
import {
  noteContribution,
  presentSummary,
  summaryColumns,
  summaryFrom,
  verdictIsOld,
  type SummaryRow,
} from './assemblyRows.js';
import { refreshVerdict } from './computeVerdict.js';
import { containing, orderBy, pageOf } from './listing.js';

const sortColumns: Record<string, string> = {
  name: 'lower(a.name)',
  updatedAt: 'd.updated_at',
  headroom: `(d.verdict->>'headroom')::float8`,
  margin: `(d.verdict->>'margin')::float8`,
  guardedCeiling: `(d.verdict->>'guardedCeiling')::float8`,
  decision: 'x.state',
  revision: 'r.number',
};

/** The team’s assemblies, a page at a time. Verdicts of an older engine are computed anew behind the answer. */
export async function listAssemblies(
  context: AppContext,
  actor: Actor,
  query: ListQuery & { archived?: boolean | undefined },
): Promise<{ items: AssemblySummary[]; total: number; page: number }> {
  const order = orderBy(query.sort, sortColumns, '-updatedAt');
  const parameters: unknown[] = [actor.teamId];
  let where = `${summaryFrom} AND a.archived_at IS ${query.archived ? 'NOT NULL' : 'NULL'}`;
  if (query.search) {
    parameters.push(containing(query.search));
    where += ` AND (a.name ILIKE $2 OR cu.name ILIKE $2 OR uu.name ILIKE $2 OR d.verdict->>'bindsLabel' ILIKE $2)`;
  }
  const [{ count }] = await context.dataSource.query<[{ count: string }]>(`SELECT count(*) ${where}`, parameters);
  const rows = await context.dataSource.query<SummaryRow[]>(
    `SELECT ${summaryColumns} ${where} ${order}, a.id ${pageOf(query)}`,
    parameters,
  );
  for (const row of rows.filter(verdictIsOld)) inBackground(context, refreshVerdict(context, actor.teamId, row.id));
  return { items: rows.map(presentSummary), total: Number(count), page: query.page };
}

/** @throws DomainError 404 where the team has no such assembly */
export async function getAssembly(context: AppContext, actor: Actor, id: string): Promise<Assembly> {
  const [row] = await context.dataSource.query<(SummaryRow & { draft_document: Record<string, unknown> })[]>(
    `SELECT ${summaryColumns}, d.document AS draft_document ${summaryFrom} AND a.id = $2`,
    [actor.teamId, id],
  );
  if (!row) throw notFound('assembly');
  const revisions = await context.dataSource.query<
    { id: string; number: number; note: string; created_at: Date; created_by: string; name: string }[]
  >(
    `SELECT r.id, r.number, r.note, r.created_at, r.created_by, u.name FROM revisions r JOIN users u ON u.id = r.created_by
     WHERE r.team_id = $1 AND r.assembly_id = $2 ORDER BY r.number DESC`,
    [actor.teamId, id],
  );
  return {
    ...presentSummary(row),
    draft: {
      version: row.draft_version,
      document: row.draft_document,
      updatedAt: row.updated_at.toISOString(),
      updatedBy: { id: row.updated_by, name: row.updated_by_name },
    },
    revisions: revisions.map((revision) => ({
      id: revision.id,
      number: revision.number,
      note: revision.note,
      createdAt: revision.created_at.toISOString(),
      createdBy: { id: revision.created_by, name: revision.name },
    })),
  };
}

/** What a list calls a draft: its own name as far as it has one. */
function nameOf(document: Record<string, unknown>): string {
  const { name } = document;
  return typeof name === 'string' && name.trim() !== '' ? name.trim().slice(0, 120) : 'Unnamed assembly';
}

async function insertAssembly(
  manager: EntityManager,
  actor: Actor,
  at: Date,
  values: { document: Record<string, unknown>; requestId?: string | undefined; duplicatedFrom?: string },
): Promise<string | null> {
  const id = randomUUID();
  const [inserted] = await manager.query<{ id: string }[]>(
    `INSERT INTO assemblies (team_id, id, name, created_by, created_at, archived_at, duplicated_from, request_id)
     VALUES ($1, $2, $3, $4, $5, NULL, $6, $7)
     ON CONFLICT (team_id, created_by, request_id) DO NOTHING RETURNING id`,
    [
      actor.teamId,
      id,
      nameOf(values.document),
      actor.userId,
      at,
      values.duplicatedFrom ?? null,
      values.requestId ?? null,
    ],
  );
  if (!inserted) return null;
  await manager.query(
    `INSERT INTO assembly_drafts (team_id, assembly_id, version, document, updated_by, updated_at)
     VALUES ($1, $2, 1, $3, $4, $5)`,
    [actor.teamId, id, JSON.stringify(values.document), actor.userId, at],
  );
  await noteContribution(manager, { teamId: actor.teamId, assemblyId: id, userId: actor.userId, at, version: 1 });
  return id;
}

/** Makes an assembly with its draft as typed. The same `requestId` again answers with the first one’s. */
export async function createAssembly(
  context: AppContext,
  actor: Actor,
  input: { document: Record<string, unknown>; requestId?: string | undefined },
): Promise<Assembly> {
  const made = await context.dataSource.transaction((manager) => insertAssembly(manager, actor, context.now(), input));
  if (made === null) {
    const [earlier] = await context.dataSource.query<{ id: string }[]>(
      'SELECT id FROM assemblies WHERE team_id = $1 AND created_by = $2 AND request_id = $3',
      [actor.teamId, actor.userId, input.requestId],
    );
    return getAssembly(context, actor, earlier?.id ?? '');
  }
  inBackground(context, refreshVerdict(context, actor.teamId, made));
  return getAssembly(context, actor, made);
}

/** A copy with a draft of its own. Who had a hand in the original had one in the copy. */
export async function duplicateAssembly(
  context: AppContext,
  actor: Actor,
  id: string,
  name: string,
): Promise<Assembly> {
  const original = await getAssembly(context, actor, id);
  const document = { ...original.draft.document, name };
  const at = context.now();
  const made = await context.dataSource.transaction(async (manager) => {
    const copy = await insertAssembly(manager, actor, at, { document, duplicatedFrom: id });
    await manager.query(
      `INSERT INTO assembly_contributions (team_id, assembly_id, user_id, last_edited_at, last_version)
       SELECT team_id, $3, user_id, $4, 1 FROM assembly_contributions WHERE team_id = $1 AND assembly_id = $2
       ON CONFLICT DO NOTHING`,
      [actor.teamId, id, copy, at],
    );
    return copy ?? '';
  });
  inBackground(context, refreshVerdict(context, actor.teamId, made));
  return getAssembly(context, actor, made);
}

interface DraftSave {
  expectedVersion: number;
  document: Record<string, unknown>;
}

/** Writes the draft where it is still at the expected version; null where it is not. */
async function writeDraft(context: AppContext, actor: Actor, id: string, input: DraftSave) {
  return context.dataSource.transaction(async (manager) => {
    const at = context.now();
    const [saved] = await manager.query<[{ version: number }[], number]>(
      `UPDATE assembly_drafts SET document = $4, version = version + 1, updated_by = $5, updated_at = $6
       WHERE team_id = $1 AND assembly_id = $2 AND version = $3 RETURNING version`,
      [actor.teamId, id, input.expectedVersion, JSON.stringify(input.document), actor.userId, at],
    );
    const version = saved[0]?.version;
    if (version === undefined) return null;
    await manager.query('UPDATE assemblies SET name = $3 WHERE team_id = $1 AND id = $2', [
      actor.teamId,
      id,
      nameOf(input.document),
    ]);
    await noteContribution(manager, { teamId: actor.teamId, assemblyId: id, userId: actor.userId, at, version });
    return { version, updatedAt: at.toISOString() };
  });
}

/** True where what stands is this very save, sent again since its answer was lost on the way. */
function isSameSave(draft: Assembly['draft'], actor: Actor, input: DraftSave): boolean {
  return (
    draft.version === input.expectedVersion + 1 &&
    draft.updatedBy.id === actor.userId &&
    canonicalJson(draft.document) === canonicalJson(input.document)
  );
}

/**
 * Saves the draft as typed. The same save sent again answers as the first did.
 *
 * @throws DomainError 409 with the other person’s version where it has moved since; nothing of either is lost
 */
export async function saveDraft(
  context: AppContext,
  actor: Actor,
  id: string,
  input: DraftSave,
): Promise<{ version: number; updatedAt: string }> {
  const saved = await writeDraft(context, actor, id, input);
  if (saved === null) {
    const { draft } = await getAssembly(context, actor, id);
    if (isSameSave(draft, actor, input)) return { version: draft.version, updatedAt: draft.updatedAt };
    throw draftMoved(draft, input.document);
  }
  inBackground(context, refreshVerdict(context, actor.teamId, id));
  return saved;
}

function draftMoved(draft: Assembly['draft'], yours?: Record<string, unknown>): Error {
  return conflict('draft-moved', `${draft.updatedBy.name} has saved this draft meanwhile`, {
    current: draft,
    ...(yours ? { yours } : {}),
  });
}

/** The refusal for what was asked on a draft that has moved since; what stands now is in it as `current`. */
export async function draftConflict(context: AppContext, actor: Actor, id: string): Promise<Error> {
  return draftMoved((await getAssembly(context, actor, id)).draft);
}

export async function setArchived(context: AppContext, actor: Actor, id: string, archived: boolean): Promise<Assembly> {
  await context.dataSource.query(
    'UPDATE assemblies SET archived_at = CASE WHEN $3 THEN coalesce(archived_at, $4) END WHERE team_id = $1 AND id = $2',
    [actor.teamId, id, archived, context.now()],
  );
  return getAssembly(context, actor, id);
}
