import { z } from 'zod';
import { assemblyDocumentSchema, localIdSchema } from './assembly.js';
import { ceilingAnswerSchema, deviceAnswerSchema, heatBalanceSchema, warningSchema } from './network-answers.js';
import { networkDocumentSchema } from './network.js';
import { ruleSetSchema } from './rule-set.js';
import { standingSchema, valueRef } from './value.js';

export const estimateRequestSchema = z
  .strictObject({
    assembly: assemblyDocumentSchema,
    /** Without one: the must-hold scenario with least headroom. */
    scenario: localIdSchema.optional(),
    /** Without one: the plain workshop set. */
    ruleSet: valueRef(ruleSetSchema).optional(),
  })
  .meta({ id: 'EstimateRequest' });
export type EstimateRequest = z.infer<typeof estimateRequestSchema>;

export const nodeRoles = ['ambient', 'surroundings', 'air', 'face', 'spot', 'carrier', 'case', 'junction'] as const;

export const limitStates = ['holds', 'tight', 'exceeds'] as const;
export const limitStateSchema = z.enum(limitStates);
export type LimitState = z.infer<typeof limitStateSchema>;

/** `unit` is that of value, limit and margin: °C (margin in K), A, W, or 1 for a share of the allowed power. */
export const estimateLimitSchema = z.object({
  id: z.string(),
  label: z.string(),
  node: z.string().optional(),
  part: z.string().optional(),
  kind: z.enum(['temperature', 'current', 'power']),
  unit: z.enum(['°C', 'A', 'W', '1']),
  value: z.number(),
  limit: z.number(),
  /** limit − value */
  margin: z.number(),
  /** What the rule set asks the margin to be. */
  askedMargin: z.number(),
  state: limitStateSchema,
  /** The limit’s own ceiling ÷ present drive − 1; null where the drive does not reach it within range. */
  headroom: z.number().nullable(),
  basis: z.object({ reason: z.string(), source: z.string(), standing: standingSchema, rule: z.string().optional() }),
  /** The value by the second correlation. */
  second: z.number().optional(),
});
export type EstimateLimit = z.infer<typeof estimateLimitSchema>;

export const assumedSchema = z.object({
  /** JSON pointer (RFC 6901) into the assembly document. */
  path: z.string(),
  /** Every field that takes this same default, `path` first. */
  paths: z.array(z.string()),
  label: z.string(),
  value: z.union([z.number(), z.string()]),
  /** What it would be if typical rather than cautious. */
  typical: z.union([z.number(), z.string()]),
  /** Kelvins of margin that the typical value would give the limit that binds. */
  effectK: z.number(),
  source: z.string(),
});

/** The steps from a part’s hottest node down to the room. */
export const heatPathSchema = z.object({
  part: z.string(),
  heatW: z.number(),
  steps: z.array(
    z.object({ node: z.string(), label: z.string(), temperatureC: z.number(), limitC: z.number().optional() }),
  ),
});

export const verdictSchema = z.object({
  scenario: z.string(),
  scenarioName: z.string(),
  state: limitStateSchema,
  /** The limit with least headroom. */
  binds: z.string().nullable(),
  bindsLabel: z.string(),
  margin: z.number().nullable(),
  marginUnit: z.enum(['K', 'A', 'W', '1']),
  headroom: z.number().nullable(),
  guardedHeadroom: z.number().nullable(),
  driveUnit: z.enum(['A', 'W']),
  /** Present drive, and the two ceilings, in `driveUnit`; null where there is none within range. */
  drive: z.number(),
  nominalCeiling: z.number().nullable(),
  guardedCeiling: z.number().nullable(),
  guardedElectricalW: z.number().nullable(),
  assumedCount: z.number().int(),
  engineVersion: z.string(),
});
export type Verdict = z.infer<typeof verdictSchema>;

export const estimateSchema = z
  .object({
    scenario: z.string(),
    verdict: verdictSchema,
    /** One line per scenario of the document. */
    scenarios: z.array(verdictSchema.extend({ mustHold: z.boolean() })),
    network: networkDocumentSchema,
    nodes: z.array(
      z.object({
        id: z.string(),
        role: z.enum(nodeRoles),
        label: z.string(),
        temperatureC: z.number(),
        second: z.number().optional(),
      }),
    ),
    flowsW: z.record(z.string(), z.number()),
    /** Heat between named places, grids taken whole: from where, to where, by which link. */
    exchanges: z.array(z.object({ from: z.string(), to: z.string(), flowW: z.number(), link: z.string() })),
    devices: z.record(z.string(), deviceAnswerSchema),
    limits: z.array(estimateLimitSchema),
    stressRatios: z.array(
      z.object({ part: z.string(), quantity: z.string(), value: z.number(), allowed: z.number(), ratio: z.number() }),
    ),
    ceiling: ceilingAnswerSchema,
    guardedCeiling: ceilingAnswerSchema,
    paths: z.array(heatPathSchema),
    heatBalance: heatBalanceSchema,
    handCheck: z.object({
      text: z.string(),
      riseK: z.number(),
      networkRiseK: z.number(),
      /** The same for the spot that stands out most from what it lies on. */
      spreading: z.object({ text: z.string(), riseK: z.number(), networkRiseK: z.number() }).optional(),
    }),
    warnings: z.array(warningSchema),
    assumed: z.array(assumedSchema),
    engineVersion: z.string(),
  })
  .meta({ id: 'Estimate' });
export type Estimate = z.infer<typeof estimateSchema>;

export const compileAnswerSchema = z
  .object({
    networks: z.array(z.object({ scenario: z.string(), network: networkDocumentSchema })),
    warnings: z.array(warningSchema),
  })
  .meta({ id: 'CompileAnswer' });
