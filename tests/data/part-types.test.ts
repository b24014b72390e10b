import { describe, expect, it } from 'vitest';
import type { PartType } from '../../shared/schemas/part-type.js';
import { contactTimes, loadStates, touchSurfaces, type RuleSet } from '../../shared/schemas/rule-set.js';
import { partClasses } from '../../shared/schemas/part-type.js';
import { bySlug, readPartTypes, readRuleSets } from './files.js';

const parts = readPartTypes();

/** What is impossible or implausible about a part type; nothing for a sound one. */
function faults(part: PartType): string[] {
  const found: string[] = [];
  const { deratingCurve: curve, electrical, thermal } = part;
  if (curve) {
    const shares = curve.points.value.map(([, share]) => share);
    if (shares.some((share, i) => i > 0 && share > (shares[i - 1] ?? 1))) found.push('a derating curve that rises');
    if (shares[0] !== 1 || shares.at(-1) !== 0) found.push('a derating curve that does not run from full to nothing');
    if (!part.ratings.some(({ quantity }) => quantity === curve.quantity)) found.push('a curve without its rating');
  }
  if (part.temperatureLimits.length === 0) found.push('no temperature limit');
  const power = part.ratings.find(({ quantity }) => quantity === 'powerW')?.max.value;
  if (power !== undefined && power * thermal.internalKPerW.value > 150)
    found.push('more than 150 K inside at its rating');
  if (electrical.kind === 'led') {
    const { voltageV, atCurrentA, differentialOhm, voltagePerK, efficiency, efficiencyPerK, efficiencyPerA } =
      electrical;
    if (voltagePerK.value > 0) found.push('a forward voltage that rises with temperature');
    if (efficiencyPerK.value > 0 || efficiencyPerA.value > 0) found.push('an efficiency that gains by heat or current');
    if (efficiency.value > 0.6) found.push('an efficiency that no white array has');
    // The straight line must still have a positive threshold, of at least half of the working voltage.
    if (differentialOhm.value * atCurrentA.value > voltageV.value / 2) found.push('more resistor than diode');
    const max = part.ratings.find(({ quantity }) => quantity === 'currentA')?.max.value ?? 0;
    if (max < atCurrentA.value) found.push('a reference current above the rating');
  }
  if (electrical.kind === 'converter' && typeof electrical.efficiency.value !== 'number') {
    const rated = part.ratings.find(({ quantity }) => quantity === 'outputW')?.max.value ?? 0;
    const loads = electrical.efficiency.value.map(([load]) => load);
    if (loads.some((load, i) => i > 0 && load <= (loads[i - 1] ?? 0))) found.push('loads out of order');
    if ((loads.at(-1) ?? 0) < rated) found.push('an efficiency table that stops before the rating');
  }
  return found;
}

describe('Part types', () => {
  it.each(parts)('$slug is plausible', (part) => {
    expect(faults(part)).toEqual([]);
  });

  it('cover every class', () => {
    expect(new Set(parts.map((part) => part.class))).toEqual(new Set(partClasses));
  });

  it('of LED arrays reach their class in watts at the rated current, within a quarter', () => {
    for (const part of parts.filter(({ class: kind }) => kind === 'led-array')) {
      const watts = Number(/(\d+) W class/.exec(part.name)?.[1]);
      const { electrical } = part;
      if (electrical.kind !== 'led') throw new Error(`${part.slug} is no LED`);
      const max = part.ratings.find(({ quantity }) => quantity === 'currentA')?.max.value ?? NaN;
      const voltage =
        electrical.voltageV.value + electrical.differentialOhm.value * (max - electrical.atCurrentA.value);
      expect(Math.abs((voltage * max) / watts - 1), part.slug).toBeLessThan(0.25);
    }
  });

  it('of resistors say the resistance and power in their names', () => {
    for (const part of parts.filter(({ electrical }) => electrical.kind === 'resistor')) {
      if (part.electrical.kind !== 'resistor') continue;
      const ohm = part.electrical.resistanceOhm.value;
      expect(part.name).toContain(ohm < 0.1 ? `${String(ohm * 1000)} mΩ` : `${String(ohm)} Ω`);
      const power = part.ratings.find(({ quantity }) => quantity === 'powerW')?.max.value;
      expect(part.name.replace('1/4 W', '0.25 W')).toContain(`${String(power)} W`);
    }
  });

  it('of larger metal-clad resistors have a lower inner resistance and more heat capacity', () => {
    const clad = [10, 25, 50, 100].map((watts) => bySlug(parts, `resistor-metal-clad-${String(watts)}w`).thermal);
    const inner = clad.map(({ internalKPerW }) => internalKPerW.value);
    const capacity = clad.map(({ capacityJPerK }) => capacityJPerK.value);
    expect([...inner].sort((a, b) => b - a)).toEqual(inner);
    expect([...capacity].sort((a, b) => a - b)).toEqual(capacity);
  });

  it('of film resistors have full power at 70 °C and none at 155 °C (after IEC 60115, from memory)', () => {
    for (const slug of ['resistor-film-0w25', 'resistor-film-0w6', 'resistor-chip-2512', 'resistor-chip-1206']) {
      expect(bySlug(parts, slug).deratingCurve?.points.value, slug).toEqual([
        [70, 1],
        [155, 0],
      ]);
    }
  });
});

