import { describe, expect, test } from 'vitest';
import {
  emptyAnswers,
  firstAssembly,
  mountings,
  questionOf,
  seats,
  type Catalogue,
} from '../../shared/first-assembly.js';
import { assemblyDocumentSchema } from '../../shared/schemas/assembly.js';
import type { Material } from '../../shared/schemas/material.js';
import type { PartType } from '../../shared/schemas/part-type.js';
import { aluminium, array, petg, resistor } from '../engine/fixtures.js';

const id = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`;

function material(n: number, content: Material): Catalogue['materials'][number] {
  return { id: id(n), version: id(n + 100), number: 1, origin: 'reference', content };
}

function part(n: number, content: PartType): Catalogue['partTypes'][number] {
  return { id: id(n), version: id(n + 100), number: 1, origin: 'reference', content };
}

const catalogue: Catalogue = {
  materials: [
    material(1, petg),
    material(2, aluminium),
    material(3, { ...aluminium, slug: 'laminate', name: 'Laminate', group: 'laminate' }),
    material(4, { ...aluminium, slug: 'copper', name: 'Copper' }),
  ],
  partTypes: [part(11, array), part(12, resistor)],
};

describe('the first assembly', () => {
  test('is a valid document when nothing at all is known, and says what it took', () => {
    const { document, stoodIn } = firstAssembly(emptyAnswers(), catalogue);
    expect(assemblyDocumentSchema.safeParse(document).error?.issues ?? []).toEqual([]);
    expect(stoodIn.map(({ question }) => question)).toEqual(['size', 'mounted', 'mounted', 'sun']);
    expect(document.housing?.faces.top).toMatchObject({ wallM: null, material: null, loadState: null });
    expect(document.parts[0]?.heatW).toBeNull();
    expect(document.scenarios[0]?.airC).toBeNull();
    expect(document.housing?.touched).toBeNull();
  });

  test('is valid without any reference values', () => {
    for (const seat of seats) {
      const { document } = firstAssembly({ ...emptyAnswers(), seat }, { materials: [], partTypes: [] });
      expect(assemblyDocumentSchema.safeParse(document).success).toBe(true);
      expect(document.parts[0]?.mount.on).toMatch(/^face\./);
    }
  });

  test.each(mountings.flatMap((mounting) => seats.map((seat) => [mounting, seat] as const)))(
    'is valid %s with the heat on %s',
    (mounting, seat) => {
      const answers = { ...emptyAnswers(), mounting, seat, sizeM: [0.16, 0.09, 0.045] as [number, number, number] };
      const { document, stoodIn } = firstAssembly({ ...answers, partType: id(111), currentA: 0.2 }, catalogue);
      expect(assemblyDocumentSchema.safeParse(document).error?.issues ?? []).toEqual([]);
      expect(stoodIn.map(({ question }) => question)).toEqual(['sun']);
      expect(document.supplies[0]?.currentA).toBe(0.2);
    },
  );

  test('takes a part’s rated current where the drive is not known', () => {
    const led = firstAssembly({ ...emptyAnswers(), partType: id(111) }, catalogue);
    expect(led.document.supplies[0]?.currentA).toBe(0.7);
    const bank = firstAssembly({ ...emptyAnswers(), partType: id(112) }, catalogue);
    expect(bank.document.supplies[0]?.currentA).toBeCloseTo(Math.sqrt(25 / 10), 9);
    expect(bank.stoodIn.some(({ question }) => question === 'heat')).toBe(true);
  });

  test('knows no sun, a window and full sun', () => {
    const sun = (answer: 'none' | 'window' | 'full') =>
      firstAssembly({ ...emptyAnswers(), sun: answer }, catalogue).document.scenarios[0]?.sun;
    expect(sun('none')).toBeNull();
    expect(sun('full')).toMatchObject({ irradianceWPerM2: 1000, glazingTransmittance: 1 });
    expect(sun('window')?.glazingTransmittance).toBeLessThan(1);
  });

  test.each([
    ['/housing/faces/top/wallM', 'walls'],
    ['/housing/faces/top/print/perimeters', 'walls'],
    ['/housing/faces/top/material', 'material'],
    ['/housing/faces/top/finishOutside', 'material'],
    ['/housing/touched', 'touched'],
    ['/carriers/0/standOffM', 'mounted'],
    ['/parts/0/mount/stack', 'mounted'],
    ['/parts/0/heatW', 'heat'],
    ['/scenarios/0/airC', 'room'],
  ])('leads the assumption at %s back to question %s', (path, question) => {
    expect(questionOf(path)).toBe(question);
  });
});
