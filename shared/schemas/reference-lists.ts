import { z } from 'zod';
import { listOf } from './list.js';
import { finishSchema, materialSchema } from './material.js';
import { partTypeSchema } from './part-type.js';
import { ruleSetSchema } from './rule-set.js';

/** One row of a values table: the newest version with its content. */
function versionOf<T extends z.ZodType>(content: T) {
  return z.object({
    id: z.uuid(),
    version: z.uuid(),
    number: z.number().int(),
    origin: z.enum(['reference']),
    content,
  });
}

export const materialVersionSchema = versionOf(materialSchema).meta({ id: 'MaterialVersion' });
export const finishVersionSchema = versionOf(finishSchema).meta({ id: 'FinishVersion' });
export const partTypeVersionSchema = versionOf(partTypeSchema).meta({ id: 'PartTypeVersion' });
export const ruleSetVersionSchema = versionOf(ruleSetSchema).meta({ id: 'RuleSetVersion' });

export const materialListSchema = listOf(materialVersionSchema);
export const finishListSchema = listOf(finishVersionSchema);
export const partTypeListSchema = listOf(partTypeVersionSchema);
export const ruleSetListSchema = listOf(ruleSetVersionSchema);

export type MaterialVersion = z.infer<typeof materialVersionSchema>;
export type FinishVersion = z.infer<typeof finishVersionSchema>;
export type PartTypeVersion = z.infer<typeof partTypeVersionSchema>;
export type RuleSetVersion = z.infer<typeof ruleSetVersionSchema>;
