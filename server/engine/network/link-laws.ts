import type { GridSurface } from '../../../shared/schemas/network-grid.js';
import type { NetworkDocument, NetworkLink } from '../../../shared/schemas/network.js';
import type { ConvectionShape } from '../convection/registry.js';
import { airGapLaw } from './laws/air-gap.js';
import { channelLaw } from './laws/channel.js';
import { conductionLaw } from './laws/conduction.js';
import { convectionLaw, linkConvectionLaw } from './laws/convection.js';
import { finArrayLaw } from './laws/fin-array.js';
import { linear, type FlowOut, type LinkLaw } from './laws/law.js';
import { radiationLaw } from './laws/radiation.js';
import { ventilationLaw } from './laws/ventilation.js';
import { carriesHeat } from './validate.js';

export type { FlowOut, LinkLaw };

type Surrounding = Pick<NetworkDocument, 'pressurePa'>;

/** The flow law of one link. A link that cannot carry heat has none: zero. */
export function linkLaw(link: NetworkLink, { pressurePa }: Surrounding): LinkLaw {
  if (!carriesHeat(link)) return linear(0);
  switch (link.kind) {
    case 'resistance':
      return linear(1 / link.resistanceKPerW);
    case 'film':
      return linear(link.coefficientWPerM2K * link.areaM2);
    case 'conduction':
      return conductionLaw(link);
    case 'convection':
      return linkConvectionLaw(link, pressurePa);
    case 'radiation':
      return radiationLaw(link);
    case 'ventilation':
      return ventilationLaw(link, pressurePa);
    case 'air-gap':
      return airGapLaw(link, pressurePa);
    case 'fin-array':
      return finArrayLaw(link, pressurePa);
    case 'channel':
      return channelLaw(link, pressurePa);
  }
}

/** The law of one square metre of a gridded surface, its film coefficient over that square metre. */
export function surfaceLaw(
  surface: Exclude<GridSurface, { kind: 'radiation' | 'film' }>,
  { pressurePa }: Surrounding,
): LinkLaw {
  switch (surface.kind) {
    case 'convection':
      return convectionLaw({ ...surface, shape: surface.shape as ConvectionShape }, 1, surface.scale, pressurePa);
    case 'air-gap':
      return airGapLaw({ ...surface, areaM2: 1 }, pressurePa);
    case 'fin-array':
      return perSquareMetre(finArrayLaw(surface, pressurePa), surface.baseWidthM * surface.baseHeightM);
  }
}

/** A law of a whole area as one of a square metre, its film coefficient q/(A ΔT). */
function perSquareMetre(law: LinkLaw, areaM2: number): LinkLaw {
  return {
    hasFilm: true,
    evaluate: (from, to, out) => {
      law.evaluate(from, to, out);
      out.flow /= areaM2;
      out.byFrom /= areaM2;
      out.byTo /= areaM2;
      out.film = out.flow / (from - to);
    },
    guess: (temperature) => law.guess(temperature) / areaM2,
    outside: (from, to) => law.outside?.(from, to) ?? [],
  };
}
