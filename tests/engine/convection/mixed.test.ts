import { describe, expect, it } from 'vitest';
import { filmLaw, blankFilm } from '../../../server/engine/convection/film.js';
import { mixedAssisting, mixedOpposing } from '../../../server/engine/convection/mixed.js';
import { seeded } from './seeded.js';

const out = { film: 0, byForced: 0, byNatural: 0 };

describe('Forced and natural convection together', () => {
  it('helping each other add by cubes', () => {
    for (const [forced, natural] of [
      [3, 4],
      [0.1, 5],
      [5, 0.1],
      [20, 8],
      [1e-3, 1e-3],
    ] as const) {
      mixedAssisting(forced, natural, out);
      expect(out.film ** 3 / (forced ** 3 + natural ** 3)).toBeCloseTo(1, 12);
      // By differentiating h³ = h_F³ + h_N³.
      expect(out.byForced).toBeCloseTo((forced / out.film) ** 2, 12);
      expect(out.byNatural).toBeCloseTo((natural / out.film) ** 2, 12);
    }
  });

  it('against each other are the forced or the natural one where the other is nothing', () => {
    mixedOpposing(0, 5, out);
    expect(out).toEqual({ film: 5, byForced: 0, byNatural: 1 });
    mixedOpposing(5, 0, out);
    expect(out.film).toBeCloseTo(5, 1);
  });

  it('against each other are the difference of cubes where one is much the greater, and never below 0.7 of it', () => {
    mixedOpposing(10, 4, out);
    expect(out.film / Math.cbrt(1000 - 64)).toBeCloseTo(1, 3);
    const random = seeded(7);
    for (let i = 0; i < 10_000; i++) {
      const a = 10 ** (2 * random() - 1);
      const b = 10 ** (2 * random() - 1);
      mixedOpposing(a, b, out);
      expect(out.film).toBeGreaterThanOrEqual(0.7 * Math.max(a, b) * (1 - 1e-12));
      const { film, byForced, byNatural } = out;
      const d = 1e-6;
      mixedOpposing(a * (1 + d), b, out);
      expect(Math.abs((out.film - film) / (a * d) - byForced)).toBeLessThan(2e-4);
      mixedOpposing(a, b * (1 + d), out);
      expect(Math.abs((out.film - film) / (b * d) - byNatural)).toBeLessThan(2e-4);
    }
  });

  it('against each other carry more heat the greater the difference, on ten thousand random points', () => {
    const random = seeded(11);
    const film = blankFilm();
    const shapes = [
      'vertical-plate',
      'plate-facing-up',
      'plate-facing-down',
      'inclined-plate',
      'horizontal-cylinder',
      'vertical-cylinder',
      'sphere',
    ] as const;
    for (let i = 0; i < 10_000; i++) {
      const length = 10 ** (-2 + 2 * random());
      const law = filmLaw(
        {
          shape: shapes[Math.floor(shapes.length * random())] ?? 'sphere',
          lengthM: length,
          widthM: length,
          tiltDeg: 180 * random(),
          diameterM: length * (0.02 + random()),
          airSpeedMPerS: 10 ** (-2 + 3 * random()),
          flow: 'opposing',
        },
        101325,
      );
      // A surface that is warmer than its air, or colder.
      const sign = random() < 0.5 ? 1 : -1;
      const airK = sign > 0 ? 200 + 300 * random() : 400 + 900 * random();
      const difference = 10 ** (-1 + (sign > 0 ? 3.2 : 2.3) * random());
      const flow = (d: number) => {
        law.evaluate(airK + sign * d, airK, film);
        return film.film * d;
      };
      expect(flow(difference * 1.01)).toBeGreaterThan(flow(difference));
    }
  });
});
