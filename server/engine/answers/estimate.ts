import type { AssemblyDocument } from '../../../shared/schemas/assembly.js';
import type { Estimate } from '../../../shared/schemas/estimate.js';
import type { DeviceAnswer, Warning } from '../../../shared/schemas/network-answers.js';
import type { RuleSet } from '../../../shared/schemas/rule-set.js';
import { compileAssembly } from '../assembly/compile.js';
import { boxModel } from '../assembly/box.js';
import { resolveAssembly } from '../assembly/resolve.js';
import type { ResolvedAssembly } from '../assembly/resolved.js';
import { EngineError } from '../errors.js';
import { solveNetwork } from '../network/solve.js';
import { engineVersion } from '../version.js';
import { exchanges } from './exchanges.js';
import { handCheck } from './hand-check.js';
import { heatPaths } from './heat-paths.js';
import { estimateScenario, type ScenarioEstimate } from './scenario-estimate.js';

/**
 * The margin that the binding limit’s group would have with one assumption at its typical value, less what it has [K].
 * Where what binds is no temperature, the hottest checked temperature speaks instead.
 */
function assumptionEffects(
  document: AssemblyDocument,
  assembly: ResolvedAssembly,
  rules: RuleSet,
  chosen: ScenarioEstimate,
): Estimate['assumed'] {
  const temperatures = chosen.lines.filter((line) => line.kind === 'temperature');
  const line =
    temperatures.find(({ id }) => id === chosen.verdict.binds) ??
    temperatures.reduce<(typeof temperatures)[number] | undefined>(
      (tightest, next) => (tightest === undefined || next.margin < tightest.margin ? next : tightest),
      undefined,
    );
  return assembly.assumptions.map(({ key, label, paths, value, typical, source }) => {
    const shown = { path: paths[0] ?? '', paths, label, value, typical, source };
    if (!line) return { ...shown, effectK: 0 };
    const other = resolveAssembly(document, new Set([key]));
    const scenario = other.scenarios.find(({ id }) => id === chosen.scenario.id) ?? chosen.scenario;
    const compiled = compileAssembly(other, scenario, rules);
    const answer = solveNetwork(compiled.network, { near: chosen.network });
    const members = new Set(compiled.limits.filter(({ group }) => group === line.id).map(({ id }) => id));
    const margins = answer.limits.filter(({ id }) => members.has(id)).map(({ margin }) => margin);
    return { ...shown, effectK: margins.length > 0 ? Math.min(...margins) - line.margin : 0 };
  });
}

/** Least headroom first; a scenario that no drive within range breaks comes last. */
function leastHeadroom(a: ScenarioEstimate, b: ScenarioEstimate): number {
  const order = (e: ScenarioEstimate) => e.verdict.headroom ?? Infinity;
  const left = order(a);
  const right = order(b);
  if (left === right) return (a.verdict.margin ?? Infinity) - (b.verdict.margin ?? Infinity);
  return left - right;
}

function choose(estimates: readonly ScenarioEstimate[], wanted: string | undefined): ScenarioEstimate {
  const named = estimates.find(({ scenario }) => scenario.id === wanted);
  if (wanted !== undefined && !named) {
    throw new EngineError('unknown-reference', `There is no scenario “${wanted}”`, [
      { path: '/scenario', message: `There is no scenario “${wanted}” in this assembly` },
    ]);
  }
  const must = estimates.filter(({ scenario }) => scenario.mustHold);
  const chosen = named ?? [...(must.length > 0 ? must : estimates)].sort(leastHeadroom)[0];
  if (!chosen) throw new EngineError('invalid-document', 'Add at least one scenario');
  return chosen;
}

function stressRatios(chosen: ScenarioEstimate, devices: Record<string, DeviceAnswer>): Estimate['stressRatios'] {
  return chosen.lines.flatMap((line) => {
    if (line.part === undefined || line.kind === 'temperature' || line.limit === 0) return [];
    const ratio = line.value / line.limit;
    if (line.kind === 'current') {
      return [{ part: line.part, quantity: 'currentA', value: line.value, allowed: line.limit, ratio }];
    }
    const powerW = devices[`part.${line.part}.junction`]?.electricalW ?? 0;
    return [{ part: line.part, quantity: 'powerW', value: powerW, allowed: ratio > 0 ? powerW / ratio : 0, ratio }];
  });
}

function distinct(warnings: readonly Warning[]): Warning[] {
  const seen = new Set<string>();
  return warnings.filter(({ code, message }) => {
    const key = `${code} ${message}`;
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
}

/**
 * The whole answer for an assembly: every scenario’s verdict, and one scenario in full.
 *
 * @param document every value in place (`inline`)
 * @param options `scenario`: the one to answer in full; without it the must-hold scenario with least headroom
 * @throws EngineError naming the field, node or link that stands in the way
 */
export function estimateAssembly(
  document: AssemblyDocument,
  rules: RuleSet,
  options: { scenario?: string | undefined } = {},
): Estimate {
  const assembly = resolveAssembly(document);
  const estimates = assembly.scenarios.map((scenario) => estimateScenario(assembly, scenario, rules));
  const chosen = choose(estimates, options.scenario);
  const { answer, compiled, scenario } = chosen;
  return {
    scenario: scenario.id,
    verdict: chosen.verdict,
    scenarios: estimates.map((e) => ({ ...e.verdict, mustHold: e.scenario.mustHold })),
    network: compiled.network,
    nodes: compiled.nodes.map((node) => {
      const second = answer.compared?.temperaturesC[node.id];
      return {
        ...node,
        temperatureC: answer.temperaturesC[node.id] ?? NaN,
        ...(second === undefined ? {} : { second }),
      };
    }),
    flowsW: answer.flowsW,
    exchanges: exchanges(compiled.network, answer),
    devices: answer.devices,
    limits: chosen.lines,
    stressRatios: stressRatios(chosen, answer.devices),
    ceiling: chosen.ceiling,
    guardedCeiling: chosen.guarded,
    paths: heatPaths(
      assembly.parts.map(({ id }) => id),
      compiled.network,
      answer,
      compiled.nodes,
    ),
    heatBalance: answer.heatBalance,
    handCheck: handCheck(assembly, boxModel(assembly, 'mid'), answer, scenario.airC),
    warnings: distinct([...compiled.warnings, ...answer.warnings]),
    assumed: assumptionEffects(document, assembly, rules, chosen),
    engineVersion,
  };
}
