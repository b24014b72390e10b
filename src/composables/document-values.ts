import { formatNumber, formatQuantity, type QuantityKind } from '../../shared/quantities.js';
import { pointerSegments } from './document-path.js';

/** The quantity that a field of the assembly document holds, by the unit that its name carries. */
function kindOf(field: string): QuantityKind | null {
  if (field === 'altitudeM') return 'altitude';
  if (field === 'irradianceWPerM2') return 'irradiance';
  if (field.endsWith('M2')) return 'area';
  if (field.endsWith('KM2PerW')) return 'arealResistance';
  if (field.endsWith('M3PerS')) return 'flow';
  if (field.endsWith('MPerS')) return 'speed';
  if (field.endsWith('Deg')) return 'angle';
  if (field.endsWith('Share') || field === 'coverage' || field === 'glazingTransmittance') return 'share';
  if (/(^outer|^size|[a-z])M$/.test(field)) return 'length';
  if (field.endsWith('C')) return 'temperature';
  if (field.endsWith('W')) return 'power';
  return field.endsWith('A') ? 'current' : null;
}

/** A number of the document as its field shows it: 0.0024 at `/housing/faces/top/wallM` is “2.4 mm”. */
export function numberInWords(value: number, pointer: string): string {
  const segments = pointerSegments(pointer);
  const last = segments.at(-1) ?? '';
  const field = /^\d+$/.test(last) ? (segments.at(-2) ?? '') : last;
  // A joint that is not known is assumed as a specific resistance.
  if (field === 'stack') return `${formatNumber(value * 1e4)}\u00a0K\u00a0cm²/W`;
  const kind = kindOf(field);
  return kind === null ? formatNumber(value) : formatQuantity(value, kind);
}
