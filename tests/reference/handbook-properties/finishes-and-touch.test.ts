/**
 * Finishes against emissivities that they were not taken from, and touch limits against a second standard. All from memory, to be
 * verified: VDI Heat Atlas, part K1 (emissivities); IEC 62368-1:2014, Table 38 (touch temperature limits, TS1).
 */
import { describe, expect, it } from 'vitest';
import type { ContactTime, touchSurfaces } from '../../../shared/schemas/rule-set.js';
import { bySlug, readFinishes, readRuleSets } from '../../data/files.js';

const finishes = readFinishes();

describe('Emissivity lies within the span of handbooks', () => {
  it.each([
    ['aluminium-polished', 0.03, 0.06],
    ['aluminium-mill', 0.05, 0.12],
    ['aluminium-anodised-black', 0.8, 0.92],
    ['paint-white', 0.85, 0.95],
    ['paint-black', 0.88, 0.98],
    ['copper-bright', 0.02, 0.07],
    ['copper-oxidised', 0.6, 0.8],
    ['steel-galvanised', 0.1, 0.3],
    ['glass-clear', 0.88, 0.95],
    ['wood', 0.85, 0.94],
  ])('%s: %f to %f', (slug, low, high) => {
    const { value } = bySlug(finishes, slug).emissivity;
    expect(value).toBeGreaterThanOrEqual(low);
    expect(value).toBeLessThanOrEqual(high);
  });
});

describe('Touch limits are no laxer than the equipment standard’s, and not far below', () => {
  const { touchLimits } = bySlug(readRuleSets(), 'plain-workshop');
  it.each<[(typeof touchSurfaces)[number], ContactTime, number]>([
    ['bare-metal', '1 s', 70],
    ['bare-metal', '10 s', 60],
    ['bare-metal', '1 min', 51],
    ['bare-metal', '10 min', 48],
    ['ceramic-glass', '1 s', 85],
    ['ceramic-glass', '10 s', 71],
    ['ceramic-glass', '1 min', 56],
    ['plastic', '1 s', 94],
    ['plastic', '10 s', 77],
    ['plastic', '1 min', 60],
    ['plastic', '10 min', 48],
    ['plastic', '8 h', 43],
  ])('%s over %s: %f °C', (surface, contactTime, limit) => {
    const own = touchLimits.find((row) => row.surface === surface && row.contactTime === contactTime)?.maxC.value;
    expect(own).toBeLessThanOrEqual(limit);
    expect(own).toBeGreaterThan(limit - 10);
  });
});
