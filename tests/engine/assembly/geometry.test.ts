import { describe, expect, it } from 'vitest';
import { edges, edgeTowards, faceSize, innerSize } from '../../../server/engine/assembly/geometry.js';
import { dot, normalOf, slopeExtents, sunDirection, tiltOf, upward } from '../../../server/engine/assembly/pose.js';
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
    const up = upward({ up: 'front', tiltDeg: 0, towards: null }, '/pose');
    expect(tiltOf(normalOf('front'), up)).toBeCloseTo(0, 9);
    expect(tiltOf(normalOf('back'), up)).toBeCloseTo(180, 9);
    expect(tiltOf(normalOf('top'), up)).toBeCloseTo(90, 9);
    expect(slopeExtents('top', up, faceSize('top', [3, 2, 1]))).toEqual([2, 3]);
    expect(slopeExtents('left', upward({ up: 'top', tiltDeg: 0, towards: null }, ''), [2, 1])).toEqual([1, 2]);
  });

  it('leans: at 30° towards the front, the lid looks 30° off and the front 120° from straight up', () => {
    const up = upward({ up: 'top', tiltDeg: 30, towards: 'front' }, '/pose');
    expect(tiltOf(normalOf('top'), up)).toBeCloseTo(30, 9);
    expect(tiltOf(normalOf('front'), up)).toBeCloseTo(120, 9);
    expect(tiltOf(normalOf('back'), up)).toBeCloseTo(60, 9);
    expect(tiltOf(normalOf('left'), up)).toBeCloseTo(90, 9);
    expect(() => upward({ up: 'top', tiltDeg: 30, towards: 'bottom' }, '/pose')).toThrow('beside');
  });

  it('has the sun at noon over the lid, in the morning before the front, and to the right at 90°', () => {
    const up = upward({ up: 'top', tiltDeg: 0, towards: null }, '/pose');
    const lit = (elevationDeg: number, azimuthDeg: number, face: 'top' | 'front' | 'right' | 'left') =>
      dot(sunDirection({ elevationDeg, azimuthDeg }, up), normalOf(face));
    expect(lit(90, 0, 'top')).toBeCloseTo(1, 9);
    expect(lit(0, 0, 'front')).toBeCloseTo(1, 9);
    expect(lit(0, 90, 'right')).toBeCloseTo(1, 9);
    expect(lit(30, 0, 'top')).toBeCloseTo(0.5, 9);
    expect(lit(0, 90, 'left')).toBeCloseTo(-1, 9);
  });

  it('names the edge at which two faces meet, alike from both', () => {
    expect(edgeTowards('bottom', 'left')).toBe('x0');
    expect(edgeTowards('left', 'bottom')).toBe('y0');
    expect(edgeTowards('front', 'top')).toBe('y1');
    expect(edgeTowards('top', 'back')).toBe('y1');
  });

  it('has mean radiant factors of 6/5 for a cube, whose faces see five sixths of the whole', () => {
    for (const factor of meanRadiantFactors([1, 1, 1, 1, 1, 1])) expect(factor).toBeCloseTo(1.2, 10);
  });
});
