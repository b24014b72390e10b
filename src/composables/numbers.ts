import { formatNumber } from '../../shared/quantities.js';

/** Numbers with honest figures, as the sheet shows them. */

export function kelvins(value: number): string {
  return value
    .toFixed(1)
    .replace(/^-(?=0\.0$)/, '')
    .replace('-', '−');
}

/** Three significant figures. */
export function figures(value: number): string {
  return formatNumber(Number(value.toPrecision(3)));
}

/** Two or three significant figures, never above the value: a ceiling must not be rounded up. */
export function figuresBelow(value: number): string {
  if (value === 0) return '0';
  const step = 10 ** (Math.floor(Math.log10(Math.abs(value))) - 2);
  return formatNumber(Number((Math.floor(value / step + 1e-9) * step).toPrecision(3)));
}

/** A share with its sign: +6 %, −36 %. Rounded down, towards less headroom. */
export function percentBelow(share: number): string {
  const percent = Math.floor(share * 100 + 1e-9);
  const sign = percent > 0 ? '+' : '';
  return `${sign}${formatNumber(percent)}\u00a0%`;
}
