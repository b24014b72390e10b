import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';

/** Canonical JSON (RFC 8785): one text for one content, whatever the order of its members. */
export function canonicalJson(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('This value has no JSON');
  return text;
}

export function sha256(text: string): string {
  return createHash('sha256').update(text, 'utf8').digest('hex');
}

/** Digits that a stored number keeps: far finer than any estimate, and coarse enough to be the same on every machine. */
const digits = 9;

/** A copy with every number rounded to nine significant digits: computed floats are stored once and never hashed anew. */
export function rounded(value: unknown): unknown {
  if (typeof value === 'number') return Number.isFinite(value) ? Number(value.toPrecision(digits)) : null;
  if (Array.isArray(value)) return value.map(rounded);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value)
      .filter(([, entry]) => entry !== undefined)
      .map(([key, entry]) => [key, rounded(entry)]),
  );
}
