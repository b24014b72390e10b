import { z } from 'zod';
import { networkDocumentSchema } from './network.js';

export const warningSchema = z
  .object({ code: z.string(), link: z.string().optional(), node: z.string().optional(), message: z.string() })
  .meta({ id: 'Warning' });
export type Warning = z.infer<typeof warningSchema>;

export const deviceAnswerSchema = z.object({
  currentA: z.number().optional(),
  voltageV: z.number().optional(),
  /** Electrical power at the terminals. */
  electricalW: z.number().optional(),
  heatW: z.number(),
  lightW: z.number().optional(),
  share: z.number().optional(),
  stable: z.boolean().optional(),
  senseV: z.number().optional(),
});
export type DeviceAnswer = z.infer<typeof deviceAnswerSchema>;

/** `value`, `limit` and `margin` in the limit’s own unit: °C and K, A, or share of the allowed power. */
export const limitAnswerSchema = z.object({
  id: z.string(),
  kind: z.enum(['temperature', 'current', 'power']),
  node: z.string().optional(),
  supply: z.string().optional(),
  value: z.number(),
  limit: z.number(),
  margin: z.number(),
  headroom: z.number().optional(),
});
export type LimitAnswer = z.infer<typeof limitAnswerSchema>;

export const heatBalanceSchema = z.object({
  inW: z.number(),
  outW: z.number(),
  lightOutW: z.number(),
  largestResidualW: z.number(),
});

export const solveAnswerSchema = z
  .object({
    converged: z.literal(true),
    temperaturesC: z.record(z.string(), z.number()),
    flowsW: z.record(z.string(), z.number()),
    filmCoefficientsWPerM2K: z.record(z.string(), z.number()),
    devices: z.record(z.string(), deviceAnswerSchema),
    limits: z.array(limitAnswerSchema),
    heatBalance: heatBalanceSchema,
    iterations: z.number().int(),
    warnings: z.array(warningSchema),
    compared: z.object({ temperaturesC: z.record(z.string(), z.number()) }).optional(),
  })
  .meta({ id: 'SolveAnswer' });
export type SolveAnswer = z.infer<typeof solveAnswerSchema>;

export const driveSchema = z.union(
  [z.strictObject({ supply: z.string().min(1) }), z.strictObject({ sources: z.array(z.string().min(1)).min(1) })],
  { error: 'The drive is {supply: id} or {sources: [node ids]}' },
);
export type Drive = z.infer<typeof driveSchema>;

export const ceilingRequestSchema = z
  .strictObject({
    document: networkDocumentSchema,
    drive: driveSchema,
    /** Replaces nothing: further temperature limits beside the document’s own. */
    limits: z
      .array(z.strictObject({ node: z.string().min(1), maxC: z.number() }))
      .max(10000)
      .optional(),
  })
  .meta({ id: 'CeilingRequest' });
export type CeilingRequest = z.infer<typeof ceilingRequestSchema>;

export const ceilingStatuses = ['found', 'exceeded-at-zero', 'no-limit-within-range', 'runaway'] as const;

export const ceilingAnswerSchema = z
  .object({
    status: z.enum(ceilingStatuses),
    /** Ceiling ÷ present drive. */
    scale: z.number(),
    currentA: z.number().optional(),
    electricalW: z.number(),
    heatW: z.number(),
    binds: z
      .object({
        kind: z.enum(['temperature', 'current', 'power', 'runaway']),
        id: z.string(),
        node: z.string().optional(),
      })
      .nullable(),
    perLimit: z.array(z.object({ id: z.string(), scale: z.number().nullable() })),
    range: z.tuple([z.number(), z.number()]),
    runaway: z.object({ scale: z.number(), node: z.string() }).optional(),
  })
  .meta({ id: 'CeilingAnswer' });
export type CeilingAnswer = z.infer<typeof ceilingAnswerSchema>;