describe('The check of part types refuses', () => {
  const film = bySlug(parts, 'resistor-film-0w25');
  const array = bySlug(parts, 'led-array-10w-33v');
  const curve = film.deratingCurve;
  if (!curve || array.electrical.kind !== 'led') throw new Error('the rows of this test changed');
  const { electrical } = array;
  it.each<[string, PartType]>([
    [
      'a derating curve that rises',
      {
        ...film,
        deratingCurve: {
          ...curve,
          points: {
            ...curve.points,
            value: [
              [25, 0.5],
              [70, 1],
              [155, 0],
            ],
          },
        },
      },
    ],
    ['a curve without its rating', { ...film, ratings: [] }],
    ['a part without a temperature limit', { ...film, temperatureLimits: [] }],
    [
      'a volt drop that grows with heat',
      { ...array, electrical: { ...electrical, voltagePerK: { ...electrical.voltagePerK, value: 0.02 } } },
    ],
    [
      'more light than power',
      { ...array, electrical: { ...electrical, efficiency: { ...electrical.efficiency, value: 0.9 } } },
    ],
  ])('%s', (_, part) => {
    expect(faults(part)).not.toEqual([]);
  });
});

/** What the rule set lacks, or has upside down. */
function ruleFaults(rules: RuleSet): string[] {
  const found: string[] = [];
  const touch = (surface: string, time: string) =>
    rules.touchLimits.find((row) => row.surface === surface && row.contactTime === time)?.maxC.value ?? NaN;
  for (const surface of touchSurfaces) {
    const limits = contactTimes.map((time) => touch(surface, time));
    if (limits.some((limit, i) => !(limit <= (limits[i - 1] ?? Infinity)))) found.push(`${surface}: hotter for longer`);
  }
  for (const time of contactTimes) {
    const limits = touchSurfaces.map((surface) => touch(surface, time));
    if (limits.some((limit, i) => !(limit >= (limits[i - 1] ?? -Infinity)))) found.push(`${time}: metal above plastic`);
  }
  const loads = loadStates.map((load) => rules.polymerMarginK[load].value);
  if (loads.some((margin, i) => margin < (loads[i - 1] ?? 0))) found.push('less margin for more load');
  const classes = rules.perClass.map((row) => row.class);
  if (partClasses.some((name) => classes.filter((entry) => entry === name).length !== 1))
    found.push('a class not once');
  return found;
}

describe('Rule sets', () => {
  const rules = bySlug(readRuleSets(), 'plain-workshop');

  it.each(readRuleSets())('$slug is complete and the right way up', (set) => {
    expect(ruleFaults(set)).toEqual([]);
  });

  it('are found out when a limit is missing or a longer touch is allowed hotter', () => {
    expect(ruleFaults({ ...rules, touchLimits: rules.touchLimits.slice(1) })).not.toEqual([]);
    const hotter = rules.touchLimits.map((row) =>
      row.contactTime === '8 h' ? { ...row, maxC: { ...row.maxC, value: 60 } } : row,
    );
    expect(ruleFaults({ ...rules, touchLimits: hotter })).not.toEqual([]);
  });

  it('ask the margins of the design: 25 K off a clamped polymer, 15 to 20 K for a junction', () => {
    expect(rules.polymerMarginK['screw-clamped'].value).toBe(25);
    const led = rules.perClass.find((row) => row.class === 'led-array');
    expect(led?.smallestMarginK.value).toBeGreaterThanOrEqual(15);
    expect(led?.smallestMarginK.value).toBeLessThanOrEqual(20);
  });
});
