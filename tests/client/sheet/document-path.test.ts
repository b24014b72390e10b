import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  differences,
  pointerOf,
  pointerSegments,
  valueAt,
  withValueAt,
} from '../../../src/composables/document-path.js';
import { numberInWords } from '../../../src/composables/document-values.js';
import { fieldName } from '../../../src/composables/field-names.js';

const document = {
  name: 'Lamp',
  housing: { outerM: [0.1, 0.2, 0.3], faces: { top: { wallM: null } } },
  scenarios: [{ id: 'hot', name: 'Hot stall', airC: 40 }],
};

describe('a document by pointer', () => {
  test('is read, and changed without touching the original', () => {
    expect(valueAt(document, '/housing/outerM/1')).toBe(0.2);
    expect(valueAt(document, '/housing/nothing/here')).toBeUndefined();
    const changed = withValueAt(document, '/housing/faces/top/wallM', 0.002);
    expect(changed.housing.faces.top.wallM).toBe(0.002);
    expect(document.housing.faces.top.wallM).toBeNull();
    expect(changed.scenarios).toBe(document.scenarios);
    expect(Array.isArray(withValueAt(document, '/housing/outerM/0', 1).housing.outerM)).toBe(true);
  });

  test('any key survives the way to a pointer and back', () => {
    fc.assert(
      fc.property(fc.array(fc.string({ minLength: 1 }), { minLength: 1 }), (segments) => {
        expect(pointerSegments(pointerOf(segments))).toEqual(segments);
      }),
    );
  });

  test('never reads what an object inherits', () => {
    expect(valueAt({}, '/constructor')).toBeUndefined();
    expect(valueAt({}, '/__proto__/polluted')).toBeUndefined();
  });

  test('two documents differ field by field', () => {
    const theirs = withValueAt(withValueAt(document, '/name', 'Lantern'), '/scenarios/0/airC', 35);
    expect(differences(document, theirs)).toEqual([
      { pointer: '/name', mine: 'Lamp', theirs: 'Lantern' },
      { pointer: '/scenarios/0/airC', mine: 40, theirs: 35 },
    ]);
    expect(differences(document, structuredClone(document))).toEqual([]);
  });

  test.each([
    ['/housing/faces/top/wallM', 'Top face, wall'],
    ['/housing/outerM/0', 'Width'],
    ['/scenarios/0/airC', 'Scenario Hot stall, air'],
    ['/name', 'Name'],
    ['', 'The whole document'],
  ])('%s is called “%s”', (pointer, name) => {
    expect(fieldName(pointer, document)).toBe(name);
  });
});

test.each([
  [0.0024, '/housing/faces/top/wallM', '2.4\u00a0mm'],
  [0.09, '/housing/outerM/1', '90\u00a0mm'],
  [0.05, '/carriers/0/sizeM/0', '50\u00a0mm'],
  [40, '/scenarios/0/airC', '40\u00a0°C'],
  [1800, '/scenarios/0/altitudeM', '1800\u00a0m'],
  [1000, '/scenarios/0/sun/irradianceWPerM2', '1000\u00a0W/m²'],
  [0.2, '/housing/faces/top/print/infillShare', '20\u00a0%'],
  [0.15, '/supplies/0/currentA', '0.15\u00a0A'],
  [10, '/parts/0/heatW', '10\u00a0W'],
  [0.0001, '/parts/0/mount/stack', '1\u00a0K\u00a0cm²/W'],
  [3, '/housing/faces/top/print/perimeters', '3'],
])('%d at %s reads “%s”', (value, pointer, words) => {
  expect(numberInWords(value, pointer)).toBe(words);
});
