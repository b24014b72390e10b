/** Reads the number at the head of a text, as people write numbers. */

export type WrittenNumber = { value: number; rest: string; note?: string } | { message: string };

const vulgar: Record<string, number> = {
  '½': 1 / 2,
  '⅓': 1 / 3,
  '⅔': 2 / 3,
  '¼': 1 / 4,
  '¾': 3 / 4,
  '⅕': 1 / 5,
  '⅖': 2 / 5,
  '⅗': 3 / 5,
  '⅘': 4 / 5,
  '⅙': 1 / 6,
  '⅚': 5 / 6,
  '⅛': 1 / 8,
  '⅜': 3 / 8,
  '⅝': 5 / 8,
  '⅞': 7 / 8,
};

const raised = '⁰¹²³⁴⁵⁶⁷⁸⁹';

const grouped = { ',': /^\d{1,3}(,\d{3})+$/, '.': /^\d{1,3}(\.\d{3})+$/ } as const;

/** Digits with separators, without sign or exponent. */
function readDigits(body: string): { value: number; note?: string } | { message: string } {
  const digits = body.replace(/['’ ]/g, '');
  const unclear = { message: `“${body}” is not clear: write the number with one decimal sign, such as 1234.5` };
  const commas = digits.split(',').length - 1;
  const points = digits.split('.').length - 1;
  if (commas > 0 && points > 0) {
    const decimal = digits.lastIndexOf(',') > digits.lastIndexOf('.') ? ',' : '.';
    const group = decimal === ',' ? '.' : ',';
    const whole = digits.slice(0, digits.lastIndexOf(decimal));
    if (!grouped[group].test(whole)) return unclear;
    const value = Number(`${whole.replaceAll(group, '')}.${digits.slice(digits.lastIndexOf(decimal) + 1)}`);
    return { value, note: `“${decimal}” read as the decimal sign: ${String(value)}` };
  }
  if (commas + points > 1) {
    const group = commas > 0 ? ',' : '.';
    if (!grouped[group].test(digits)) return unclear;
    const value = Number(digits.replaceAll(group, ''));
    return { value, note: `“${group}” read as separating thousands: ${String(value)}` };
  }
  const value = Number(digits.replace(',', '.'));
  if (commas === 1 && grouped[','].test(digits) && !digits.startsWith('0')) {
    return { value, note: `“,” read as the decimal sign; for ${digits.replace(',', '')} leave it out` };
  }
  return { value };
}

function readExponent(text: string): { factor: number; length: number } {
  const letter = /^\s?e\s?([+-]?\d{1,3})(?![\w.,])/i.exec(text) ?? /^e([+-]?\d{1,3})(?=\s|[a-zµΩ%°])/i.exec(text);
  if (letter) return { factor: Number(letter[1]), length: letter[0].length };
  const power = /^\s*[×x·*]\s*10\s*(?:(?:\^|\*\*)\s*([+-]?\d{1,3})|(⁻?)([⁰¹²³⁴⁵⁶⁷⁸⁹]{1,3}))/i.exec(text);
  if (!power) return { factor: 0, length: 0 };
  if (power[1] !== undefined) return { factor: Number(power[1]), length: power[0].length };
  const exponent = Number([...(power[3] ?? '')].map((sign) => raised.indexOf(sign)).join(''));
  return { factor: power[2] === '⁻' ? -exponent : exponent, length: power[0].length };
}

/**
 * @returns the value and what stands behind it (a unit, mostly), with a note where a sign could be read two ways; or a
 *   message in the user’s words
 */
export function readNumber(text: string): WrittenNumber {
  const plain = text
    .replace(/[\u00a0\u2009\u202f]/g, ' ')
    .replace(/[−–](?=\s*[\d.,½⅓⅔¼¾⅕⅖⅗⅘⅙⅚⅛⅜⅝⅞])/g, '-')
    .replace(/⁄/g, '/')
    .trim()
    .replace(/^(~|≈|=|ca\.?\s|about\s|approx\.?\s)\s*/i, '');
  const signed = /^([+-]?)\s*/.exec(plain);
  const sign = signed?.[1] === '-' ? -1 : 1;
  const body = plain.slice(signed?.[0].length ?? 0);

  const glyph = /^(\d+)?\s*([½⅓⅔¼¾⅕⅖⅗⅘⅙⅚⅛⅜⅝⅞])/.exec(body);
  if (glyph) {
    const value = Number(glyph[1] ?? 0) + (vulgar[glyph[2] ?? ''] ?? 0);
    return { value: sign * value, rest: body.slice(glyph[0].length).trim() };
  }
  const fraction = /^(?:(\d+)[\s-]+)?(\d+)\s*\/\s*(\d+)/.exec(body);
  if (fraction) {
    if (Number(fraction[3]) === 0) return { message: 'A fraction cannot have 0 below the line' };
    const value = Number(fraction[1] ?? 0) + Number(fraction[2]) / Number(fraction[3]);
    return { value: sign * value, rest: body.slice(fraction[0].length).trim() };
  }
  const digits = /^(?:\d{1,3}(?: \d{3})+(?!\d)(?:[.,]\d*)?|\d+(?:[.,’]\d+|'\d{3})*[.,]?|[.,]\d+)/.exec(body);
  if (!digits) return { message: `“${text.trim()}” is not a number` };
  const read = readDigits(digits[0]);
  if ('message' in read) return read;
  const exponent = readExponent(body.slice(digits[0].length));
  const value = sign * Number(`${String(read.value)}e${String(exponent.factor)}`);
  const scaled = Number.isNaN(value) ? sign * read.value * 10 ** exponent.factor : value;
  return {
    value: scaled,
    rest: body.slice(digits[0].length + exponent.length).trim(),
    ...(read.note === undefined ? {} : { note: read.note }),
  };
}
