import { describe, expect, it } from 'vitest';
import type { Finish, Material, MaterialGroup } from '../../shared/schemas/material.js';
import { referenceFileSchemas } from '../../shared/schemas/reference-data.js';
import { bySlug, readData, readFinishes, readMaterials } from './files.js';

/** Wide plausible ranges by group: k [W/(m K)], ρ [kg/m³], c_p [J/(kg K)]. Common practice; they catch slips of a power of ten. */
const plausible: Record<MaterialGroup, { k: [number, number]; rho: [number, number]; c: [number, number] }> = {
  'print-polymer': { k: [0.1, 1.2], rho: [850, 1600], c: [900, 2300] },
  'moulding-polymer': { k: [0.1, 1.2], rho: [850, 1800], c: [900, 2300] },
  metal: { k: [10, 430], rho: [1700, 11500], c: [125, 1050] },
  laminate: { k: [0.2, 12], rho: [1500, 3500], c: [700, 1500] },
  interface: { k: [0.02, 20], rho: [1, 4000], c: [600, 1600] },
  adhesive: { k: [0.15, 5], rho: [900, 3500], c: [600, 1800] },
  potting: { k: [0.15, 4], rho: [900, 3000], c: [700, 2000] },
  ceramic: { k: [0.8, 300], rho: [2200, 4000], c: [600, 1000] },
  wood: { k: [0.05, 0.4], rho: [100, 1200], c: [1100, 2800] },
};

function conductivities(material: Material): number[] {
  const { value } = material.conductivityWPerMK;
  return typeof value === 'number' ? [value] : value.map(([, k]) => k);
}

/** What is impossible or implausible about a material, in words; nothing for a sound one. */
function faults(material: Material): string[] {
  const found: string[] = [];
  const range = plausible[material.group];
  const check = (what: string, value: number, [low, high]: [number, number]) => {
    if (value < low || value > high) found.push(`${what} ${String(value)} outside ${String(low)} to ${String(high)}`);
  };
  for (const k of conductivities(material)) check('conductivity', k, range.k);
  check('density', material.densityKgPerM3.value, range.rho);
  check('specific heat', material.specificHeatJPerKgK.value, range.c);
  // ρ c of dense solids lies near 1 to 4 MJ/(m³ K) whatever they are made of.
  if (!['interface', 'wood'].includes(material.group)) {
    check('ρ c', (material.densityKgPerM3.value * material.specificHeatJPerKgK.value) / 1e6, [1, 4.2]);
  }
  const {
    heatDeflection045C,
    heatDeflection180C,
    glassTransitionC,
    conductivityThroughLayersWPerMK: through,
  } = material;
  if (heatDeflection045C && heatDeflection180C && heatDeflection180C.value > heatDeflection045C.value) {
    found.push('heat deflection at 1.8 MPa above that at 0.45 MPa');
  }
  // An amorphous polymer has nothing left to carry a load above its glass transition.
  if (material.morphology === 'amorphous' && heatDeflection045C && glassTransitionC) {
    if (heatDeflection045C.value > glassTransitionC.value + 5) found.push('heat deflection above the glass transition');
  }
  if (through && typeof through.value === 'number' && through.value > Math.min(...conductivities(material))) {
    found.push('conducts better across the layers than along them');
  }
  return found;
}

const materials = readMaterials();
const finishes = readFinishes();

describe('Materials', () => {
  it.each(materials)('$slug is plausible', (material) => {
    expect(faults(material)).toEqual([]);
  });

  it('have a softening value of some kind when they are polymers', () => {
    for (const material of materials.filter(({ group }) => group.endsWith('-polymer'))) {
      expect(material.morphology, material.slug).toBeDefined();
      const known = [material.heatDeflection180C, material.longTermServiceC].some((value) => value !== undefined);
      expect(known, material.slug).toBe(true);
      if (material.morphology === 'elastomer') expect(material.heatDeflection045C, material.slug).toBeUndefined();
    }
  });

  it('have both conductivities when they are printed', () => {
    for (const material of materials.filter(({ group }) => group === 'print-polymer')) {
      expect(material.conductivityThroughLayersWPerMK, material.slug).toBeDefined();
    }
  });

  it('give something to plot: tables against temperature for metals, a ceramic and polymers', () => {
    const tabled = materials.filter(({ conductivityWPerMK: { value } }) => typeof value !== 'number');
    expect(tabled.filter(({ group }) => group === 'metal').length).toBeGreaterThanOrEqual(5);
    expect(tabled.filter(({ group }) => group === 'print-polymer').length).toBeGreaterThanOrEqual(3);
    expect(tabled.some(({ slug }) => slug === 'alumina')).toBe(true);
  });

  it('rank as everyone knows: copper over aluminium over steel over stainless over polymer over still air', () => {
    const order = ['copper', 'aluminium-6060', 'mild-steel', 'stainless-304', 'pc', 'dry-joint-metal'];
    const k = order.map((slug) => Math.max(...conductivities(bySlug(materials, slug))));
    expect([...k].sort((a, b) => b - a)).toEqual(k);
  });
});

