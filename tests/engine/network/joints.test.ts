import { describe, expect, it } from 'vitest';
import { kinds, lawOf, type KindName } from './link-kinds.js';

/** Temperatures of air that the laws are swept at [K]. */
const airs = [150, 293.15, 700, 1400];
/** Differences of the sweep [K], log-spaced. */
const steps = 240;

/** Slope dq/dT of the surface at a difference. */
function sweep(name: KindName, air: number, sign: 1 | -1) {
  const law = lawOf(name);
  const out = { flow: 0, byFrom: 0, byTo: 0, film: 0 };
  const at = (logDifference: number) => {
    law.evaluate(air + sign * Math.exp(logDifference), air, out);
    return { flow: out.flow, slope: out.byFrom };
  };
  const last = sign > 0 ? 1500 - air : air - 150;
  return { at, first: Math.log(0.01), last: Math.log(last) };
}

/**
 * The steepest change of a function between neighbouring points of the sweep, followed by halving: a jump stays, a mere rise goes to
 * nothing. Returns what is left after 28 halvings, as a share of the greatest value of the sweep.
 */
function greatestJump(f: (x: number) => number, first: number, last: number): number {
  const x = Array.from({ length: steps + 1 }, (_, i) => first + ((last - first) * i) / steps);
  const values = x.map(f);
  const scale = Math.max(...values.map(Math.abs));
  const rises = values.slice(1).map((value, i) => Math.abs(value - (values[i] as number)));
  // The eight steepest places: a small jump may hide beside an honest rise.
  const order = rises.map((_, i) => i).sort((a, b) => (rises[b] as number) - (rises[a] as number));
  let worst = 0;
  for (const i of order) {
    let low = x[i] as number;
    let high = x[i + 1] as number;
    for (let n = 0; n < 28; n++) {
      const middle = (low + high) / 2;
      const value = f(middle);
      if (Math.abs(value - f(low)) > Math.abs(f(high) - value)) high = middle;
      else low = middle;
    }
    worst = Math.max(worst, Math.abs(f(high) - f(low)) / scale);
  }
  return worst;
}

/** Shapes in still air with an upper and a lower side, whose laws change places with the sign of the difference. */
const sided = /^(up|down|inclined)/;

describe('Every flow law, over 150 … 1500 K', () => {
  for (const name of Object.keys(kinds) as KindName[]) {
    it(`“${name}” has no jump in flow or slope, wherever its pieces meet`, () => {
      for (const air of airs) {
        for (const sign of [1, -1] as const) {
          if (sign < 0 && air <= 150) continue;
          const { at, first, last } = sweep(name, air, sign);
          expect(greatestJump((x) => at(x).flow, first, last)).toBeLessThan(1e-7);
          expect(greatestJump((x) => at(x).slope, first, last)).toBeLessThan(1e-6);
        }
      }
    });
  }

  for (const name of Object.keys(kinds) as KindName[]) {
    it(`“${name}” has one slope where its ends are equally warm, from either side`, () => {
      const law = lawOf(name);
      const out = { flow: 0, byFrom: 0, byTo: 0, film: 0 };
      const slope = (air: number, difference: number) => {
        law.evaluate(air + difference, air, out);
        return out.byFrom;
      };
      for (const air of airs) {
        const [hot, cold] = [slope(air, 1e-11), slope(air, -1e-11)];
        if (sided.test(name)) {
          // Up and down have unlike laws. Both slopes go to nothing with the difference, as slowly as 1/ln of it, and so does the step between.
          expect(hot).toBeLessThan(0.7 * slope(air, 1e-4));
          expect(cold).toBeLessThan(0.7 * slope(air, -1e-4));
        } else {
          // In moving air the rule of cubes leaves the cube of that step.
          const left = name === 'windOpposingUp' || name === 'windLeaning' ? 2e-3 : 1e-6;
          expect(Math.abs(hot - cold)).toBeLessThan(left * slope(air, 1));
        }
      }
    });
  }

  it('is found out by this sweep where it does jump', () => {
    // A published law in two pieces as it stands in books, 0.54 Ra^¼ to 10⁷ and 0.15 Ra^⅓ beyond.
    const pieces = (logRa: number) =>
      logRa <= Math.log(1e7) ? 0.54 * Math.exp(logRa / 4) : 0.15 * Math.exp(logRa / 3);
    expect(greatestJump(pieces, Math.log(1e4), Math.log(1e10))).toBeGreaterThan(1e-3);
    // Continuous, with a corner: its slope jumps.
    const corner = (x: number) => (x < 1.234 ? 1 : 1.05);
    expect(greatestJump(corner, 0, 3)).toBeGreaterThan(0.04);
  });
});
