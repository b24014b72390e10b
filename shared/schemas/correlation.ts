import { z } from 'zod';

/** A published correlation as the registry tells of it. Ranges are [from, to] by symbol (ra, re, pr, el, aspect); `null` is open. */
export const correlationEntrySchema = z
  .object({
    id: z.string(),
    shape: z.string(),
    regime: z.enum(['natural', 'forced', 'gap', 'channel']),
    formula: z.string(),
    source: z.string(),
    range: z.record(z.string(), z.tuple([z.number(), z.number().nullable()])),
  })
  .meta({ id: 'Correlation' });
export type CorrelationEntry = z.infer<typeof correlationEntrySchema>;

export const correlationListSchema = z.object({ items: z.array(correlationEntrySchema), total: z.number().int() });
export type CorrelationList = z.infer<typeof correlationListSchema>;
