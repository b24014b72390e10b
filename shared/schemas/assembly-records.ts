import { z } from 'zod';
import { assemblyDocumentSchema } from './assembly.js';
import { verdictSchema } from './estimate.js';
import { listOf } from './list.js';

const person = z.object({ id: z.uuid(), name: z.string() });
export const personSchema = person;

/** A draft may be unfinished: it is kept as typed, and checked only when it is computed or frozen. */
export const draftDocumentSchema = z.record(z.string(), z.unknown());

export const decisionStates = [
  'asked',
  'accepted',
  'accepted-with-conditions',
  'returned',
  'declined',
  'withdrawn',
  'superseded',
  'self-checked',
] as const;
export const decisionStateSchema = z.enum(decisionStates);
export type DecisionState = z.infer<typeof decisionStateSchema>;

export const assemblySummarySchema = z
  .object({
    id: z.uuid(),
    name: z.string(),
    /** Newest revision; null before the first. */
    revision: z.number().int().nullable(),
    /** Of the draft as last saved; null while it cannot be computed. */
    verdict: verdictSchema.nullable(),
    decision: z
      .object({ id: z.uuid(), number: z.number().int(), state: decisionStateSchema, revision: z.number().int() })
      .nullable(),
    /** True when the draft has moved since the newest revision. */
    draftAhead: z.boolean(),
    archived: z.boolean(),
    createdBy: person,
    updatedBy: person,
    updatedAt: z.iso.datetime(),
  })
  .meta({ id: 'AssemblySummary' });
export type AssemblySummary = z.infer<typeof assemblySummarySchema>;

export const assemblyListSchema = listOf(assemblySummarySchema);

export const assemblySchema = assemblySummarySchema
  .extend({
    draft: z.object({
      version: z.number().int(),
      document: draftDocumentSchema,
      updatedAt: z.iso.datetime(),
      updatedBy: person,
    }),
    revisions: z.array(
      z.object({
        id: z.uuid(),
        number: z.number().int(),
        note: z.string(),
        createdAt: z.iso.datetime(),
        createdBy: person,
      }),
    ),
  })
  .meta({ id: 'Assembly' });
export type Assembly = z.infer<typeof assemblySchema>;

export const createAssemblySchema = z.strictObject({
  document: draftDocumentSchema,
  /** Made once by the client per press of the button: a repeated send answers with the first one’s assembly. */
  requestId: z.uuid().optional(),
});

export const duplicateAssemblySchema = z.strictObject({ name: z.string().trim().min(1, 'Give it a name').max(120) });

export const saveDraftSchema = z.strictObject({
  expectedVersion: z.number().int().min(1),
  document: draftDocumentSchema,
});

/** 409: somebody else saved meanwhile. Both versions are here; nothing was lost. */
export const draftConflictSchema = z.object({
  version: z.number().int(),
  document: draftDocumentSchema,
  updatedBy: person,
  updatedAt: z.iso.datetime(),
});

export const createRevisionSchema = z.strictObject({
  expectedVersion: z.number().int().min(1),
  note: z.string().trim().max(4000, 'A note must be at most 4000 characters').default(''),
});

export const revisionSchema = z
  .object({
    id: z.uuid(),
    number: z.number().int(),
    note: z.string(),
    document: assemblyDocumentSchema,
    engineVersion: z.string(),
    createdAt: z.iso.datetime(),
    createdBy: person,
    contributors: z.array(person),
  })
  .meta({ id: 'Revision' });
export type Revision = z.infer<typeof revisionSchema>;

export const savedEstimateRequestSchema = z.strictObject({
  /** A revision number; without one the draft. */
  revision: z.number().int().min(1).optional(),
  scenario: z.string().max(40).optional(),
});
