import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FlowOut } from '../../../server/engine/network/link-laws.js';
import { kinds, lawOf, type KindName } from './link-kinds.js';

describe('Every flow law', () => {
  for (const name of Object.keys(kinds) as KindName[]) {
    it(`“${name}” has the derivatives of central differences, where the ends differ by more than 0.01 K`, () => {
      const law = lawOf(name);
      const at = (from: number, to: number): FlowOut => {
        const out = { flow: 0, byFrom: 0, byTo: 0, film: 0 };
        law.evaluate(from, to, out);
        return out;
      };
      const kelvin = fc.double({ min: 151, max: 1499, noNaN: true });
      const check = (a: number, b: number) => {
        fc.pre(Math.abs(a - b) > 0.01);
        const d = Math.min(1e-3, Math.abs(a - b) / 20);
        const here = at(a, b);
        const byFrom = (at(a + d, b).flow - at(a - d, b).flow) / (2 * d);
        const byTo = (at(a, b + d).flow - at(a, b - d).flow) / (2 * d);
        const scale = Math.abs(here.byFrom) + Math.abs(here.byTo) + 1e-9;
        expect(Math.abs(byFrom - here.byFrom) / scale).toBeLessThan(2e-4);
        expect(Math.abs(byTo - here.byTo) / scale).toBeLessThan(2e-4);
      };
      fc.assert(fc.property(kelvin, kelvin, check), { numRuns: 150, seed: 4320 });
      // Differences as small parts have them, of the warmer and of the colder surface.
      fc.assert(
        fc.property(kelvin, fc.double({ min: -2, max: 2, noNaN: true }), fc.boolean(), (a, logDifference, colder) => {
          const b = a + (colder ? 1 : -1) * 10 ** logDifference;
          fc.pre(b > 151 && b < 1499);
          check(a, b);
        }),
        { numRuns: 150, seed: 4321 },
      );
    });

    it(`“${name}” carries nothing between equal temperatures and turns its sign with the difference`, () => {
      const law = lawOf(name);
      for (const kelvin of [150, 320, 1000, 1499]) {
        const out = { flow: NaN, byFrom: NaN, byTo: NaN, film: 0 };
        law.evaluate(kelvin, kelvin, out);
        expect(Math.abs(out.flow)).toBe(0);
        expect(Number.isFinite(out.byFrom) && Number.isFinite(out.byTo) && Number.isFinite(out.film)).toBe(true);
        // Finite slopes down to the last digit of the difference.
        for (const tiny of [1e-3, 1e-8, 1e-12]) {
          law.evaluate(kelvin + tiny, kelvin, out);
          expect(out.flow).toBeGreaterThanOrEqual(0);
          expect(out.byFrom).toBeGreaterThanOrEqual(0);
          expect(out.byTo).toBeLessThanOrEqual(0);
          law.evaluate(kelvin - tiny, kelvin, out);
          expect(out.flow).toBeLessThanOrEqual(0);
          expect(out.byFrom).toBeGreaterThanOrEqual(0);
          expect(out.byTo).toBeLessThanOrEqual(0);
        }
        law.evaluate(kelvin + 10, kelvin, out);
        expect(out.flow).toBeGreaterThan(0);
        law.evaluate(kelvin - 10, kelvin, out);
        expect(out.flow).toBeLessThan(0);
      }
    });

    // With k at the mean of both temperatures, a table that falls makes the flow fall where the ends differ by hundreds of kelvins: no such promise.
    if (name === 'conductionByTable') continue;

    it(`“${name}” carries more the warmer its beginning and the colder its end`, () => {
      const law = lawOf(name);
      const out = { flow: 0, byFrom: 0, byTo: 0, film: 0 };
      const kelvin = fc.double({ min: 200, max: 1200, noNaN: true });
      fc.assert(
        fc.property(kelvin, kelvin, (a, b) => {
          fc.pre(Math.abs(a - b) > 0.01);
          law.evaluate(a, b, out);
          expect(out.byFrom).toBeGreaterThan(0);
          expect(out.byTo).toBeLessThan(0);
        }),
        { numRuns: 300, seed: 4322 },
      );
    });
  }
});
