import type { NetworkLink } from '../../../../shared/schemas/network.js';
import { blankFilm, filmLaw, type ConvectiveSurface } from '../../convection/film.js';
import type { LinkLaw } from './law.js';

/** Film coefficient of the first guess [W/(m² K)]. */
const guessedFilm = 5;

/** q = h A (T_surface − T_air). */
export function convectionLaw(
  surface: ConvectiveSurface & { areaM2: number; scale: number },
  pressurePa: number,
): LinkLaw {
  const law = filmLaw(surface, pressurePa);
  const area = surface.areaM2;
  const { scale } = surface;
  const film = blankFilm();
  const guess = (guessedFilm + 4 * Math.sqrt(surface.airSpeedMPerS ?? 0)) * scale * area;
  return {
    hasFilm: true,
    outside: law.outside,
    evaluate: (from, to, out) => {
      law.evaluate(from, to, film);
      const difference = from - to;
      const main = area * scale * (film.film + film.byLogDifference);
      out.film = scale * film.film;
      out.flow = out.film * area * difference;
      out.byFrom = main + area * scale * film.bySurface * difference;
      out.byTo = -main + area * scale * film.byAir * difference;
    },
    guess: () => guess,
  };
}

/** The surface that a convection link describes; the width of an inclined plate is its area over its length. */
export function linkSurface(link: Extract<NetworkLink, { kind: 'convection' }>): ConvectiveSurface & {
  areaM2: number;
  scale: number;
} {
  return { ...link, widthM: link.areaM2 / link.lengthM };
}
