/**
 * Y. S. Muzychka, J. R. Culham, M. M. Yovanovich, “Thermal spreading resistance of eccentric heat sources on rectangular flux
 * channels”, J. Electronic Packaging 125 (2003) 178–185. Coefficients from memory; what they are checked against is exact.
 */
import { create, all, type MathJsInstance } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { complementaryError, errorIntegral } from '../../../server/engine/conduction/error-function.js';
import { spreadingLeeSongAuMoran } from '../../../server/engine/conduction/spreading.js';
import {
  excessAtPoint,
  excessOfSources,
  excessOnRectangle,
  spreadingMuzychkaCulhamYovanovich,
  type CooledPlate,
  type Rectangle,
} from '../../../server/engine/conduction/spreading-series.js';

if (!all) throw new Error('mathjs has no functions');
const math: MathJsInstance = create(all);

/** An eccentric source on a plate as small lamps have them. */
const plate: CooledPlate = { lengthX: 0.1, lengthY: 0.06, thickness: 0.003, conductivity: 20, filmCoefficient: 50 };
const source: Rectangle = { x: 0.02, y: 0.02, lengthX: 0.01, lengthY: 0.02 };

/** A square source of side 1 in the middle of a cube. */
function onCube(side: number) {
  const cube = { lengthX: side, lengthY: side, thickness: side, conductivity: 1, filmCoefficient: 1e6 };
  return spreadingMuzychkaCulhamYovanovich(cube, { x: side / 2, y: side / 2, lengthX: 1, lengthY: 1 });
}

/** The limit of an endless cube: the first correction goes with 1/side. */
function onHalfSpace(of: 'mean' | 'centre'): number {
  return 2 * onCube(60)[of] - onCube(30)[of];
}

/** The mean by the double series as it is printed, each index to `last`. */
function printedMean(last: number): number {
  const { lengthX: a, lengthY: b, thickness: t, conductivity: k } = plate;
  const { x, y, lengthX: c, lengthY: d } = source;
  const h = plate.filmCoefficient / k;
  const phi = (z: number) =>
    (z * Math.sinh(z * t) + h * Math.cosh(z * t)) / (z * Math.cosh(z * t) + h * Math.sinh(z * t));
  // Beyond 700 sinh and cosh leave the range of numbers, and φ is 1.
  const safe = (z: number) => (z * t > 300 ? 1 : phi(z));
  let sum = t / k / (a * b) + 1 / (plate.filmCoefficient * a * b);
  for (let m = 1; m <= last; m++) {
    const l = (m * Math.PI) / a;
    const am = (4 * Math.cos(l * x) * Math.sin((l * c) / 2)) / (a * b * c * k * l * l * safe(l));
    sum += (2 * am * Math.cos(l * x) * Math.sin((l * c) / 2)) / (l * c);
  }
  for (let n = 1; n <= last; n++) {
    const e = (n * Math.PI) / b;
    const an = (4 * Math.cos(e * y) * Math.sin((e * d) / 2)) / (a * b * d * k * e * e * safe(e));
    sum += (2 * an * Math.cos(e * y) * Math.sin((e * d) / 2)) / (e * d);
  }
  for (let m = 1; m <= last; m++) {
    for (let n = 1; n <= last; n++) {
      const l = (m * Math.PI) / a;
      const e = (n * Math.PI) / b;
      const z = Math.hypot(l, e);
      const shape = Math.cos(l * x) * Math.sin((l * c) / 2) * Math.cos(e * y) * Math.sin((e * d) / 2);
      const amn = (16 * shape) / (a * b * c * d * k * z * l * e * safe(z));
      sum += (4 * amn * shape) / (l * c * e * d);
    }
  }
  return sum;
}

