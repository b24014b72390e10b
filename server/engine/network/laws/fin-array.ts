import type { NetworkLink } from '../../../../shared/schemas/network.js';
import { defaultChannel, type ChannelCorrelation } from '../../convection/channel.js';
import { blankFilm } from '../../convection/film.js';
import { channelFilm } from './channel.js';
import type { LinkLaw } from './law.js';

export type FinArray = Pick<
  Extract<NetworkLink, { kind: 'fin-array' }>,
  'baseWidthM' | 'baseHeightM' | 'finHeightM' | 'finThicknessM' | 'finCount' | 'conductivityWPerMK' | 'tiltDeg'
>;

/** Spacing between the fins s = (W − n t)/(n − 1) [m]. */
export function finSpacing({ baseWidthM, finThicknessM, finCount }: FinArray): number {
  return (baseWidthM - finCount * finThicknessM) / (finCount - 1);
}

/**
 * Natural convection of upright parallel fins with their base: q = h (η A_fins + A_strips) (T_base − T_air), h of the channels between them;
 * A_fins = 2 n (H + t/2) L with the tip as a longer fin, A_strips = (n − 1) s L, η = tanh(m L_c)/(m L_c), m = √(2 h/(k t)).
 *
 * @returns the law; its film coefficient is that of the channels
 *
 * **Valid for** channels within 45° of upright (g cos of the tilt).
 * **Source** channels after Bar-Cohen & Rohsenow (1984); fin efficiency of any heat-transfer text.
 * **Checked against** a textbook’s heat sink, tests/reference/bar-cohen-rohsenow-1984.
 */
export function finArrayLaw(fins: FinArray, pressurePa: number, correlation?: ChannelCorrelation): LinkLaw {
  const law = correlation ?? defaultChannel;
  const spacing = finSpacing(fins);
  const channel = channelFilm(law, {
    spacing,
    height: fins.baseHeightM,
    pressure: pressurePa,
    gravityShare: Math.cos((fins.tiltDeg * Math.PI) / 180),
  });
  const length = fins.finHeightM + fins.finThicknessM / 2;
  const finArea = 2 * fins.finCount * length * fins.baseHeightM;
  const stripArea = (fins.finCount - 1) * spacing * fins.baseHeightM;
  const perFilm = (2 * length * length) / (fins.conductivityWPerMK * fins.finThicknessM);
  const film = blankFilm();
  return {
    hasFilm: true,
    outside: channel.outside,
    evaluate: (from, to, out) => {
      channel.evaluate(from, to, film);
      const h = film.film;
      // x = m L_c; d(h η)/dh = (η + sech² x)/2.
      const x = Math.sqrt(perFilm * h);
      const tanh = Math.tanh(x);
      const efficiency = x > 1e-6 ? tanh / x : 1;
      const slope = (efficiency + 1 - tanh * tanh) / 2;
      const conductance = h * (efficiency * finArea + stripArea);
      const byFilm = slope * finArea + stripArea;
      const difference = from - to;
      const main = conductance + byFilm * film.byLogDifference;
      out.film = h;
      out.flow = conductance * difference;
      out.byFrom = main + byFilm * film.bySurface * difference;
      out.byTo = -main + byFilm * film.byAir * difference;
    },
    guess: () => 3 * (finArea + stripArea),
  };
}
