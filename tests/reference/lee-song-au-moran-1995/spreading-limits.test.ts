/**
 * S. Lee, S. Song, V. Au, K. P. Moran, “Constriction/spreading resistance model for electronics packaging”,
 * ASME/JSME Thermal Engineering Conference 4 (1995) 199–206. Formula from memory; the limits below are exact.
 */
import { describe, expect, it } from 'vitest';
import { spreadingLeeSongAuMoran } from '../../../server/engine/conduction/spreading.js';

const k = 160;

function thickBody(a: number) {
  // A body 1000 times wider and as thick: half-space for practical purposes.
  return spreadingLeeSongAuMoran({
    sourceArea: Math.PI * a * a,
    plateArea: Math.PI * (1000 * a) ** 2,
    thickness: 1000 * a,
    conductivity: k,
    filmCoefficient: 1e5,
  });
}

describe('The closed form of Lee, Song, Au and Moran', () => {
  it('gives 1/(π k a) at the middle of a uniform disc on a thick body (Carslaw & Jaeger’s exact peak)', () => {
    expect(thickBody(0.01).peak * Math.PI * k * 0.01).toBeCloseTo(1, 2);
  });

  it('gives 0.2821/(k a) for the mean, its own limit, within 4.5 % of the exact 8/(3 π² k a)', () => {
    const mean = thickBody(0.01).mean * k * 0.01;
    expect(mean).toBeCloseTo(0.2821, 2);
    expect(Math.abs(mean / (8 / (3 * Math.PI ** 2)) - 1)).toBeLessThan(0.045);
  });

  it('gives nothing for a source as large as the plate', () => {
    const plate = spreadingLeeSongAuMoran({
      sourceArea: 0.01,
      plateArea: 0.01,
      thickness: 0.002,
      conductivity: k,
      filmCoefficient: 10,
    });
    expect(plate.peak).toBe(0);
    expect(plate.mean).toBe(0);
  });

  it('never passes the answer without any spreading: a plate on most of a thin printed lid', () => {
    const lid = { sourceArea: 0.0096, plateArea: 0.0139, thickness: 0.0024, conductivity: 0.2, filmCoefficient: 10 };
    const bound = (0.0024 / 0.2 + 1 / 10) * (1 / 0.0096 - 1 / 0.0139);
    expect(spreadingLeeSongAuMoran(lid).peak).toBeLessThanOrEqual(bound);
    expect(spreadingLeeSongAuMoran(lid).mean).toBeLessThanOrEqual(bound);
  });

  it('has its peak above its mean, and both fall as the plate conducts better', () => {
    const at = (conductivity: number) =>
      spreadingLeeSongAuMoran({
        sourceArea: 4e-4,
        plateArea: 6e-3,
        thickness: 0.002,
        conductivity,
        filmCoefficient: 10,
      });
    expect(at(0.2).peak).toBeGreaterThan(at(0.2).mean);
    expect(at(160).peak).toBeLessThan(at(0.2).peak / 100);
  });

  it('passes the excess to the far side of a thin good conductor, and hides it behind a thick poor one', () => {
    const share = (conductivity: number, thickness: number) =>
      spreadingLeeSongAuMoran({ sourceArea: 4e-4, plateArea: 6e-3, thickness, conductivity, filmCoefficient: 10 })
        .farSideShare;
    expect(share(160, 0.001)).toBeGreaterThan(0.97);
    expect(share(0.2, 0.02)).toBeLessThan(0.25);
  });
});
