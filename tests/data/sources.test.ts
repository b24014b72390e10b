import { describe, expect, it } from 'vitest';
import { standings } from '../../shared/schemas/value.js';
import { readFinishes, readMaterials, readPartTypes, readRuleSets } from './files.js';

interface Sourced {
  path: string;
  standing: string;
  source: string;
}

/** Every `{ value, standing, source }` below a node of the tree. */
function sourcedValues(node: unknown, path: string): Sourced[] {
  if (typeof node !== 'object' || node === null) return [];
  const record = node as Record<string, unknown>;
  if ('value' in record && typeof record.standing === 'string' && typeof record.source === 'string') {
    return [{ path, standing: record.standing, source: record.source }];
  }
  return Object.entries(record).flatMap(([key, entry]) => sourcedValues(entry, `${path}/${key}`));
}

/** Numbers below a node that stand outside any sourced value. */
function loneNumbers(node: unknown, path: string): string[] {
  if (typeof node === 'number') return [path];
  if (typeof node !== 'object' || node === null || 'source' in node) return [];
  return Object.entries(node).flatMap(([key, entry]: [string, unknown]) => loneNumbers(entry, `${path}/${key}`));
}

const files: Record<string, { slug: string; name: string }[]> = {
  materials: readMaterials(),
  finishes: readFinishes(),
  partTypes: readPartTypes(),
  ruleSets: readRuleSets(),
};
const rows = Object.entries(files).flatMap(([file, entries]) =>
  entries.map((row) => ({ file, slug: row.slug, name: row.name, values: sourcedValues(row, ''), row })),
);

describe('Every reference value', () => {
  it('is there in number: 20 materials, 12 finishes, 14 part types, one rule set', () => {
    expect(files.materials?.length).toBeGreaterThanOrEqual(20);
    expect(files.finishes?.length).toBeGreaterThanOrEqual(12);
    expect(files.partTypes?.length).toBeGreaterThanOrEqual(14);
    expect(files.ruleSets?.map(({ slug }) => slug)).toContain('plain-workshop');
  });

  it.each(rows)('of $slug says where it comes from', ({ values, row }) => {
    expect(values.length).toBeGreaterThan(0);
    for (const { path, source, standing } of values) {
      expect(standings, path).toContain(standing);
      expect(source.split(/\s+/).length, `${path}: ${source}`).toBeGreaterThanOrEqual(3);
    }
    expect(loneNumbers(row, '')).toEqual([]);
  });

  it.each(rows)('of $slug claims no more standing than its source has', ({ values }) => {
    for (const { path, source, standing } of values) {
      if (/recalled|to be verified/.test(source)) expect(standing, path).toBe('from-memory');
      if (source.startsWith('common practice')) expect(standing, path).toBe('common-practice');
      // “Published” needs an edition and a place in it; “data-sheet” and “measured” are for the team’s own rows.
      if (standing === 'published') expect(source, path).toMatch(/\d{4}.*(table|clause|\d+\.\d+|eq)/i);
      expect(['data-sheet', 'measured'], path).not.toContain(standing);
    }
  });

  it('has a name of its own in its table', () => {
    for (const [file, entries] of Object.entries(files)) {
      const names = entries.map(({ name }) => name.toLowerCase());
      expect(new Set(names).size, file).toBe(names.length);
    }
  });

  it('carries no trade mark', () => {
    expect(JSON.stringify(files)).not.toMatch(/[®™]/);
  });
});
