import { describe, expect, it } from 'vitest';
import { edges, faceSize, innerSize, outsideFacing, verticalExtent } from '../../../server/engine/assembly/geometry.js';
import { meanRadiantFactors } from '../../../server/engine/assembly/surfaces.js';

describe('The geometry of a box', () => {
  it('gives each face its two sizes', () => {
    expect(faceSize('top', [3, 2, 1])).toEqual([3, 2]);
    expect(faceSize('front', [3, 2, 1])).toEqual([3, 1]);
    expect(faceSize('left', [3, 2, 1])).toEqual([2, 1]);
  });

  it('takes the walls off the inside', () => {
    const walls = { left: 0.1, right: 0.2, front: 0.3, back: 0.4, bottom: 0.05, top: 0.06 };
    const [x, y, z] = innerSize([3, 2, 1], walls);
    expect(x).toBeCloseTo(2.7, 12);
    expect(y).toBeCloseTo(1.3, 12);
    expect(z).toBeCloseTo(0.89, 12);
  });

  it('has twelve edges whose lengths sum to four times the three sizes', () => {
    const all = edges([3, 2, 1]);
    expect(all).toHaveLength(12);
    expect(all.reduce((sum, edge) => sum + edge.lengthM, 0)).toBeCloseTo(24, 12);
    const topFront = all.find(({ a, b }) => [a, b].sort().join() === 'front,top');
    expect(topFront?.lengthM).toBe(3);
  });

  it('turns with the pose: laid on its back, the front looks up and the top sideways', () => {
    expect(outsideFacing('front', 'front')).toBe('up');
    expect(outsideFacing('back', 'front')).toBe('down');
    expect(outsideFacing('top', 'front')).toBe('sideways');
    expect(verticalExtent('top', 'front', faceSize('top', [3, 2, 1]))).toBe(2);
    expect(verticalExtent('left', 'top', faceSize('left', [3, 2, 1]))).toBe(1);
  });

  it('has mean radiant factors of 6/5 for a cube, whose faces see five sixths of the whole', () => {
    for (const factor of meanRadiantFactors([1, 1, 1, 1, 1, 1])) expect(factor).toBeCloseTo(1.2, 10);
  });
});