describe('The series of Muzychka, Culham and Yovanovich', () => {
  // Exact for an even flux on a half-space (the potential of a square plate of even charge): centre 2 ln(1 + √2)/π, mean
  // (2/π)(ln(1 + √2) + (1 − √2)/3).
  it('gives 0.4732/(k √A) for the mean of a small square source on a thick body', () => {
    const exact = (2 / Math.PI) * (Math.log(1 + Math.SQRT2) + (1 - Math.SQRT2) / 3);
    expect(exact).toBeCloseTo(0.4732, 4);
    expect(Math.abs(onHalfSpace('mean') / exact - 1)).toBeLessThan(1e-4);
  });

  it('gives 0.5611/(k √A) for its centre', () => {
    const exact = (2 / Math.PI) * Math.log(1 + Math.SQRT2);
    expect(exact).toBeCloseTo(0.5611, 4);
    expect(Math.abs(onHalfSpace('centre') / exact - 1)).toBeLessThan(1e-4);
  });

  it('spreads nothing from a source as large as the plate: one-dimensional', () => {
    const answer = spreadingMuzychkaCulhamYovanovich(plate, { x: 0.05, y: 0.03, lengthX: 0.1, lengthY: 0.06 });
    expect(answer.oneDimensional).toBeCloseTo((0.003 / 20 + 1 / 50) / 0.006, 12);
    expect(answer.mean).toBeCloseTo(0, 9);
    expect(answer.centre).toBeCloseTo(0, 9);
  });

  it('is what the printed double series converges to', () => {
    const mean = excessOnRectangle(plate, source, source);
    const errors = [100, 200, 400, 800].map((last) => mean - printedMean(last));
    // All terms of a source’s own mean are positive: the partial sums rise to it, about as 1/last².
    errors.slice(1).forEach((error, i) => {
      expect(error).toBeGreaterThan(0);
      expect(error).toBeLessThan((errors[i] as number) / 2.5);
    });
    expect(errors[3]).toBeLessThan(3e-6 * mean);
  });

  it('does not depend on where its sum is split', () => {
    const coarse = excessAtPoint(plate, source, source.x, source.y, { nearShare: 1 / 8 });
    const fine = excessAtPoint(plate, source, source.x, source.y, { nearShare: 1 / 30 });
    expect(Math.abs(coarse / fine - 1)).toBeLessThan(1e-9);
    // On the source’s edge and outside it, too.
    for (const [x, y] of [
      [0.025, 0.02],
      [0.0251, 0.0301],
      [0.09, 0.05],
    ] as const) {
      const near = excessAtPoint(plate, source, x, y, { nearShare: 1 / 12 });
      expect(Math.abs(near / excessAtPoint(plate, source, x, y, { nearShare: 1 / 30 }) - 1)).toBeLessThan(1e-6);
    }
  });

  it('has at a corner of the plate what the mirrored source has in the middle of four plates', () => {
    const corner = { x: 0.01, y: 0.006, lengthX: 0.02, lengthY: 0.012 };
    const four = { ...plate, lengthX: 0.2, lengthY: 0.12 };
    const middle = { x: 0.1, y: 0.06, lengthX: 0.04, lengthY: 0.024 };
    expect(excessOnRectangle(plate, corner, corner)).toBeCloseTo(4 * excessOnRectangle(four, middle, middle), 7);
    expect(excessAtPoint(plate, corner, 0, 0)).toBeCloseTo(4 * excessAtPoint(four, middle, 0.1, 0.06), 7);
  });

  it('is reciprocal: a watt in one rectangle warms another as much as a watt there warms the first', () => {
    const other = { x: 0.07, y: 0.05, lengthX: 0.03, lengthY: 0.008 };
    const there = excessOnRectangle(plate, source, other);
    expect(there).toBeGreaterThan(1);
    expect(excessOnRectangle(plate, other, source)).toBeCloseTo(there, 9);
  });

  it('superposes: two halves side by side are the whole', () => {
    const halves = [
      { ...source, x: source.x - 0.0025, lengthX: 0.005 },
      { ...source, x: source.x + 0.0025, lengthX: 0.005 },
    ];
    const [left, right] = excessOfSources(plate, halves, [1, 1]);
    const [whole] = excessOfSources(plate, [source], [2]);
    expect(((left?.mean ?? 0) + (right?.mean ?? 0)) / 2).toBeCloseTo(whole?.mean ?? NaN, 7);
    expect(() => excessOfSources(plate, halves, [1])).toThrow(RangeError);
  });

  it('warms the side of an eccentric source that is nearer to the plate’s edge', () => {
    expect(excessAtPoint(plate, source, 0.016, 0.02)).toBeGreaterThan(excessAtPoint(plate, source, 0.024, 0.02));
  });
});

describe('The closed form of Lee, Song, Au and Moran', () => {
  const cases = [0.1, 0.2, 0.4, 0.6].flatMap((side) =>
    [0.02, 0.1, 0.4].flatMap((thickness) => [0.01, 0.3, 10].map((biot) => [side, thickness, biot] as const)),
  );

  // The form is one of circles, and its own approximation. Measured here: within 10 % of the exact spreading of squares where the
  // source is small and the film weak; up to 14 % (mean) and 20 % (centre) elsewhere, where less of the whole is spreading.
  it.each(cases)('a square source of side %f, thickness %f, h a/k = %f against the series', (side, t, biot) => {
    const square = { lengthX: 1, lengthY: 1, thickness: t, conductivity: 1, filmCoefficient: biot };
    const series = spreadingMuzychkaCulhamYovanovich(square, { x: 0.5, y: 0.5, lengthX: side, lengthY: side });
    const closed = spreadingLeeSongAuMoran({
      sourceArea: side * side,
      plateArea: 1,
      thickness: t,
      conductivity: 1,
      filmCoefficient: biot,
    });
    const near = side <= 0.4 && biot <= 0.3;
    expect(Math.abs(closed.mean / series.mean - 1)).toBeLessThan(near ? 0.1 : 0.14);
    expect(Math.abs(closed.peak / series.centre - 1)).toBeLessThan(near ? 0.1 : 0.2);
  });
});

describe('The error function', () => {
  it('agrees with mathjs, whose digits are some 16', () => {
    for (const x of [-3, -1.2, -0.3, 0, 1e-6, 0.1, 0.7, 1.5, 1.99, 2, 2.5]) {
      expect(complementaryError(x)).toBeCloseTo(1 - math.erf(x), 13);
    }
  });

  it('has its tabulated tail (Abramowitz & Stegun, table 7.3, from memory)', () => {
    expect(complementaryError(2) / 4.677734981e-3 - 1).toBeCloseTo(0, 8);
    expect(complementaryError(3) / 2.209049699858544e-5 - 1).toBeCloseTo(0, 8);
    expect(complementaryError(4) / 1.541725790028e-8 - 1).toBeCloseTo(0, 8);
    expect(complementaryError(40)).toBe(0);
    expect(complementaryError(-40)).toBe(2);
  });

  it('has erf as the slope of its integral', () => {
    for (const u of [-2.3, -0.4, 0.2, 1.1, 3]) {
      const slope = (errorIntegral(u + 1e-5) - errorIntegral(u - 1e-5)) / 2e-5;
      expect(slope).toBeCloseTo(1 - complementaryError(u), 8);
    }
    expect(errorIntegral(0)).toBeCloseTo(1 / Math.sqrt(Math.PI), 14);
  });
});
