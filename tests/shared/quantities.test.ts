import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { readSize, readWallWords } from '../../shared/housing-words.js';
import { editableQuantity, inFieldUnit, quantities, readQuantity, type QuantityKind } from '../../shared/quantities.js';
import { convertUnit } from '../../shared/units.js';

function value(text: string, kind: QuantityKind): number {
  const reading = readQuantity(text, kind, convertUnit);
  if (reading.status !== 'read') throw new Error(`${text}: ${JSON.stringify(reading)}`);
  return reading.value;
}

function message(text: string, kind: QuantityKind): string {
  const reading = readQuantity(text, kind, convertUnit);
  return reading.status === 'unclear' ? reading.message : `(${reading.status})`;
}

describe('a quantity is read as it was written', () => {
  test.each<[string, QuantityKind, number]>([
    ['0,5', 'current', 0.5],
    ['0.5', 'current', 0.5],
    ['.5', 'current', 0.5],
    [',5 A', 'current', 0.5],
    ['12.', 'length', 0.012],
    ['12 mm', 'length', 0.012],
    ['12mm', 'length', 0.012],
    ['12 MM', 'length', 0.012],
    ['1.2 cm', 'length', 0.012],
    ['0.09 m', 'length', 0.09],
    ['12', 'length', 0.012],
    ['1/4 in', 'length', 0.00635],
    ['1 1/2 in', 'length', 0.0381],
    ['1-1/2 in', 'length', 0.0381],
    ['1½"', 'length', 0.0381],
    ['½', 'length', 0.0005],
    ['½ W', 'power', 0.5],
    ['3⁄8 inch', 'length', 0.009525],
    ['1.2e-3', 'power', 0.0012],
    ['1,2e-3 W', 'power', 0.0012],
    ['1.2E+2', 'power', 120],
    ['1.2 × 10⁻³ m', 'length', 0.0012],
    ['1.2*10^-3 m', 'length', 0.0012],
    ['450 µm', 'length', 0.00045],
    ['450 μm', 'length', 0.00045],
    ['20 %', 'share', 0.2],
    ['20%', 'share', 0.2],
    ['20 percent', 'share', 0.2],
    ['20', 'share', 0.2],
    ['0.2', 'share', 0.2],
    ['100', 'share', 1],
    ['0', 'share', 0],
    ['40°C', 'temperature', 40],
    ['40 °C', 'temperature', 40],
    ['40 C', 'temperature', 40],
    ['40°', 'temperature', 40],
    ['40 degrees', 'temperature', 40],
    ['104 F', 'temperature', 40],
    ['104 °F', 'temperature', 40],
    ['313.15 K', 'temperature', 40],
    ['-5', 'temperature', -5],
    ['−5 °C', 'temperature', -5],
    ['– 5 °C', 'temperature', -5],
    ['350 mA', 'current', 0.35],
    ['0.35 amps', 'current', 0.35],
    ['1,5 kW', 'power', 1500],
    ['250 mW', 'power', 0.25],
    ['1000 W/m²', 'irradiance', 1000],
    ['0.1 W/cm^2', 'irradiance', 1000],
    ['6000 ft', 'altitude', 1828.8],
    ['1,800', 'altitude', 1.8],
    ['1 800 m', 'altitude', 1800],
    ["1'800 m", 'altitude', 1800],
    ['1.8 km', 'altitude', 1800],
    ['about 12 mm', 'length', 0.012],
    ['~12 mm', 'length', 0.012],
    ['3', 'count', 3],
  ])('%s as %s', (text, kind, expected) => {
    expect(value(text, kind)).toBeCloseTo(expected, 9);
  });

  test('both decimal signs with thousands are read, and the reading is said', () => {
    for (const text of ['1.234,5', '1,234.5']) {
      const reading = readQuantity(text, 'power');
      expect(reading).toMatchObject({ status: 'read', value: 1234.5 });
      expect(reading.status === 'read' && reading.note).toContain('1234.5');
    }
    expect(readQuantity('1,234,567', 'power')).toMatchObject({ value: 1234567 });
    expect(readQuantity('1.234.567', 'power')).toMatchObject({ value: 1234567 });
    const doubtful = readQuantity('1,234', 'power');
    expect(doubtful).toMatchObject({ status: 'read', value: 1.234 });
    expect(doubtful.status === 'read' && doubtful.note).toContain('1234');
  });

  test('the understood value comes in the field’s own unit', () => {
    expect(readQuantity('0.09 m', 'length')).toMatchObject({ understood: '90\u00a0mm' });
    expect(readQuantity('104 F', 'temperature', convertUnit)).toMatchObject({ understood: '40\u00a0°C' });
  });

  test('not knowing and nothing are told apart', () => {
    for (const text of ['?', 'don’t know', "Don't know", 'unknown', '-']) {
      expect(readQuantity(text, 'length').status).toBe('unknown');
    }
    expect(readQuantity('  ', 'length').status).toBe('empty');
  });

  test('a unit that needs the conversion table waits for it', () => {
    expect(readQuantity('1/4 in', 'length').status).toBe('waiting');
    expect(readQuantity('12 mm', 'length').status).toBe('read');
  });
});

