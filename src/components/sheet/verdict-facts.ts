import type { Estimate, EstimateLimit, LimitState, Verdict } from '../../../shared/schemas/estimate.js';
import { figures, figuresBelow, kelvins, percentBelow } from '../../composables/numbers.js';

type ScenarioVerdict = Estimate['scenarios'][number];

/** The must-hold scenario with least headroom; where none must hold, of all. Same order as the estimate’s own choice. */
export function worstScenario(scenarios: readonly ScenarioVerdict[]): ScenarioVerdict | undefined {
  const must = scenarios.filter(({ mustHold }) => mustHold);
  return [...(must.length > 0 ? must : scenarios)].sort((a, b) => {
    const left = a.headroom ?? Infinity;
    const right = b.headroom ?? Infinity;
    return left === right ? (a.margin ?? Infinity) - (b.margin ?? Infinity) : left - right;
  })[0];
}

/** “3.1 K”, “0.12 A”, “12 % free” of the allowed power. */
export function marginText(margin: number, unit: Verdict['marginUnit'] | EstimateLimit['unit']): string {
  if (unit === '°C' || unit === 'K') return `${kelvins(margin)}\u00a0K`;
  if (unit === '1') return `${figures(margin * 100)}\u00a0% free`;
  return `${figures(margin)}\u00a0${unit}`;
}

export interface VerdictFacts {
  scenario: string;
  /** What stands behind it in small type. */
  air: string;
  binds: string;
  because: string;
  margin: string;
  state: LimitState;
  guarded: string;
  nominal: string;
  headroomAt: string;
  headroom: string;
  assumed: string;
  /** True where the present drive is over the guarded ceiling although no nominal limit is passed. */
  overGuarded: boolean;
}

function ceilingText(value: number | null, unit: string, watts: number | null): string {
  if (value === null) return 'none in range';
  const drive = `${figuresBelow(value)}\u00a0${unit}`;
  return unit === 'W' || watts === null ? drive : `${drive} · ${figuresBelow(watts)}\u00a0W`;
}

/** The five facts of the strip, in words and figures. */
export function verdictFacts(estimate: Estimate): VerdictFacts | null {
  const verdict = worstScenario(estimate.scenarios);
  if (!verdict) return null;
  const shown = estimate.scenario === verdict.scenario ? estimate : null;
  const binding = shown?.limits.find(({ id }) => id === verdict.binds);
  const airC = shown?.nodes.find(({ role }) => role === 'ambient')?.temperatureC;
  const exceeded = (shown?.limits ?? []).filter(({ state, id }) => state === 'exceeds' && id !== verdict.binds).length;
  const count = verdict.assumedCount;
  return {
    scenario: verdict.scenarioName,
    air: airC === undefined ? '' : `${kelvins(airC).replace(/\.0$/, '')}\u00a0°C`,
    binds: verdict.bindsLabel,
    because: exceeded > 0 ? `and ${String(exceeded)} more exceeded` : '',
    margin: verdict.margin === null ? '–' : marginText(verdict.margin, verdict.marginUnit),
    state: exceeded > 0 ? 'exceeds' : (binding?.state ?? verdict.state),
    guarded: ceilingText(verdict.guardedCeiling, verdict.driveUnit, verdict.guardedElectricalW),
    nominal:
      verdict.nominalCeiling === null
        ? 'nominal none in range'
        : `nominal ${figuresBelow(verdict.nominalCeiling)}\u00a0${verdict.driveUnit}`,
    headroomAt: `Headroom at ${figures(verdict.drive)}\u00a0${verdict.driveUnit}`,
    headroom: verdict.guardedHeadroom === null ? 'none in range' : percentBelow(verdict.guardedHeadroom),
    assumed: count === 0 ? 'nothing assumed' : `${String(count)} assumed value${count === 1 ? '' : 's'}`,
    overGuarded: verdict.guardedHeadroom !== null && verdict.guardedHeadroom < 0,
  };
}
