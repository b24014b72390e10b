import { z } from 'zod';
import { finishSchema, materialSchema } from './material.js';
import { partTypeSchema } from './part-type.js';
import { ruleSetSchema } from './rule-set.js';

/** A file of reference values: every row complete, no slug twice. */
function fileOf<T extends z.ZodType<{ slug: string }>>(row: T) {
  return z
    .array(row)
    .min(1, 'The file has no rows')
    .superRefine((rows, context) => {
      const seen = new Set<string>();
      rows.forEach(({ slug }, i) => {
        if (seen.has(slug)) {
          context.addIssue({ code: 'custom', path: [i, 'slug'], message: `The slug “${slug}” stands twice` });
        }
        seen.add(slug);
      });
    });
}

/** What the files of `data/` hold: materials.json, finishes.json, part-types.json, rule-sets.json. */
export const referenceFileSchemas = {
  materials: fileOf(materialSchema),
  finishes: fileOf(finishSchema),
  partTypes: fileOf(partTypeSchema),
  ruleSets: fileOf(ruleSetSchema),
};