describe('what cannot be read says why', () => {
  test.each<[string, QuantityKind, RegExp]>([
    ['twelve', 'length', /“twelve” is not a number/],
    ['12 kg', 'length', /“kg” is not a length: write it in mm/],
    ['12 foo', 'length', /unit “foo” is not known/],
    ['12 %', 'length', /“%” does not fit a length/],
    ['40 mm', 'temperature', /“mm” is not a temperature/],
    ['3 mm', 'count', /bare number/],
    ['10-12 mm', 'length', /not a range/],
    ['10 ± 1 mm', 'length', /without its tolerance/],
    ['1 m 20 cm', 'length', /more than one number/],
    ['1.2.3', 'length', /one decimal sign/],
    ['1/0', 'length', /0 below the line/],
    ['1e999', 'length', /too large/],
    ['<script>', 'length', /is not a number/],
    ['W', 'power', /is not a number/],
  ])('%s as %s', (text, kind, expected) => {
    expect(message(text, kind)).toMatch(expected);
  });

  test('no text at all makes the reader throw', () => {
    fc.assert(
      fc.property(fc.string(), fc.constantFrom(...(Object.keys(quantities) as QuantityKind[])), (text, kind) => {
        const reading = readQuantity(text, kind, convertUnit);
        if (reading.status === 'read') expect(Number.isFinite(reading.value)).toBe(true);
        if (reading.status === 'unclear') expect(reading.message).not.toBe('');
      }),
    );
  });

  test('what is shown for editing reads back as the same value', () => {
    const stored = fc.double({ min: -1e5, max: 1e5, noNaN: true }).map((x) => Number(x.toPrecision(6)));
    fc.assert(
      fc.property(
        stored,
        fc.constantFrom<QuantityKind>('length', 'temperature', 'power', 'current', 'altitude'),
        (x, kind) => {
          const back = value(editableQuantity(x, kind), kind);
          expect(Math.abs(back - x)).toBeLessThanOrEqual(1e-9 + Math.abs(x) * 1e-9);
        },
      ),
    );
  });

  test('decimal comma and decimal point give the same number', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 99999 }), fc.integer({ min: 0, max: 99 }), (whole, part) => {
        const point = readQuantity(`${String(whole)}.${String(part)}`, 'power');
        const comma = readQuantity(`${String(whole)},${String(part)}`, 'power');
        expect(comma.status === 'read' && comma.value).toBe(point.status === 'read' && point.value);
      }),
    );
  });

  test('a limit’s message speaks the field’s unit', () => {
    expect(inFieldUnit('The wall thickness must be at least 0.0001 m', 'length')).toBe(
      'The wall thickness must be at least 0.1 mm',
    );
    expect(inFieldUnit('The infill share must be at most 1', 'share')).toBe('The infill share must be at most 100 %');
    expect(inFieldUnit('The altitude must be at most 9000 m', 'altitude')).toBe('The altitude must be at most 9000 m');
  });
});

