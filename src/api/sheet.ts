import type { AssemblyDocument } from '../../shared/schemas/assembly.js';
import type { Assembly, draftConflictSchema } from '../../shared/schemas/assembly-records.js';
import type { Decision } from '../../shared/schemas/decision.js';
import type { Estimate } from '../../shared/schemas/estimate.js';
import type { FinishVersion, MaterialVersion, PartTypeVersion } from '../../shared/schemas/reference-lists.js';
import type { z } from 'zod';
import { ApiError, ConnectionError, messageOf, queryOf, request } from './client.js';

/** What the assembly sheet asks of the server. */

/** The version that somebody else saved meanwhile. */
export type DraftConflict = z.infer<typeof draftConflictSchema>;

export type SaveAnswer =
  | { kind: 'saved'; version: number; at: string }
  | { kind: 'conflict'; conflict: DraftConflict }
  /** Worth trying again; `message` says why it did not go. */
  | { kind: 'unreachable'; message: string }
  | { kind: 'refused'; message: string };

/** Why something could not be done, in words, with the fields that stand in the way. */
export interface Refusal {
  kind: 'refused' | 'connection';
  message: string;
  errors: { path: string; message: string }[];
}

export const fetchAssembly = (id: string) => request<Assembly>('GET', `/assemblies/${encodeURIComponent(id)}`);

export const createAssembly = (document: AssemblyDocument, requestId: string | undefined) =>
  request<Assembly>('POST', '/assemblies', { body: { document, requestId } });

export const makeRevision = (id: string, body: { expectedVersion: number; note: string }) =>
  request<unknown>('POST', `/assemblies/${encodeURIComponent(id)}/revisions`, { body });

export const requestEstimate = (assembly: AssemblyDocument, scenario: string | undefined, signal: AbortSignal) =>
  request<Estimate>('POST', '/estimates', { body: { assembly, scenario }, signal });

export interface DecisionRequest {
  assemblyId: string;
  expectedVersion: number;
  statement: string;
  covers: { product: string; variant: string; file: string; fileSha256: string };
  decisionId?: string;
  requestId?: string;
}

export const askDecision = (body: DecisionRequest) => request<Decision>('POST', '/decisions', { body });

/** Tables are far below the largest page. */
const wholeTable = queryOf({ pageSize: 500 });

async function fetchTable<T>(path: string): Promise<T[]> {
  return (await request<{ items: T[] }>('GET', `${path}${wholeTable}`)).items;
}

export const fetchMaterials = () => fetchTable<MaterialVersion>('/materials');
export const fetchFinishes = () => fetchTable<FinishVersion>('/finishes');
export const fetchPartTypes = () => fetchTable<PartTypeVersion>('/parts');

/** Statuses that pass by themselves: a proxy or the database is away, or there was too much at once. */
function passes(status: number): boolean {
  return status === 401 || status === 429 || status >= 500;
}

/** Saves a draft; every outcome that a person meets is an answer, none is thrown. */
export async function saveDraft(
  id: string,
  document: Record<string, unknown>,
  expectedVersion: number,
): Promise<SaveAnswer> {
  try {
    const saved = await request<{ version: number; updatedAt: string }>(
      'PUT',
      `/assemblies/${encodeURIComponent(id)}/draft`,
      { body: { expectedVersion, document } },
    );
    return { kind: 'saved', version: saved.version, at: saved.updatedAt };
  } catch (error) {
    if (error instanceof ConnectionError) return { kind: 'unreachable', message: 'no connection' };
    if (!(error instanceof ApiError)) throw error;
    if (error.status === 409 && typeof error.problem.current === 'object' && error.problem.current !== null) {
      return { kind: 'conflict', conflict: error.problem.current as DraftConflict };
    }
    if (!passes(error.status)) return { kind: 'refused', message: error.message };
    return { kind: 'unreachable', message: error.status === 401 ? 'signed out' : 'the server cannot save just now' };
  }
}

/** What was thrown, in words; pointers lead into the assembly document. */
export function explainError(error: unknown): Refusal {
  if (error instanceof ApiError && !(passes(error.status) && error.status !== 401)) {
    const errors = error.problem.errors.map(({ path, message }) => ({
      path: path.replace(/^\/assembly/, ''),
      message,
    }));
    return { kind: 'refused', message: errors[0]?.message ?? error.message, errors };
  }
  return { kind: 'connection', message: messageOf(error), errors: [] };
}

export const isNotFound = (error: unknown) => error instanceof ApiError && error.status === 404;
