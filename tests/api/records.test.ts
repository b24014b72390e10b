import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { canonicalJson, rounded, sha256 } from '../../server/records/canonical.js';

/** The same content with the members of every object in another order. */
function reversed(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(reversed);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value)
      .reverse()
      .map(([key, entry]) => [key, reversed(entry)]),
  );
}

describe('canonical JSON', () => {
  // Source: RFC 8785 (JSON Canonicalization Scheme, 2020), section 3.2.2 and 3.2.3: sample input and its canonical form.
  it('is that of RFC 8785 for the sample of its section 3.2', () => {
    const sample = JSON.parse(
      String.raw`{ "numbers": [333333333.33333329, 1E30, 4.50, 2e-3, 0.000000000000000000000000001],
        "string": "\u20ac$\u000F\u000aA'\u0042\u0022\u005c\\\"\/", "literals": [null, true, false] }`,
    ) as unknown;
    expect(canonicalJson(sample)).toBe(
      String.raw`{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],` +
        String.raw`"string":"€$\u000f\nA'B\"\\\\\"/"}`,
    );
  });

  // Source: RFC 8785, section 3.2.3: names are sorted by UTF-16 code units.
  it('sorts names as the sorting sample of RFC 8785 does', () => {
    const sample = {
      '\u20ac': 'Euro Sign',
      '\r': 'Carriage Return',
      '\ufb33': 'Hebrew Letter Dalet With Dagesh',
      '1': 'One',
      '\ud83d\ude00': 'Emoji: Grinning Face',
      '\u0080': 'Control',
      '\u00f6': 'Latin Small Letter O With Diaeresis',
    };
    expect([...canonicalJson(sample).matchAll(/":"([^"]+)"/g)].map(([, name]) => name)).toEqual([
      'Carriage Return',
      'One',
      'Control',
      'Latin Small Letter O With Diaeresis',
      'Euro Sign',
      'Emoji: Grinning Face',
      'Hebrew Letter Dalet With Dagesh',
    ]);
  });

  it('is one text for one content, whatever the order of members, and reads back to it', () => {
    fc.assert(
      fc.property(fc.jsonValue(), (value) => {
        const text = canonicalJson(value);
        expect(canonicalJson(reversed(value))).toBe(text);
        expect(canonicalJson(JSON.parse(text))).toBe(text);
      }),
    );
  });
});

describe('the hash', () => {
  // Source: FIPS 180-4 with NIST's published example for the one-block message "abc".
  it('is SHA-256', () => {
    expect(sha256('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad');
  });
});

describe('rounding before hashing', () => {
  it('is done once: rounded again nothing changes, and noise of the last digits is gone', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (number) => {
        expect(rounded(rounded(number))).toBe(rounded(number));
      }),
    );
    expect(rounded({ a: [45.00000000000001, 0.1 + 0.2] })).toEqual({ a: [45, 0.3] });
  });
});
