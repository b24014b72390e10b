import { z } from 'zod';
import { decisionStateSchema, personSchema } from './assembly-records.js';
import { estimateSchema } from './estimate.js';
import { listOf } from './list.js';

const reason = z
  .string()
  .trim()
  .min(10, 'Give a reason of at least ten characters')
  .max(10000, 'A reason must be at most 10,000 characters');

/** What the decision covers: the product as it will be made. */
export const coversSchema = z.strictObject({
  product: z.string().trim().min(1, 'Name the product').max(200),
  variant: z.string().trim().max(200).default(''),
  /** Drawing or print file and its SHA-256, where there is one. */
  file: z.string().trim().max(300).default(''),
  fileSha256: z
    .union([z.literal(''), z.string().regex(/^[0-9a-f]{64}$/i, 'A SHA-256 has 64 hexadecimal digits')])
    .default(''),
});

export const askDecisionSchema = z.strictObject({
  assemblyId: z.uuid(),
  /** The draft as the asker saw it; asking makes a revision of it. */
  expectedVersion: z.number().int().min(1),
  statement: z
    .string()
    .trim()
    .min(10, 'Say in at least ten characters what is asked')
    .max(10000, 'A statement must be at most 10,000 characters'),
  covers: coversSchema,
  /** For a returned request: asking again continues it with a new snapshot. */
  decisionId: z.uuid().optional(),
  requestId: z.uuid().optional(),
});

export const conditionSchema = z.strictObject({
  words: z.string().trim().min(3, 'Word the condition').max(2000),
  scenario: z.string().max(40).optional(),
  /** Largest drive, in the drive’s unit. */
  maxDrive: z.number().positive().optional(),
  owner: z.string().trim().max(120).default(''),
  due: z.union([z.literal(''), z.iso.date('Give a date as 2027-03-31')]).default(''),
});

export const redFlagSchema = z.object({ id: z.string(), words: z.string() });

export const decideSchema = z
  .strictObject({
    /** Of the decision as the reviewer saw it: a second reviewer who comes later is told. */
    expectedVersion: z.number().int().min(1),
    outcome: z.enum(['accepted', 'accepted-with-conditions', 'returned', 'declined']),
    reason,
    conditions: z.array(conditionSchema).max(50).default([]),
    /** Each red flag of the snapshot, with why it is taken. */
    flagsTaken: z
      .array(
        z.strictObject({
          id: z.string().max(300),
          reason: z
            .string()
            .trim()
            .min(3, 'Say why this flag is taken')
            .max(4000, 'A reason must be at most 4000 characters'),
        }),
      )
      .max(1000)
      .default([]),
    /** Needed to accept. */
    password: z.string().max(1000).optional(),
  })
  .refine((d) => d.outcome !== 'accepted-with-conditions' || d.conditions.length > 0, {
    path: ['conditions'],
    error: 'Add at least one condition',
  })
  .refine((d) => d.outcome === 'accepted-with-conditions' || d.conditions.length === 0, {
    path: ['conditions'],
    error: 'Only an acceptance with conditions has conditions',
  });

export const withdrawSchema = z.strictObject({ expectedVersion: z.number().int().min(1), reason });

export const selfCheckSchema = askDecisionSchema;

export const decisionEventSchema = z.object({
  sequence: z.number().int(),
  kind: decisionStateSchema,
  actor: personSchema,
  at: z.iso.datetime(),
  reason: z.string(),
  conditions: z.array(conditionSchema),
  flagsTaken: z.array(z.object({ id: z.string(), reason: z.string() })),
  revision: z.number().int().nullable(),
  snapshotSha256: z.string().nullable(),
});

export const decisionSummarySchema = z
  .object({
    id: z.uuid(),
    number: z.number().int(),
    version: z.number().int(),
    state: decisionStateSchema,
    assembly: z.object({ id: z.uuid(), name: z.string() }),
    revision: z.number().int(),
    statement: z.string(),
    askedBy: personSchema,
    askedAt: z.iso.datetime(),
    decidedBy: personSchema.nullable(),
    decidedAt: z.iso.datetime().nullable(),
    /** From the frozen snapshot. */
    binds: z.string(),
    guardedCeiling: z.number().nullable(),
    driveUnit: z.enum(['A', 'W']),
    drive: z.number(),
  })
  .meta({ id: 'DecisionSummary' });
export type DecisionSummary = z.infer<typeof decisionSummarySchema>;

export const decisionListSchema = listOf(decisionSummarySchema);

/** Frozen when a decision is asked: all that the reviewer decides on. */
export const snapshotSchema = z.object({
  format: z.literal('trimwick-snapshot/1'),
  assembly: z.record(z.string(), z.unknown()),
  ruleSet: z.record(z.string(), z.unknown()),
  covers: coversSchema,
  engineVersion: z.string(),
  estimates: z.array(estimateSchema),
  redFlags: z.array(redFlagSchema),
});

export const decisionSchema = decisionSummarySchema
  .extend({
    covers: coversSchema,
    events: z.array(decisionEventSchema),
    snapshot: snapshotSchema,
    snapshotSha256: z.string(),
    redFlags: z.array(redFlagSchema),
    conditions: z.array(conditionSchema),
    /** Whether the person who reads this may decide, and if not, why. */
    mayDecide: z.boolean(),
    mayDecideWhy: z.string(),
    mayWithdraw: z.boolean(),
  })
  .meta({ id: 'Decision' });
export type Decision = z.infer<typeof decisionSchema>;
