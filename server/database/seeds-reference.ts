import { randomUUID } from 'node:crypto';
import { readFileSync } from 'node:fs';
import type { DataSource, EntityManager } from 'typeorm';
import { referenceFileSchemas } from '../../shared/schemas/reference-data.js';
import { canonicalJson, sha256 } from '../records/canonical.js';
import { dataFolder } from './data-folder.js';
import { ReferenceValue, ReferenceValueVersion } from './entities/reference-values.js';

const files = [
  { kind: 'material', file: 'materials.json', schema: referenceFileSchemas.materials },
  { kind: 'finish', file: 'finishes.json', schema: referenceFileSchemas.finishes },
  { kind: 'part-type', file: 'part-types.json', schema: referenceFileSchemas.partTypes },
  { kind: 'rule-set', file: 'rule-sets.json', schema: referenceFileSchemas.ruleSets },
] as const;

async function loadRow(manager: EntityManager, kind: string, content: { slug: string; name: string }): Promise<void> {
  const values = manager.getRepository(ReferenceValue);
  const versions = manager.getRepository(ReferenceValueVersion);
  let value = await values.findOneBy({ kind, slug: content.slug });
  if (!value) value = await values.save({ id: randomUUID(), kind, slug: content.slug });
  const newest = await versions.findOne({ where: { valueId: value.id }, order: { number: 'DESC' } });
  const contentSha256 = sha256(canonicalJson(content));
  if (newest?.contentSha256 === contentSha256) return;
  await versions.save({
    id: randomUUID(),
    valueId: value.id,
    number: (newest?.number ?? 0) + 1,
    name: content.name,
    content: { ...content },
    contentSha256,
    createdAt: new Date(),
  });
}

/** Loads the shared reference values: a row whose content has changed becomes a further version, others stay. */
export async function loadReferenceValues(dataSource: DataSource): Promise<void> {
  await dataSource.transaction(async (manager) => {
    await manager.query('SELECT pg_advisory_xact_lock(4310, 1)');
    for (const { kind, file, schema } of files) {
      const rows = schema.parse(JSON.parse(readFileSync(new URL(file, dataFolder), 'utf8')));
      for (const row of rows) await loadRow(manager, kind, row);
    }
  });
}
