/** Nu of a channel and its slope by the logarithm of the channel’s Rayleigh number. */
export interface ChannelNusselt {
  nu: number;
  byLogEl: number;
}

export interface ChannelCorrelation {
  id: string;
  shape: 'channel';
  formula: string;
  source: string;
  range: { el: readonly [number, number] };
  evaluate: (el: number, out: ChannelNusselt) => void;
}

/**
 * Natural convection between parallel isothermal plates, open above and below, on the spacing.
 *
 * Nu = (576/El² + 2.873/√El)^(−½), El = Ra_s s/H.
 *
 * **Valid for** symmetric isothermal plates, 10⁻¹ ≤ El ≤ 10⁵.
 * **Source** A. Bar-Cohen, W. M. Rohsenow, J. Heat Transfer 106 (1984) 116–123.
 * **Checked against** both its limits, El/24 and 0.59 El^¼, and a second computation, tests/reference/bar-cohen-rohsenow-1984.
 */
export function nusseltChannelBarCohenRohsenow(el: number, out: ChannelNusselt): void {
  if (!(el > 1e-100)) {
    out.nu = 0;
    out.byLogEl = 0;
    return;
  }
  const developed = 576 / (el * el);
  const single = 2.873 / Math.sqrt(el);
  const sum = developed + single;
  out.nu = 1 / Math.sqrt(sum);
  out.byLogEl = (out.nu * (2 * developed + 0.5 * single)) / (2 * sum);
}

/**
 * Natural convection between parallel isothermal plates, on the spacing.
 *
 * Nu = (El/24) [1 − exp(−35/El)]^¾
 *
 * **Valid for** 10⁻¹ ≤ El ≤ 10⁵.
 * **Source** W. Elenbaas, Physica 9 (1942) 1–28.
 * **Checked against** a second computation, tests/reference/bar-cohen-rohsenow-1984.
 */
export function nusseltChannelElenbaas(el: number, out: ChannelNusselt): void {
  if (!(el > 1e-100)) {
    out.nu = 0;
    out.byLogEl = 0;
    return;
  }
  const x = 35 / el;
  const open = -Math.expm1(-x);
  out.nu = (el / 24) * open ** 0.75;
  out.byLogEl = out.nu * (1 - (0.75 * x * Math.exp(-x)) / open);
}

export const defaultChannel: ChannelCorrelation = {
  id: 'bar-cohen-rohsenow',
  shape: 'channel',
  formula: 'Nu = (576/El² + 2.873/√El)^(−½), El = Ra_s s/H',
  source: 'Bar-Cohen & Rohsenow, J. Heat Transfer 106 (1984) 116',
  range: { el: [0.1, 1e5] },
  evaluate: nusseltChannelBarCohenRohsenow,
};

export const channelCorrelations: ChannelCorrelation[] = [
  defaultChannel,
  {
    id: 'elenbaas',
    shape: 'channel',
    formula: 'Nu = (El/24) [1 − exp(−35/El)]^¾, El = Ra_s s/H',
    source: 'Elenbaas, Physica 9 (1942) 1',
    range: { el: [0.1, 1e5] },
    evaluate: nusseltChannelElenbaas,
  },
];

export function findChannelCorrelation(id: string | undefined): ChannelCorrelation | undefined {
  return id === undefined ? defaultChannel : channelCorrelations.find((law) => law.id === id);
}
