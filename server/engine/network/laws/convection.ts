import type { NetworkLink } from '../../../../shared/schemas/network.js';
import { blankFilm, filmLaw, type ConvectiveSurface, type FilmLaw } from '../../convection/film.js';
import type { FlowOut, LinkLaw } from './law.js';

/** Film coefficient of the first guess [W/(m² K)]. */
const guessedFilm = 5;
/** Room for the film that is being evaluated. */
const film = blankFilm();

/** q = h A (T_surface − T_air). */
class ConvectionLaw implements LinkLaw {
  readonly hasFilm = true;

  constructor(
    private readonly law: FilmLaw,
    private readonly area: number,
    private readonly scale: number,
    private readonly guessed: number,
  ) {}

  evaluate(from: number, to: number, out: FlowOut): void {
    const { area, scale } = this;
    this.law.evaluate(from, to, film);
    const difference = from - to;
    const main = area * scale * (film.film + film.byLogDifference);
    out.film = scale * film.film;
    out.flow = out.film * area * difference;
    out.byFrom = main + area * scale * film.bySurface * difference;
    out.byTo = -main + area * scale * film.byAir * difference;
  }

  guess(): number {
    return this.guessed;
  }

  outside(from: number, to: number): string[] {
    return this.law.outside(from, to);
  }
}

/** @param area [m²]; @param scale multiplies h */
export function convectionLaw(surface: ConvectiveSurface, area: number, scale: number, pressurePa: number): LinkLaw {
  const guessed = (guessedFilm + 4 * Math.sqrt(surface.airSpeedMPerS ?? 0)) * scale * area;
  return new ConvectionLaw(filmLaw(surface, pressurePa), area, scale, guessed);
}

/** The law of a convection link; the width of an inclined plate is its area over its length. */
export function linkConvectionLaw(link: Extract<NetworkLink, { kind: 'convection' }>, pressurePa: number): LinkLaw {
  const surface = link.shape === 'inclined-plate' ? { ...link, widthM: link.areaM2 / link.lengthM } : link;
  return convectionLaw(surface, link.areaM2, link.scale, pressurePa);
}
