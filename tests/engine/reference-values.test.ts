import { describe, expect, it } from 'vitest';
import { estimateAssembly } from '../../server/engine/answers/estimate.js';
import { assemblyDocumentSchema, type AssemblyDocumentInput } from '../../shared/schemas/assembly.js';
import type { PartType } from '../../shared/schemas/part-type.js';
import { bySlug, readFinishes, readMaterials, readPartTypes, readRuleSets } from '../data/files.js';
import { heater, metalWall, sixWalls } from './fixtures.js';

const rules = bySlug(readRuleSets(), 'plain-workshop');
const aluminium = { inline: bySlug(readMaterials(), 'aluminium-6060') };

type WallInput = NonNullable<AssemblyDocumentInput['housing']>['faces']['top'];

function boxWith(type: PartType, wall: WallInput = metalWall) {
  const fed = type.electrical.kind !== 'heat';
  return assemblyDocumentSchema.parse({
    format: 'trimwick-assembly/1',
    name: 'One part in a box',
    housing: { outerM: [0.2, 0.15, 0.1], touched: '10 s', faces: sixWalls(wall) },
    carriers: [
      {
        id: 'plate',
        kind: 'plate',
        sizeM: [0.12, 0.1],
        thicknessM: 0.002,
        material: aluminium,
        finish: null,
        on: { face: 'bottom', stack: null },
      },
    ],
    parts: [
      {
        id: 'part',
        type: { inline: type },
        mount: { on: 'plate', stack: null },
        supply: fed ? 'drive' : null,
        heatW: fed ? null : 1,
      },
    ],
    supplies: fed ? [{ id: 'drive', currentA: 0.05 }] : [],
    scenarios: [{ id: 'room', name: 'Room', airC: 25 }],
  });
}

describe('The engine takes every reference value', () => {
  it.each(readPartTypes())('part type $slug: all its ratings and limits are checked', (type) => {
    const estimate = estimateAssembly(boxWith(type), rules);
    const codes = estimate.warnings.map(({ code }) => code);
    expect(codes).not.toContain('rating-not-checked');
    expect(codes).not.toContain('derating-not-checked');
    const own = estimate.limits.filter(({ part }) => part === 'part' || part === undefined);
    expect(own.length).toBeGreaterThanOrEqual(type.ratings.length + type.temperatureLimits.length);
    // At a twentieth of an ampere, or one watt, nothing of these classes is near its limit.
    expect(estimate.limits.filter(({ state }) => state === 'exceeds')).toEqual([]);
  });

  it.each(
    readMaterials().filter(({ group }) => ['print-polymer', 'moulding-polymer', 'metal', 'wood'].includes(group)),
  )('material $slug: as a wall', (material) => {
    const wall: WallInput = { ...metalWall, material: { inline: material }, loadState: 'free' };
    const { nodes, warnings } = estimateAssembly(boxWith(heater, wall), rules);
    expect(nodes.every(({ temperatureC }) => temperatureC >= 25 - 1e-9 && temperatureC < 80)).toBe(true);
    expect(warnings.map(({ code }) => code)).not.toContain('no-softening-value');
  });

  it('finishes: the lower the emissivity outside, the hotter the box', () => {
    const inside = readFinishes()
      .map((finish) => ({
        emissivity: finish.emissivity.value,
        airC:
          estimateAssembly(boxWith(heater, { ...metalWall, finishOutside: { inline: finish } }), rules).nodes.find(
            ({ id }) => id === 'air.inside',
          )?.temperatureC ?? NaN,
      }))
      .sort((a, b) => a.emissivity - b.emissivity)
      .map(({ airC }) => airC);
    inside.slice(1).forEach((airC, i) => {
      expect(airC).toBeLessThanOrEqual((inside[i] ?? NaN) + 1e-6);
    });
    expect((inside[0] ?? NaN) - (inside.at(-1) ?? NaN)).toBeGreaterThan(0.5);
  });
});
