import type { NetworkLink } from '../../../../shared/schemas/network.js';
import { blankFilmAir, filmAir } from '../../air.js';
import { gravity } from '../../constants.js';
import { gapCorrelations, nusseltGap } from '../../convection/air-gap.js';
import type { Nusselt } from '../../convection/correlation.js';
import { outsideText } from '../../convection/film.js';
import type { LinkLaw } from './law.js';

/** q = Nu k A ΔT/gap across closed air; the colder side’s tilt is what the warmer one’s leaves to 180°. */
export function airGapLaw(
  link: Pick<Extract<NetworkLink, { kind: 'air-gap' }>, 'areaM2' | 'gapM' | 'heightM' | 'tiltDeg'>,
  pressurePa: number,
): LinkLaw {
  const { areaM2, gapM, heightM, tiltDeg } = link;
  const cubed = gapM ** 3;
  const ratio = heightM / gapM;
  const air = blankFilmAir();
  const nusselt: Nusselt = { nu: 0, byLogRa: 0, byPr: 0 };
  const tiltOf = (from: number, to: number) => (from >= to ? tiltDeg : 180 - tiltDeg);
  return {
    hasFilm: true,
    evaluate: (from, to, out) => {
      const difference = from - to;
      filmAir((from + to) / 2, pressurePa, gravity, air);
      const ra = air.rayleighFactor * Math.abs(difference) * cubed;
      nusseltGap(ra, tiltOf(from, to), ratio, nusselt);
      const perNu = air.conductivity / gapM;
      const film = perNu * nusselt.nu;
      const byFilm = perNu * nusselt.byLogRa * air.rayleighSlope + film * air.conductivitySlope;
      const bend = (byFilm / 2) * areaM2 * difference;
      const main = areaM2 * (film + perNu * nusselt.byLogRa);
      out.film = film;
      out.flow = film * areaM2 * difference;
      out.byFrom = main + bend;
      out.byTo = -main + bend;
    },
    guess: (temperature) => {
      filmAir(temperature, pressurePa, gravity, air);
      return (1.2 * air.conductivity * areaM2) / gapM;
    },
    outside: (from, to) => {
      filmAir((from + to) / 2, pressurePa, gravity, air);
      const ra = air.rayleighFactor * Math.abs(from - to) * cubed;
      const tilt = tiltOf(from, to);
      const laws = gapCorrelations.filter(({ id }) => (id === 'hollands' ? tilt < 90 : tilt > 60 && tilt < 180));
      return laws.flatMap(({ id, range }) => [
        ...outsideText('Ra', ra, range.ra, `${id} (air-gap)`),
        // Where nothing moves the shape of the gap is of no account.
        ...(nusseltGapMoves(ra) ? outsideText('height/gap', ratio, range.aspect, `${id} (air-gap)`) : []),
      ]);
    },
  };
}

/** Rayleigh number from which the air in a gap moves enough to matter. */
function nusseltGapMoves(ra: number): boolean {
  return ra > 1000;
}
