/**
 * A fact of the trade: a closed cabinet of painted sheet steel loses about 5.5 W for each m² and kelvin between its inside air and the
 * room, over the area A = 1.8 H (W + D) + 1.4 W D of a free-standing one (the area after IEC 60890, from memory; the coefficient is
 * common practice, no source).
 */
import { describe, expect, it } from 'vitest';
import { estimateAssembly } from '../../../server/engine/answers/estimate.js';
import { bySlug, readFinishes, readMaterials, readPartTypes, readRuleSets } from '../../data/files.js';
import { plainBox } from './open-surfaces.js';

const heat = bySlug(readPartTypes(), 'driver-choke');
const steel = { inline: bySlug(readMaterials(), 'mild-steel') };
const paint = { inline: bySlug(readFinishes(), 'powder-coat-grey') };

// Assumed: 1.5 mm walls, all six faces free, a painted mounting plate 20 mm off the back with one block of 0.2 × 0.2 × 0.1 m on it.
describe('A painted steel cabinet', () => {
  it.each<[number, number, number, number]>([
    [0.4, 0.2, 0.6, 80],
    [0.6, 0.25, 0.6, 120],
    [0.8, 0.3, 1.0, 250],
  ])('of %f × %f × %f m with %d W inside loses 4.4 to 6.6 W/(m² K)', (width, depth, height, heatW) => {
    const block = {
      ...heat,
      footprintM: { ...heat.footprintM, value: [0.2, 0.2] as [number, number] },
      heightM: { ...heat.heightM, value: 0.1 },
      thermal: { ...heat.thermal, internalKPerW: { ...heat.thermal.internalKPerW, value: 0.05 } },
    };
    const cabinet = plainBox(
      {
        outerM: [width, depth, height],
        wallM: 0.0015,
        material: 'mild-steel',
        finish: 'powder-coat-grey',
        airC: 25,
      },
      {
        carriers: [
          {
            id: 'plate',
            kind: 'board',
            sizeM: [0.85 * width, 0.85 * height],
            layers: [{ material: steel, thicknessM: 0.002 }],
            finish: paint,
            standOffM: 0.02,
            on: { face: 'back' },
          },
        ],
        parts: [{ id: 'block', type: { inline: block }, mount: { on: 'plate', stack: [] }, heatW }],
      },
    );
    const { nodes } = estimateAssembly(cabinet, bySlug(readRuleSets(), 'plain-workshop'));
    const insideC = nodes.find(({ id }) => id === 'air.inside')?.temperatureC ?? NaN;
    const areaM2 = 1.8 * height * (width + depth) + 1.4 * width * depth;
    const coefficient = heatW / (areaM2 * (insideC - 25));
    expect(coefficient).toBeGreaterThan(4.4);
    expect(coefficient).toBeLessThan(6.6);
  });
});
