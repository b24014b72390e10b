import { z } from 'zod';
import { slugSchema } from './value.js';

/**
 * The demo documents of `data/demo/` are assembly documents whose values are named by slug, since version ids exist only in a
 * database: `{ "reference": { "kind": "material", "slug": "petg" } }` stands where a value reference goes.
 */
export const demoReferenceSchema = z.strictObject({
  kind: z.enum(['material', 'finish', 'part-type']),
  slug: slugSchema,
});
export type DemoReference = z.infer<typeof demoReferenceSchema>;

const placeholderSchema = z.strictObject({ reference: demoReferenceSchema });

/**
 * A copy of the document with every placeholder replaced by what `lookup` gives: `{ version }` or `{ inline }`.
 *
 * @throws ZodError on a placeholder that is not well formed; whatever `lookup` throws on a slug that it does not know
 */
export function resolveDemoReferences(document: unknown, lookup: (reference: DemoReference) => unknown): unknown {
  if (Array.isArray(document)) return document.map((entry: unknown) => resolveDemoReferences(entry, lookup));
  if (typeof document !== 'object' || document === null) return document;
  if ('reference' in document) return lookup(placeholderSchema.parse(document).reference);
  return Object.fromEntries(
    Object.entries(document).map(([key, entry]: [string, unknown]) => [key, resolveDemoReferences(entry, lookup)]),
  );
}
