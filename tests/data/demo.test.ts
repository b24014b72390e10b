import { readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { assemblyDocumentSchema } from '../../shared/schemas/assembly.js';
import { resolveDemoReferences } from '../../shared/schemas/demo.js';
import { contentOfReference, readData, readDemo } from './files.js';

const names = readdirSync(new URL('../../data/demo/', import.meta.url)).map((file) => file.replace(/\.json$/, ''));

describe('A demo document', () => {
  it('is one of three', () => {
    expect(names.sort()).toEqual(['driver-box', 'load-box', 'stall-lantern']);
  });

  it.each(names)('%s is whole once its values are in place', (name) => {
    const document = readDemo(name);
    expect(document.scenarios.filter(({ mustHold }) => mustHold).length).toBeGreaterThanOrEqual(2);
    expect(Math.max(...document.scenarios.map(({ airC }) => airC ?? -Infinity))).toBeGreaterThanOrEqual(35);
  });

  it.each(names)('%s takes version ids as well, and keeps no placeholder', (name) => {
    const version = '00000000-0000-4000-8000-000000000000';
    const document = assemblyDocumentSchema.parse(
      resolveDemoReferences(readData(`demo/${name}.json`), () => ({ version })),
    );
    const text = JSON.stringify(document);
    expect(text).toContain(version);
    expect(text).not.toContain('"reference"');
  });

  it('is refused when a placeholder is misspelt or names nothing', () => {
    const wrongKind = { material: { reference: { kind: 'stuff', slug: 'petg' } } };
    expect(() => resolveDemoReferences(wrongKind, contentOfReference)).toThrow(/kind/);
    const missing = { material: { reference: { kind: 'material', slug: 'unobtainium' } } };
    expect(() => resolveDemoReferences(missing, contentOfReference)).toThrow(/unobtainium/);
  });
});
