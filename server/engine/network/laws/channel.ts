import type { NetworkLink } from '../../../../shared/schemas/network.js';
import { blankFilmAir, filmAir } from '../../air.js';
import { gravity } from '../../constants.js';
import {
  defaultChannel,
  findChannelCorrelation,
  type ChannelCorrelation,
  type ChannelNusselt,
} from '../../convection/channel.js';
import { blankFilm, outsideText, type FilmLaw } from '../../convection/film.js';
import type { LinkLaw } from './law.js';

/** Film coefficient between the plates of a channel: h = Nu k/s, El on the spacing. */
export function channelFilm(
  law: ChannelCorrelation,
  options: { spacing: number; height: number; pressure: number; gravityShare: number },
): FilmLaw {
  const { spacing, height, pressure } = options;
  const strength = gravity * options.gravityShare;
  const scale = spacing ** 4 / height;
  const air = blankFilmAir();
  const nusselt: ChannelNusselt = { nu: 0, byLogEl: 0 };
  return {
    evaluate: (surface, ambient, out) => {
      filmAir((surface + ambient) / 2, pressure, strength, air);
      law.evaluate(air.rayleighFactor * Math.abs(surface - ambient) * scale, nusselt);
      const perNu = air.conductivity / spacing;
      out.film = perNu * nusselt.nu;
      out.byLogDifference = perNu * nusselt.byLogEl;
      const byFilm = perNu * nusselt.byLogEl * air.rayleighSlope + out.film * air.conductivitySlope;
      out.bySurface = byFilm / 2;
      out.byAir = byFilm / 2;
    },
    outside: (surface, ambient) => {
      filmAir((surface + ambient) / 2, pressure, strength, air);
      const el = air.rayleighFactor * Math.abs(surface - ambient) * scale;
      return Math.abs(surface - ambient) < 0.05 ? [] : outsideText('El', el, law.range.el, `${law.id} (channel)`);
    },
  };
}

export function channelLaw(link: Extract<NetworkLink, { kind: 'channel' }>, pressurePa: number): LinkLaw {
  const law = findChannelCorrelation(link.correlation) ?? defaultChannel;
  const channel = channelFilm(law, {
    spacing: link.spacingM,
    height: link.heightM,
    pressure: pressurePa,
    gravityShare: 1,
  });
  const film = blankFilm();
  const { areaM2 } = link;
  return {
    hasFilm: true,
    outside: channel.outside,
    evaluate: (from, to, out) => {
      channel.evaluate(from, to, film);
      const difference = from - to;
      const main = areaM2 * (film.film + film.byLogDifference);
      out.film = film.film;
      out.flow = film.film * areaM2 * difference;
      out.byFrom = main + areaM2 * film.bySurface * difference;
      out.byTo = -main + areaM2 * film.byAir * difference;
    },
    guess: () => 3 * areaM2,
  };
}
