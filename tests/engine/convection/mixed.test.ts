import { describe, expect, it } from 'vitest';
import { filmLaw, blankFilm } from '../../../server/engine/convection/film.js';
import { mixedAssisting, mixedOpposing } from '../../../server/engine/convection/mixed.js';
import { seeded } from './seeded.js';

const out = { film: 0, byForced: 0, byNatural: 0 };

describe('Forced and natural convection together', () => {
  it('helping each other add by cubes', () => {
    mixedAssisting(3, 4, out);
    expect(out.film).toBeCloseTo(Math.cbrt(27 + 64), 12);
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
    for (let i = 0; i < 10_000; i++) {
      const length = 10 ** (-2 + 2 * random());
      const law = filmLaw(
        {
          shape: random() < 0.5 ? 'vertical-plate' : 'plate-facing-up',
          lengthM: length,
          widthM: length,
          airSpeedMPerS: 10 ** (-2 + 3 * random()),
          flow: 'opposing',
        },
        101325,
      );
      const airK = 250 + 100 * random();
      const difference = 10 ** (-1 + 3.3 * random());
      const flow = (d: number) => {
        law.evaluate(airK + d, airK, film);
        return film.film * d;
      };
      expect(flow(difference * 1.01)).toBeGreaterThan(flow(difference));
    }
  });
});
