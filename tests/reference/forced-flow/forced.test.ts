/**
 * Forced flow: the laminar plate (Pohlhausen) and the mixed law of textbooks; S. W. Churchill, M. Bernstein, J. Heat Transfer 99 (1977) 300;
 * S. Whitaker, AIChE J. 18 (1972) 361. Formulas from memory.
 */
import { describe, expect, it } from 'vitest';
import { airViscosity, blankFilmAir, filmAir } from '../../../server/engine/air.js';
import { blankFilm, filmLaw, type ConvectiveSurface } from '../../../server/engine/convection/film.js';
import {
  nusseltCylinderChurchillBernstein,
  nusseltFlatPlateForced,
  nusseltSphereWhitaker,
} from '../../../server/engine/convection/forced.js';
import { agreesWith, exactly } from '../correlation-check.js';

type Forced = typeof nusseltFlatPlateForced;

/** A forced law in the clothes of a natural one, for the same check. */
function dressed(law: Forced): Parameters<typeof agreesWith>[0] {
  return (re, pr, out) => {
    const forced = { nu: 0, byLogRe: 0, byPr: 0 };
    law(re, pr, forced);
    out.nu = forced.nu;
    out.byLogRa = forced.byLogRe;
    out.byPr = forced.byPr;
  };
}

describe('Forced flow', () => {
  it('along a plate is laminar below the transition', () => {
    agreesWith(dressed(nusseltFlatPlateForced), '0.664 * ra^(1/2) * pr^(1/3)', [1e3, 1e4, 1e5, 3e5], [0.7, 7]);
  });

  it('along a plate is mixed above it', () => {
    agreesWith(dressed(nusseltFlatPlateForced), '(0.037 * ra^(4/5) - 871) * pr^(1/3)', [7e5, 1e6, 1e7, 1e8], [0.7, 7]);
  });

  it('across the transition stays within 5 % of the published piece', () => {
    const out = { nu: 0, byLogRe: 0, byPr: 0 };
    for (let re = 3.5e5; re < 7e5; re *= 1.01) {
      nusseltFlatPlateForced(re, 0.7, out);
      const piece = (re <= 5e5 ? 0.664 * Math.sqrt(re) : 0.037 * re ** 0.8 - 871) * Math.cbrt(0.7);
      expect(Math.abs(out.nu / piece - 1)).toBeLessThan(0.05);
      expect(out.byLogRe).toBeGreaterThan(0);
    }
  });

  it('across a cylinder follows Churchill and Bernstein', () => {
    const formula = '0.3 + 0.62 * ra^(1/2) * pr^(1/3) / (1 + (0.4 / pr)^(2/3))^(1/4) * (1 + (ra / 282000)^(5/8))^(4/5)';
    agreesWith(dressed(nusseltCylinderChurchillBernstein), formula, [1, 1e2, 1e4, 1e5, 1e6, 1e7], [0.7, 7]);
  });

  it('past a sphere follows Whitaker', () => {
    const formula = '(0.4 * ra^(1/2) + 0.06 * ra^(2/3)) * pr^0.4';
    agreesWith(dressed(nusseltSphereWhitaker), formula, [4, 1e2, 1e3, 1e4, 7e4], [0.71, 7]);
  });
});

describe('The film of a surface in moving air', () => {
  const film = blankFilm();
  /** The forced share of the film coefficient: what the rule of cubes leaves without the natural one [W/(m² K)]. */
  const alone = (surface: Omit<ConvectiveSurface, 'widthM'>, surfaceK: number, airK: number) => {
    filmLaw({ ...surface, widthM: surface.lengthM }, 101325).evaluate(surfaceK, airK, film);
    const both = film.film;
    filmLaw({ ...surface, airSpeedMPerS: 0, widthM: surface.lengthM }, 101325).evaluate(surfaceK, airK, film);
    return Math.cbrt(both ** 3 - film.film ** 3);
  };

  it.each([280, 320, 500, 900, 1300])(
    'past a sphere at %d K takes μ of the surface and all else of the air',
    (surfaceK) => {
      const airK = 300;
      const air = blankFilmAir();
      filmAir(airK, 101325, 9.80665, air);
      const re = (2 * 0.05) / air.kinematicViscosity;
      const ratio = airViscosity(airK) / airViscosity(surfaceK);
      const nu = 2 + exactly('(0.4 * ra^(1/2) + 0.06 * ra^(2/3)) * pr^0.4', re, air.prandtl) * ratio ** 0.25;
      const h = alone({ shape: 'sphere', lengthM: 0.05, airSpeedMPerS: 2 }, surfaceK, airK);
      expect(h / ((nu * air.conductivity) / 0.05)).toBeCloseTo(1, 8);
    },
  );

  it.each([0.3, 1, 3, 10, 30])('along a plate at %d m/s takes its flow length, at film temperature', (speed) => {
    const air = blankFilmAir();
    filmAir(320, 101325, 9.80665, air);
    const nu = exactly('0.664 * ra^(1/2) * pr^(1/3)', (speed * 0.15) / air.kinematicViscosity, air.prandtl);
    const h = alone({ shape: 'vertical-plate', lengthM: 0.4, flowLengthM: 0.15, airSpeedMPerS: speed }, 340, 300);
    expect(h / ((nu * air.conductivity) / 0.15)).toBeCloseTo(1, 8);
  });

  it.each(['horizontal-cylinder', 'vertical-cylinder'] as const)('across a %s takes its diameter', (shape) => {
    const air = blankFilmAir();
    filmAir(320, 101325, 9.80665, air);
    const formula = '0.3 + 0.62 * ra^(1/2) * pr^(1/3) / (1 + (0.4 / pr)^(2/3))^(1/4) * (1 + (ra / 282000)^(5/8))^(4/5)';
    for (const speed of [0.5, 1, 3, 10, 30]) {
      const nu = exactly(formula, (speed * 0.02) / air.kinematicViscosity, air.prandtl);
      const size = shape === 'horizontal-cylinder' ? { lengthM: 0.02 } : { lengthM: 0.3, diameterM: 0.02 };
      const h = alone({ shape, ...size, airSpeedMPerS: speed }, 340, 300);
      expect(h / ((nu * air.conductivity) / 0.02)).toBeCloseTo(1, 8);
    }
  });
});