describe('a size', () => {
  test.each<[string, [number, number, number]]>([
    ['160 × 90 × 45 mm', [0.16, 0.09, 0.045]],
    ['160x90x45', [0.16, 0.09, 0.045]],
    ['16 x 9 x 4,5 cm', [0.16, 0.09, 0.045]],
    ['160 by 90 by 45 mm', [0.16, 0.09, 0.045]],
    ['160, 90, 45', [0.16, 0.09, 0.045]],
    ['160,90,45 mm', [0.16, 0.09, 0.045]],
    ['6 in x 4 in x 2 in', [0.1524, 0.1016, 0.0508]],
    ['6 x 4 x 2"', [0.1524, 0.1016, 0.0508]],
  ])('%s', (text, expected) => {
    const reading = readSize(text, convertUnit);
    if (reading.status !== 'read') throw new Error(JSON.stringify(reading));
    reading.sizeM.forEach((size, i) => {
      expect(size).toBeCloseTo(expected[i] ?? NaN, 9);
    });
  });

  test('two lengths are asked for the third', () => {
    expect(readSize('160 × 90')).toMatchObject({ status: 'unclear' });
    expect(readSize('?')).toMatchObject({ status: 'unknown' });
  });
});

describe('a wall in words', () => {
  const materials = [
    { slug: 'petg-print', name: 'PETG, printed', group: 'print-polymer' },
    { slug: 'pla-print', name: 'PLA, printed', group: 'print-polymer' },
    { slug: 'asa-print', name: 'ASA, printed', group: 'print-polymer' },
    { slug: 'aluminium-6060', name: 'Aluminium alloy 6060', group: 'metal' },
    { slug: 'abs-moulded', name: 'ABS, moulded', group: 'moulding-polymer' },
  ];

  test('“PETG, 3 walls, 20 % infill”', () => {
    const words = readWallWords('PETG, 3 walls, 20 % infill', materials);
    expect(words.material?.slug).toBe('petg-print');
    expect(words.print).toMatchObject({ perimeters: 3, infillShare: 0.2, lineWidthM: null, pattern: null });
    expect(words.wallM).toBeNull();
    expect(words.left).toEqual([]);
  });

  test.each<[string, Record<string, unknown>, number | null]>([
    ['pla 2,4 mm walls, three perimeters, infill 15%', { perimeters: 3, infillShare: 0.15 }, 0.0024],
    [
      'ASA; 4 perimeters; 0.45 mm lines; 0.2 mm layers; gyroid 30 %',
      { perimeters: 4, lineWidthM: 0.00045, layerHeightM: 0.0002, infillShare: 0.3, pattern: 'cells' },
      null,
    ],
    ['petg solid 3mm', { infillShare: 1, perimeters: null }, 0.003],
    ['PETG 5 top and bottom layers, ribs', { closedLayers: 5, pattern: 'ribs' }, null],
    ['PETG', { perimeters: null, infillShare: null }, null],
  ])('%s', (text, print, wallM) => {
    const words = readWallWords(text, materials);
    expect(words.print).toMatchObject(print);
    expect(words.wallM).toBe(wallM);
    expect(words.left).toEqual([]);
  });

  test('metal is not printed, and strange words come back', () => {
    const words = readWallWords('2 mm aluminium, frobnicated', materials);
    expect(words.material?.slug).toBe('aluminium-6060');
    expect(words.print).toBeNull();
    expect(words.wallM).toBe(0.002);
    expect(words.left).toEqual(['frobnicated']);
  });
});
