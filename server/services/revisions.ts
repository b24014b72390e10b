import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { assemblyDocumentSchema, type AssemblyDocument } from '../../shared/schemas/assembly.js';
import type { Revision } from '../../shared/schemas/assembly-records.js';
import type { Estimate } from '../../shared/schemas/estimate.js';
import type { Actor, AppContext } from '../context.js';
import { engineVersion } from '../engine/version.js';
import { invalid, notFound } from '../errors.js';
import { fieldErrors } from '../validation.js';
import { draftConflict, getAssembly } from './assemblies.js';
import { findRuleSet, inlineDocument } from './values.js';

/** The draft read strictly. @throws DomainError 422 with what is not finished, by field */
export function finishedDocument(document: unknown): AssemblyDocument {
  const parsed = assemblyDocumentSchema.safeParse(document, { reportInput: true });
  if (!parsed.success) throw invalid(fieldErrors(parsed.error), 'The draft is not finished');
  return parsed.data;
}

/** People who changed the assembly since the revision that was accepted last. Later edits of its draft count. */
async function contributorsSince(manager: EntityManager, teamId: string, assemblyId: string): Promise<string[]> {
  const rows = await manager.query<{ user_id: string }[]>(
    `SELECT user_id FROM assembly_contributions WHERE team_id = $1 AND assembly_id = $2 AND last_version > coalesce(
       (SELECT max(r.draft_version) FROM decisions d
        JOIN revisions r ON r.team_id = d.team_id AND r.id = d.revision_id
        WHERE d.team_id = $1 AND d.assembly_id = $2
        AND d.state IN ('accepted', 'accepted-with-conditions', 'superseded')), 0)`,
    [teamId, assemblyId],
  );
  return rows.map((row) => row.user_id);
}

/**
 * Copies the draft into the next revision. Runs inside the caller’s transaction; the draft’s row is locked by it.
 *
 * @returns null where the draft is not at the expected version any more
 */
export async function insertRevision(
  manager: EntityManager,
  actor: Actor,
  at: Date,
  input: { assemblyId: string; expectedVersion: number; note: string },
): Promise<{ id: string; number: number } | null> {
  const { assemblyId, expectedVersion, note } = input;
  const [draft] = await manager.query<{ version: number; document: unknown }[]>(
    'SELECT version, document FROM assembly_drafts WHERE team_id = $1 AND assembly_id = $2 FOR UPDATE',
    [actor.teamId, assemblyId],
  );
  if (!draft) throw notFound('assembly');
  if (draft.version !== expectedVersion) return null;
  const document = finishedDocument(draft.document);
  const id = randomUUID();
  const [{ number }] = await manager.query<[{ number: number }]>(
    'SELECT coalesce(max(number), 0) + 1 AS number FROM revisions WHERE team_id = $1 AND assembly_id = $2',
    [actor.teamId, assemblyId],
  );
  await manager.query(
    `INSERT INTO revisions (team_id, id, assembly_id, number, document, draft_version, note, engine_version, created_by, created_at)
     VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10)`,
    [
      actor.teamId,
      id,
      assemblyId,
      number,
      JSON.stringify(document),
      expectedVersion,
      note,
      engineVersion,
      actor.userId,
      at,
    ],
  );
  for (const userId of await contributorsSince(manager, actor.teamId, assemblyId)) {
    await manager.query('INSERT INTO revision_contributors (team_id, revision_id, user_id) VALUES ($1, $2, $3)', [
      actor.teamId,
      id,
      userId,
    ]);
  }
  return { id, number };
}

/** The revision that an earlier press of the same button has made. The draft’s row is locked by it. */
async function sameRevision(
  manager: EntityManager,
  actor: Actor,
  assemblyId: string,
  input: { expectedVersion: number; note: string },
): Promise<{ number: number } | undefined> {
  await manager.query('SELECT 1 FROM assembly_drafts WHERE team_id = $1 AND assembly_id = $2 FOR UPDATE', [
    actor.teamId,
    assemblyId,
  ]);
  const [row] = await manager.query<{ number: number }[]>(
    `SELECT number FROM revisions
     WHERE team_id = $1 AND assembly_id = $2 AND draft_version = $3 AND note = $4 AND created_by = $5`,
    [actor.teamId, assemblyId, input.expectedVersion, input.note, actor.userId],
  );
  return row;
}

/** Freezes the draft as the next revision, after a whole estimate has shown that it can be computed. */
export async function createRevision(
  context: AppContext,
  actor: Actor,
  assemblyId: string,
  input: { expectedVersion: number; note: string },
): Promise<Revision> {
  const { draft } = await getAssembly(context, actor, assemblyId);
  if (draft.version !== input.expectedVersion) throw await draftConflict(context, actor, assemblyId);
  const rules = await findRuleSet(context);
  await context.workers.run('estimate', {
    document: await inlineDocument(context, finishedDocument(draft.document)),
    rules,
  });
  const made = await context.dataSource.transaction(
    async (manager) =>
      (await sameRevision(manager, actor, assemblyId, input)) ??
      insertRevision(manager, actor, context.now(), { assemblyId, ...input }),
  );
  if (!made) throw await draftConflict(context, actor, assemblyId);
  return getRevision(context, actor, assemblyId, made.number);
}

export async function getRevision(
  { dataSource }: AppContext,
  actor: Actor,
  assemblyId: string,
  number: number,
): Promise<Revision> {
  const [row] = await dataSource.query<
    {
      id: string;
      note: string;
      document: unknown;
      engine_version: string;
      created_at: Date;
      created_by: string;
      name: string;
    }[]
  >(
    `SELECT r.id, r.note, r.document, r.engine_version, r.created_at, r.created_by, u.name
     FROM revisions r JOIN users u ON u.id = r.created_by
     WHERE r.team_id = $1 AND r.assembly_id = $2 AND r.number = $3`,
    [actor.teamId, assemblyId, number],
  );
  if (!row) throw notFound('revision');
  const contributors = await dataSource.query<{ id: string; name: string }[]>(
    `SELECT u.id, u.name FROM revision_contributors c JOIN users u ON u.id = c.user_id
     WHERE c.team_id = $1 AND c.revision_id = $2 ORDER BY u.name`,
    [actor.teamId, row.id],
  );
  return {
    id: row.id,
    number,
    note: row.note,
    document: assemblyDocumentSchema.parse(row.document),
    engineVersion: row.engine_version,
    createdAt: row.created_at.toISOString(),
    createdBy: { id: row.created_by, name: row.name },
    contributors,
  };
}

/** The estimate of a saved assembly: of one revision, or of the draft. */
export async function estimateSaved(
  context: AppContext,
  actor: Actor,
  assemblyId: string,
  input: { revision?: number | undefined; scenario?: string | undefined },
): Promise<Estimate> {
  const document =
    input.revision === undefined
      ? finishedDocument((await getAssembly(context, actor, assemblyId)).draft.document)
      : (await getRevision(context, actor, assemblyId, input.revision)).document;
  const rules = await findRuleSet(context);
  const inlined = await inlineDocument(context, document);
  return context.workers.run('estimate', { document: inlined, rules, scenario: input.scenario });
}
