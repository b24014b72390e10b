import type { DecisionState } from '../../shared/schemas/assembly-records.js';
import type { Verdict } from '../../shared/schemas/estimate.js';

const dateTime = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short' });

export function formatTime(iso: string): string {
  return dateTime.format(new Date(iso));
}

/** A number to the given significant digits, without an exponent where it stays readable; a real minus sign. */
export function formatNumber(value: number, digits = 3): string {
  if (value === 0) return '0';
  const size = Math.abs(value);
  const text =
    size >= 1e-4 && size < 1e6
      ? value.toLocaleString('en-GB', { maximumSignificantDigits: digits, useGrouping: false })
      : value.toExponential(digits - 1).replace('e', ' × 10^');
  return text.replace(/-/g, '−');
}

/** Kelvins with one decimal; shares, amperes and watts with the digits that their size deserves. */
export function formatMargin(value: number, unit: Verdict['marginUnit']): string {
  const text = unit === 'K' ? value.toFixed(1) : value.toFixed(2);
  return text.replace('-', '−');
}

export function formatDrive(value: number | null, unit: 'A' | 'W'): string {
  return value === null ? 'none within range' : `${formatNumber(value)} ${unit}`;
}

export function formatHeadroom(value: number | null): string {
  if (value === null) return '–';
  const percent = Math.round(value * 100);
  return `${percent < 0 ? '−' : '+'}${String(Math.abs(percent))} %`;
}

export const stateWords: Record<DecisionState, string> = {
  asked: 'asked, waits for a reviewer',
  accepted: 'accepted',
  'accepted-with-conditions': 'accepted with conditions',
  returned: 'returned',
  declined: 'declined',
  withdrawn: 'withdrawn',
  superseded: 'superseded',
  'self-checked': 'self-checked, not reviewed',
};
