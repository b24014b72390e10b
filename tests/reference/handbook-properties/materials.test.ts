/**
 * The reference values against figures that they were not taken from. All handbook numbers here are from memory, to be verified:
 * Incropera & DeWitt, Fundamentals of Heat and Mass Transfer, Table A.1 and A.2, column of thermal diffusivity;
 * ISO 10456:2007, Table 3 (design values); the CRC Handbook of Chemistry and Physics (electrical resistivity, atomic weights).
 */
import { describe, expect, it } from 'vitest';
import { lookUp } from '../../../server/engine/tables.js';
import { bySlug, readMaterials } from '../../data/files.js';

const materials = readMaterials();
const conductivity = (slug: string, celsius: number) =>
  lookUp(bySlug(materials, slug).conductivityWPerMK.value, celsius);

describe('Thermal diffusivity at 300 K is the handbook’s', () => {
  it.each([
    ['copper', 117],
    ['aluminium-pure', 97.1],
    ['brass', 33.9],
    ['stainless-304', 3.95],
    ['alumina', 11.9],
  ])('%s: %f mm²/s', (slug, diffusivity) => {
    const { densityKgPerM3, specificHeatJPerKgK } = bySlug(materials, slug);
    const own = (conductivity(slug, 26.85) / (densityKgPerM3.value * specificHeatJPerKgK.value)) * 1e6;
    // Half of the last printed digit of k, ρ and c_p together.
    expect(Math.abs(own / diffusivity - 1)).toBeLessThan(0.01);
  });
});

describe('Conductivity at room temperature is near the standard’s design value', () => {
  it.each([
    ['copper', 380, 0.1],
    ['brass', 120, 0.15],
    ['mild-steel', 50, 0.1],
    ['stainless-304', 17, 0.15],
    // One value for all alloys stands in the standard; extrusion and wrought alloys lie on either side.
    ['aluminium-6061', 160, 0.1],
    ['aluminium-6060', 160, 0.3],
    ['pc', 0.2, 0.1],
    ['pa12', 0.25, 0.1],
    ['pmma-moulded', 0.18, 0.1],
  ])('%s: %f W/(m K) within a share of %f', (slug, value, share) => {
    expect(Math.abs(conductivity(slug, 20) / value - 1)).toBeLessThan(share);
  });
});

describe('Pure metals obey the laws of physics', () => {
  it.each([
    ['copper', 1.7e-8],
    ['aluminium-pure', 2.7e-8],
  ])('%s: Lorenz number near 2.44e-8 W Ω/K² at 300 K (Wiedemann & Franz; resistivity %f Ω m)', (slug, resistivity) => {
    const lorenz = (conductivity(slug, 26.85) * resistivity) / 300;
    expect(Math.abs(lorenz / 2.44e-8 - 1)).toBeLessThan(0.15);
  });

  it.each([
    ['copper', 0.06355],
    ['aluminium-pure', 0.02698],
    ['mild-steel', 0.05585],
  ])('%s: specific heat near 3 R/M (Dulong & Petit; %f kg/mol)', (slug, molarMass) => {
    const own = bySlug(materials, slug).specificHeatJPerKgK.value;
    expect(Math.abs(own / ((3 * 8.314) / molarMass) - 1)).toBeLessThan(0.05);
  });
});
