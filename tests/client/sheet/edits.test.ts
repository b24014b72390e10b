import { describe, expect, test } from 'vitest';
import { emptyAnswers, firstAssembly } from '../../../shared/first-assembly.js';
import { assemblyDocumentSchema, type AssemblyDocumentInput } from '../../../shared/schemas/assembly.js';
import type { MaterialVersion } from '../../../shared/schemas/reference-lists.js';
import type { Material } from '../../../shared/schemas/material.js';
import {
  addBoard,
  addPart,
  addPlate,
  addScenario,
  addSupply,
  removeCarrier,
  removePart,
  removeScenario,
  removeSupply,
  scenarioTemplates,
} from '../../../src/components/sheet/document-edits.js';
import { answersOf, emptyForm, formFrom } from '../../../src/components/sheet/first-form.js';
import { aluminium, lampInput, petg } from '../../engine/fixtures.js';

const version = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`;
const row = (n: number, content: Material): MaterialVersion => ({
  id: version(n),
  version: version(n + 100),
  number: 1,
  origin: 'reference',
  content,
});
const materials = [
  row(1, { ...petg, slug: 'petg', name: 'PETG, print' }),
  row(2, { ...aluminium, slug: 'aluminium-6060', name: 'Aluminium' }),
  row(3, { ...aluminium, slug: 'fr4', name: 'Laminate', group: 'laminate' }),
  row(4, { ...aluminium, slug: 'copper', name: 'Copper' }),
];

function valid(document: AssemblyDocumentInput): AssemblyDocumentInput {
  expect(assemblyDocumentSchema.safeParse(document).error?.issues ?? []).toEqual([]);
  return document;
}

describe('edits of the document as a whole', () => {
  test('what is added is valid as it comes, with ids of its own', () => {
    let document = valid(lampInput);
    for (let i = 0; i < 3; i += 1) {
      document = valid(addPart(document));
      document = valid(addPlate(document, materials));
      document = valid(addBoard(document, materials));
      document = valid(addSupply(document));
    }
    for (const list of [document.parts, document.carriers ?? [], document.supplies ?? []]) {
      const ids = list.map(({ id }) => id);
      expect(new Set(ids).size).toBe(ids.length);
    }
  });

  test.each(scenarioTemplates)('the scenario “$name” is valid, also twice', (template) => {
    const twice = valid(addScenario(addScenario(lampInput, template), template));
    expect(new Set(twice.scenarios.map(({ id }) => id)).size).toBe(4);
    expect(removeScenario(twice, 3).scenarios).toHaveLength(3);
  });

  test('parts of a removed plate stand on its wall', () => {
    const document = valid(removeCarrier(lampInput, 0));
    expect(document.parts.map(({ mount }) => mount.on)).toEqual(['face.top', 'face.top']);
  });

  test('parts of a removed supply are fed by nothing, and the drive forgets what is gone', () => {
    const document = valid(removeSupply({ ...lampInput, drive: { supply: 'drive' } }, 0));
    expect(document.parts.map(({ supply }) => supply)).toEqual([null, null]);
    expect(document.drive).toBeNull();
    const driven = valid(removePart({ ...lampInput, drive: { parts: ['left'] } }, 0));
    expect(driven.drive).toBeNull();
    expect(driven.parts.map(({ id }) => id)).toEqual(['right']);
  });
});

describe('the eight questions as typed', () => {
  const answers = (change: Partial<ReturnType<typeof emptyForm>>) =>
    answersOf({ ...emptyForm(), ...change }, materials, undefined);

  test('a wall in words gives material and print settings; a chosen material wins', () => {
    expect(answers({ walls: 'PETG, 3 walls, 20 % infill' })).toMatchObject({
      material: version(101),
      printed: true,
      print: { perimeters: 3, infillShare: 0.2 },
    });
    expect(answers({ walls: 'PETG, 3 walls', material: version(102) }).material).toBe(version(102));
  });

  test('metal is not taken as printed, an unknown material is', () => {
    expect(answers({ material: version(102) }).printed).toBe(false);
    expect(answers({ walls: '2 mm aluminium' })).toMatchObject({ printed: false, wallM: 0.002 });
    expect(answers({}).printed).toBe(true);
  });

  test('what cannot be read counts as not known, and the document stays valid', () => {
    const typed = answers({ size: 'rather big', heatW: 'lots', airC: '12 apples', touched: 'sometimes', sun: 'maybe' });
    expect(typed).toMatchObject({ sizeM: null, heatW: null, airC: null, touched: null, sun: null });
    valid(firstAssembly(typed, { materials, partTypes: [] }).document);
  });

  test('a form kept in the browser comes back; anything else is an empty form', () => {
    expect(formFrom(JSON.stringify({ ...emptyForm(), size: '1 x 2 x 3' })).size).toBe('1 x 2 x 3');
    for (const broken of [null, '', '{', 'null', '3']) expect(formFrom(broken)).toEqual(emptyForm());
  });

  test('nothing at all makes a valid document', () => {
    valid(firstAssembly(emptyAnswers(), { materials, partTypes: [] }).document);
  });
});
