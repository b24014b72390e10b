/**
 * Inclined plate after Raithby & Hollands, Handbook of Heat Transfer, 3rd ed. (1998), ch. 4: the vertical law with g cos θ and the level law with
 * g sin θ, θ from the vertical. Formulas from memory; the blend of both, (h_v¹⁰ + h_h¹⁰)^(1/10), is ours.
 */
import { describe, expect, it } from 'vitest';
import { blankFilmAir, filmAir } from '../../../server/engine/air.js';
import { blankFilm, filmLaw } from '../../../server/engine/convection/film.js';
import { exactly } from '../correlation-check.js';

const cl = '(0.671 / (1 + (0.492 / pr)^(9/16))^(4/9))';
const laminar = `(2 / log(1 + 2 / (${cl} * ra^(1/4))))`;
const turbulent = '(0.13 * pr^0.22 / (1 + 0.61 * pr^0.81)^0.42 * ra^(1/3) / (1 + 1.4e9 * pr / ra))';
const vertical = `(${laminar}^6 + ${turbulent}^6)^(1/6)`;
const up = `((1.4 / log(1 + 1.4 / (0.835 * ${cl} * ra^(1/4))))^10 + (0.14 * ra^(1/3))^10)^(1/10)`;
const down = '2.45 / log(1 + 2.45 / (0.527 * ra^(1/5) / (1 + (1.9 / pr)^0.9)^(2/9)))';

const plate = { lengthM: 0.2, widthM: 0.1 };
/** Area ÷ perimeter [m]. */
const level = (0.2 * 0.1) / 0.6;

const film = blankFilm();

function coefficient(tiltDeg: number, surfaceK: number, airK: number): number {
  filmLaw({ shape: 'inclined-plate', ...plate, tiltDeg }, 101325).evaluate(surfaceK, airK, film);
  return film.film;
}

function byHand(tiltDeg: number, surfaceK: number, airK: number): number {
  const air = blankFilmAir();
  filmAir((surfaceK + airK) / 2, 101325, 9.80665, air);
  const theta = (Math.abs(90 - tiltDeg) * Math.PI) / 180;
  const raOf = (length: number, share: number) => air.rayleighFactor * share * Math.abs(surfaceK - airK) * length ** 3;
  const part = (formula: string, length: number, share: number) =>
    share < 1e-9 ? 0 : (exactly(formula, raOf(length, share), air.prandtl) * air.conductivity) / length;
  // A surface that looks up and is warm, or looks down and is cold, has the law of a plate facing up.
  const looksUp = tiltDeg < 90 === surfaceK > airK;
  const standing = part(vertical, 0.2, Math.cos(theta));
  const lying = part(looksUp ? up : down, level, Math.sin(theta));
  return (standing ** 10 + lying ** 10) ** 0.1;
}

describe('An inclined plate', () => {
  it.each([0, 20, 45, 70, 89, 90, 91, 120, 150, 180])('at %d° is the greater of both laws, blended', (tiltDeg) => {
    for (const [surfaceK, airK] of [
      [305, 300],
      [340, 300],
      [500, 300],
      [280, 300],
      [300, 400],
    ] as const) {
      expect(coefficient(tiltDeg, surfaceK, airK) / byHand(tiltDeg, surfaceK, airK)).toBeCloseTo(1, 7);
    }
  });

  it('upright is a vertical plate, and level a level one', () => {
    const of = (shape: 'vertical-plate' | 'plate-facing-up' | 'plate-facing-down', lengthM: number) => {
      filmLaw({ shape, lengthM, widthM: 0.1 }, 101325).evaluate(350, 300, film);
      return film.film;
    };
    expect(coefficient(90, 350, 300) / of('vertical-plate', 0.2)).toBeCloseTo(1, 12);
    expect(coefficient(0, 350, 300) / of('plate-facing-up', level)).toBeCloseTo(1, 12);
    expect(coefficient(180, 350, 300) / of('plate-facing-down', level)).toBeCloseTo(1, 12);
  });
});