describe('The check of materials refuses', () => {
  const petg = bySlug(materials, 'petg');
  const copper = bySlug(materials, 'copper');
  const stiff = petg.densityKgPerM3;
  it.each<[string, Material]>([
    [
      'a metal a thousand times too conductive',
      { ...copper, conductivityWPerMK: { ...copper.conductivityWPerMK, value: 401000 } },
    ],
    ['a density in g/cm³', { ...petg, densityKgPerM3: { ...petg.densityKgPerM3, value: 1.27 } }],
    ['a specific heat in kJ', { ...petg, specificHeatJPerKgK: { ...petg.specificHeatJPerKgK, value: 1.2 } }],
    ['a deflection temperature that rises with load', { ...petg, heatDeflection180C: { ...stiff, value: 75 } }],
    [
      'an amorphous polymer stiff above its glass transition',
      { ...petg, heatDeflection045C: { ...stiff, value: 120 } },
    ],
  ])('%s', (_, material) => {
    expect(faults(material)).not.toEqual([]);
  });

  it.each<[string, Record<string, unknown>, string]>([
    ['a value without a source', { densityKgPerM3: { value: 1270, standing: 'from-memory' } }, 'densityKgPerM3'],
    [
      'a negative conductivity',
      { conductivityWPerMK: { ...petg.conductivityWPerMK, value: -0.2 } },
      'conductivityWPerMK',
    ],
    [
      'a table that runs backwards',
      {
        conductivityWPerMK: {
          ...petg.conductivityWPerMK,
          value: [
            [50, 0.2],
            [20, 0.2],
          ],
        },
      },
      'conductivityWPerMK',
    ],
    [
      'a standing that does not exist',
      { densityKgPerM3: { value: 1270, standing: 'certain', source: 'everyone knows' } },
      'densityKgPerM3',
    ],
    ['a field that nobody knows', { colour: 'white' }, ''],
  ])('%s', (_, change, field) => {
    const parsed = referenceFileSchemas.materials.safeParse([{ ...petg, ...change }]);
    expect(parsed.success).toBe(false);
    expect(JSON.stringify(parsed.error?.issues)).toContain(field);
  });

  it('two rows of one slug', () => {
    const parsed = referenceFileSchemas.materials.safeParse([petg, copper, petg]);
    expect(parsed.error?.issues.map(({ path }) => path)).toEqual([[2, 'slug']]);
  });
});

/** A bare bright metal radiates little; everything else a lot. */
function finishFaults(finish: Finish): string[] {
  const bright = /polished|bright|mill/.test(finish.slug);
  const bareMetal = bright || /galvanised|stainless/.test(finish.slug);
  const { value } = finish.emissivity;
  if (bareMetal && value > 0.3) return ['a bare metal of high emissivity'];
  if (!bareMetal && value < 0.6) return ['a coating or oxide of low emissivity'];
  return bright && value > 0.12 ? ['a bright metal that radiates like an oxidised one'] : [];
}

describe('Finishes', () => {
  it.each(finishes)('$slug is plausible', (finish) => {
    expect(finishFaults(finish)).toEqual([]);
  });

  it('refuse a polished metal of emissivity 0.9', () => {
    const polished = bySlug(finishes, 'aluminium-polished');
    expect(finishFaults({ ...polished, emissivity: { ...polished.emissivity, value: 0.9 } })).not.toEqual([]);
  });

  it('of black and white prints differ in the sun only', () => {
    const [white, black] = [bySlug(finishes, 'printed-white-matt'), bySlug(finishes, 'printed-black-matt')];
    expect(white.emissivity.value).toBe(black.emissivity.value);
    expect(black.solarAbsorptance.value - white.solarAbsorptance.value).toBeGreaterThan(0.5);
  });

  it('come from a file that is all finishes', () => {
    expect(referenceFileSchemas.finishes.safeParse(readData('materials.json')).success).toBe(false);
  });
});
