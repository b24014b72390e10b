/** A fact of the trade; common practice, no source. */
import { describe, expect, it } from 'vitest';
import { findCeiling } from '../../../server/engine/answers/ceiling.js';
import { estimateAssembly } from '../../../server/engine/answers/estimate.js';
import { networkDocumentSchema } from '../../../shared/schemas/network.js';
import { bySlug, readPartTypes, readRuleSets } from '../../data/files.js';
import { openSurface, pasteBond, plainBox } from './open-surfaces.js';

const array = bySlug(readPartTypes(), 'led-array-10w-9v');
const rules = bySlug(readRuleSets(), 'plain-workshop');
const { electrical } = array;
if (electrical.kind !== 'led') throw new Error('the low-cost array is no LED');

describe('A low-cost 10 W LED array is run at 5 to 7 W', () => {
  // Assumed: bare sheet, upright, both sides free, the light leaves; 0.1 mm of paste; junction 15 K below its limit.
  it.each([
    [0.08, 0.06, 25],
    [0.08, 0.06, 30],
    [0.08, 0.06, 40],
    [0.1, 0.07, 40],
  ])('on a bare aluminium sheet of %f × %f m in a room of %d °C, by its temperature', (widthM, heightM, roomC) => {
    const document = networkDocumentSchema.parse({
      format: 'trimwick-network/1',
      nodes: [
        { id: 'room', fixedC: roomC },
        { id: 'sheet' },
        {
          id: 'junction',
          source: {
            kind: 'led',
            supply: 'drive',
            voltageV: electrical.voltageV.value,
            atCurrentA: electrical.atCurrentA.value,
            atC: electrical.atC.value,
            differentialOhm: electrical.differentialOhm.value,
            voltagePerK: electrical.voltagePerK.value,
            efficiency: electrical.efficiency.value,
            efficiencyPerK: electrical.efficiencyPerK.value,
            efficiencyPerA: electrical.efficiencyPerA.value,
          },
        },
      ],
      supplies: [{ id: 'drive', currentA: 0.5 }],
      links: [
        {
          kind: 'resistance',
          from: 'junction',
          to: 'sheet',
          resistanceKPerW: array.thermal.internalKPerW.value + 0.0001 / (0.8 * 0.02 ** 2),
        },
        ...openSurface({
          node: 'sheet',
          name: 'sheet',
          shape: 'vertical-plate',
          areaM2: 2 * widthM * heightM,
          lengthM: heightM,
          emissivity: 0.09,
        }),
      ],
      limits: [{ id: 'junction', node: 'junction', maxC: (array.temperatureLimits[0]?.maxC.value ?? NaN) - 15 }],
    });
    const ceiling = findCeiling(document, { supply: 'drive' });
    expect(ceiling.status).toBe('found');
    expect(ceiling.electricalW).toBeGreaterThan(4.5);
    expect(ceiling.electricalW).toBeLessThan(7.5);
  });

  // Assumed: box of 100 × 60 × 30 mm, 2 mm walls, anodised, 15 % of the light kept inside. Here the rule set’s stress ratio binds.
  it.each([25, 40])('in a small aluminium box in a room of %d °C, by the rules', (airC) => {
    const box = plainBox(
      {
        outerM: [0.1, 0.06, 0.03],
        wallM: 0.002,
        material: 'aluminium-6060',
        finish: 'aluminium-anodised-natural',
        airC,
      },
      {
        parts: [
          {
            id: 'array',
            type: { inline: array },
            mount: { on: 'face.bottom', stack: pasteBond },
            supply: 'drive',
            lightKeptShare: 0.15,
          },
        ],
        supplies: [{ id: 'drive', currentA: 0.6 }],
      },
    );
    const { guardedCeiling, ceiling } = estimateAssembly(box, rules);
    expect(guardedCeiling.electricalW).toBeGreaterThan(5);
    expect(guardedCeiling.electricalW).toBeLessThan(7.1);
    // Its class is what it takes at its rating, not what it is run at.
    expect(ceiling.electricalW).toBeGreaterThan(guardedCeiling.electricalW * 1.2);
  });
});
