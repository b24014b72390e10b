import { z } from 'zod';
import {
  assemblyListSchema,
  assemblySchema,
  createAssemblySchema,
  createRevisionSchema,
  duplicateAssemblySchema,
  revisionSchema,
  savedEstimateRequestSchema,
  saveDraftSchema,
} from '../../shared/schemas/assembly-records.js';
import { estimateSchema } from '../../shared/schemas/estimate.js';
import { listQuerySchema } from '../../shared/schemas/list.js';
import {
  createAssembly,
  duplicateAssembly,
  getAssembly,
  listAssemblies,
  saveDraft,
  setArchived,
} from '../services/assemblies.js';
import { createRevision, estimateSaved, getRevision } from '../services/revisions.js';
import { defineRoute } from './define.js';

const tag = 'Assemblies';
const idSchema = z.object({ id: z.uuid() });
const archivedSchema = z.enum(['true', 'false']).default('false');

export const assemblyRoutes = [
  defineRoute({
    method: 'get',
    path: '/assemblies',
    tag,
    summary: 'The team’s assemblies; `archived=true` for those put away',
    access: 'read',
    query: listQuerySchema.extend({ archived: archivedSchema }),
    answers: { status: 200, schema: assemblyListSchema },
    handle: ({ context, actor, input }) =>
      listAssemblies(context, actor, { ...input.query, archived: input.query.archived === 'true' }),
  }),
  defineRoute({
    method: 'post',
    path: '/assemblies',
    tag,
    summary: 'Make an assembly; its draft is kept as typed',
    access: 'editAssemblies',
    body: createAssemblySchema,
    answers: { status: 201, schema: assemblySchema },
    handle: ({ context, actor, input }) => createAssembly(context, actor, input.body),
  }),
  defineRoute({
    method: 'get',
    path: '/assemblies/:id',
    tag,
    summary: 'One assembly with its draft and revisions',
    access: 'read',
    params: idSchema,
    answers: { status: 200, schema: assemblySchema },
    handle: ({ context, actor, input }) => getAssembly(context, actor, input.params.id),
  }),
  defineRoute({
    method: 'put',
    path: '/assemblies/:id/draft',
    tag,
    summary: 'Save the draft; 409 with both versions where it has moved',
    access: 'editAssemblies',
    params: idSchema,
    body: saveDraftSchema,
    answers: { status: 200, schema: z.object({ version: z.number().int(), updatedAt: z.iso.datetime() }) },
    handle: ({ context, actor, input }) => saveDraft(context, actor, input.params.id, input.body),
  }),
  defineRoute({
    method: 'post',
    path: '/assemblies/:id/duplicate',
    tag,
    summary: 'Make a copy with a draft of its own',
    access: 'editAssemblies',
    params: idSchema,
    body: duplicateAssemblySchema,
    answers: { status: 201, schema: assemblySchema },
    handle: ({ context, actor, input }) => duplicateAssembly(context, actor, input.params.id, input.body.name),
  }),
  ...[true, false].map((archived) =>
    defineRoute({
      method: 'post',
      path: `/assemblies/:id/${archived ? 'archive' : 'unarchive'}`,
      tag,
      summary: archived ? 'Put an assembly away' : 'Take an assembly back',
      access: 'editAssemblies',
      params: idSchema,
      answers: { status: 200, schema: assemblySchema },
      handle: ({ context, actor, input }) => setArchived(context, actor, input.params.id, archived),
    }),
  ),
  defineRoute({
    method: 'post',
    path: '/assemblies/:id/revisions',
    tag,
    summary: 'Freeze the draft as the next revision',
    access: 'editAssemblies',
    params: idSchema,
    body: createRevisionSchema,
    answers: { status: 201, schema: revisionSchema },
    handle: ({ context, actor, input }) => createRevision(context, actor, input.params.id, input.body),
  }),
  defineRoute({
    method: 'get',
    path: '/assemblies/:id/revisions/:number',
    tag,
    summary: 'One revision',
    access: 'read',
    params: idSchema.extend({ number: z.coerce.number().int().min(1) }),
    answers: { status: 200, schema: revisionSchema },
    handle: ({ context, actor, input }) => getRevision(context, actor, input.params.id, input.params.number),
  }),
  defineRoute({
    method: 'post',
    path: '/assemblies/:id/estimates',
    tag,
    summary: 'The estimate of the draft or of a revision',
    access: 'read',
    params: idSchema,
    body: savedEstimateRequestSchema,
    answers: { status: 200, schema: estimateSchema },
    handle: ({ context, actor, input }) => estimateSaved(context, actor, input.params.id, input.body),
  }),
];
