import { readFileSync } from 'node:fs';
import type { z } from 'zod';
import { assemblyDocumentSchema, type AssemblyDocument } from '../../shared/schemas/assembly.js';
import { resolveDemoReferences, type DemoReference } from '../../shared/schemas/demo.js';
import type { Finish, Material } from '../../shared/schemas/material.js';
import type { PartType } from '../../shared/schemas/part-type.js';
import { referenceFileSchemas } from '../../shared/schemas/reference-data.js';

const root = new URL('../../data/', import.meta.url);

/** A file of `data/`, as it stands. */
export function readData(name: string): unknown {
  return JSON.parse(readFileSync(new URL(name, root), 'utf8'));
}

export function readMaterials(): z.infer<typeof referenceFileSchemas.materials> {
  return referenceFileSchemas.materials.parse(readData('materials.json'));
}

export function readFinishes(): z.infer<typeof referenceFileSchemas.finishes> {
  return referenceFileSchemas.finishes.parse(readData('finishes.json'));
}

export function readPartTypes(): z.infer<typeof referenceFileSchemas.partTypes> {
  return referenceFileSchemas.partTypes.parse(readData('part-types.json'));
}

export function readRuleSets(): z.infer<typeof referenceFileSchemas.ruleSets> {
  return referenceFileSchemas.ruleSets.parse(readData('rule-sets.json'));
}

/** The row of that slug, or an error that names it. */
export function bySlug<T extends { slug: string }>(rows: readonly T[], slug: string): T {
  const row = rows.find((entry) => entry.slug === slug);
  if (!row) throw new Error(`There is no row “${slug}”`);
  return row;
}

const values = { material: readMaterials(), finish: readFinishes(), 'part-type': readPartTypes() };

/** The content of the value that a placeholder names. */
export function contentOfReference({ kind, slug }: DemoReference): Material | Finish | PartType {
  return bySlug<Material | Finish | PartType>(values[kind], slug);
}

/** A demo assembly of `data/demo/`, with every value in place. */
export function readDemo(name: string): AssemblyDocument {
  return assemblyDocumentSchema.parse(
    resolveDemoReferences(readData(`demo/${name}.json`), (reference) => ({ inline: contentOfReference(reference) })),
  );
}
