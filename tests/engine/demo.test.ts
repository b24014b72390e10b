import { describe, expect, it } from 'vitest';
import { estimateAssembly } from '../../server/engine/answers/estimate.js';
import { assemblyDocumentSchema } from '../../shared/schemas/assembly.js';
import { estimateSchema, type LimitState } from '../../shared/schemas/estimate.js';
import { bySlug, readDemo, readRuleSets } from '../data/files.js';

const rules = bySlug(readRuleSets(), 'plain-workshop');

/** The document with its driven supply at a share of the present current. */
function driven(name: string, factor: number) {
  const document = readDemo(name);
  return assemblyDocumentSchema.parse({
    ...document,
    supplies: document.supplies.map((supply) => ({ ...supply, currentA: supply.currentA * factor })),
  });
}

const intended: [name: string, state: LimitState, binds: RegExp][] = [
  ['stall-lantern', 'exceeds', /^face\.top\.softening$/],
  ['driver-box', 'tight', /^part\.sense\.rating\.powerW$/],
  ['load-box', 'holds', /^face\.bottom\.touch$/],
];

describe.each(intended)('The demo %s', (name, state, binds) => {
  const estimate = estimateAssembly(readDemo(name), rules);
  const { verdict } = estimate;

  it(`answers whole, in its hot scenario, and ${state}`, () => {
    expect(() => estimateSchema.parse(estimate)).not.toThrow();
    expect(estimate.scenario).toBe('hot');
    expect(verdict.state).toBe(state);
    expect(verdict.binds).toMatch(binds);
  });

  it('gives back the heat and light that it takes', () => {
    const { inW, outW, lightOutW } = estimate.heatBalance;
    expect(Math.abs(inW - outW - lightOutW)).toBeLessThan(1e-9 * inW);
  });

  it('has a guarded ceiling at or below the nominal one, in every scenario', () => {
    for (const scenario of estimate.scenarios) {
      expect(scenario.guardedCeiling).not.toBeNull();
      expect(scenario.guardedCeiling).toBeLessThanOrEqual(scenario.nominalCeiling ?? Infinity);
    }
  });

  it('breaks a limit just above its nominal ceiling and none just below', () => {
    const ceiling = (verdict.nominalCeiling ?? NaN) / verdict.drive;
    const worst = (factor: number) =>
      Math.min(
        ...estimateAssembly(driven(name, factor), rules, { scenario: 'hot' }).limits.map(({ margin }) => margin),
      );
    expect(worst(ceiling * 1.001)).toBeLessThan(0);
    expect(worst(ceiling * 0.999)).toBeGreaterThanOrEqual(0);
  });

  it('meets every margin that the rules ask just below its guarded ceiling', () => {
    const guarded = (verdict.guardedCeiling ?? NaN) / verdict.drive;
    const { limits } = estimateAssembly(driven(name, guarded * 0.999), rules, { scenario: 'hot' });
    expect(limits.filter((limit) => limit.state !== 'holds').map(({ id }) => id)).toEqual([]);
  });
});

it('The load box may be accepted: its drive is below the guarded ceiling of every scenario', () => {
  for (const { drive, guardedCeiling } of estimateAssembly(readDemo('load-box'), rules).scenarios) {
    expect(drive).toBeLessThan(guardedCeiling ?? -Infinity);
  }
});
