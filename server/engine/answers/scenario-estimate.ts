import type { EstimateLimit, Verdict } from '../../../shared/schemas/estimate.js';
import type { CeilingAnswer, SolveAnswer } from '../../../shared/schemas/network-answers.js';
import type { RuleSet } from '../../../shared/schemas/rule-set.js';
import { compileAssembly, type CompiledAssembly } from '../assembly/compile.js';
import type { ResolvedAssembly, ResolvedScenario } from '../assembly/resolved.js';
import type { PreparedNetwork } from '../network/prepared.js';
import { solveWith } from '../network/solve.js';
import { engineVersion } from '../version.js';
import { findCeiling } from './ceiling.js';
import { bandsOf, guardedCeiling } from './guarded.js';
import { bindingLine, limitLines, worstState } from './limit-lines.js';

/** Everything computed for one scenario. */
export interface ScenarioEstimate {
  scenario: ResolvedScenario;
  compiled: CompiledAssembly;
  answer: SolveAnswer;
  /** As it was solved, for like networks to start from. */
  network: PreparedNetwork;
  ceiling: CeilingAnswer;
  guarded: CeilingAnswer;
  lines: EstimateLimit[];
  verdict: Verdict;
}

function hasBand(assembly: ResolvedAssembly): boolean {
  return Object.values(assembly.box?.faces ?? {}).some((face) => face.printed !== null);
}

/** Present drive in its own unit: amperes of the supply, or watts of the driven parts. */
function presentDrive(assembly: ResolvedAssembly): { value: number; unit: 'A' | 'W' } {
  const { drive, document, parts } = assembly;
  if ('supply' in drive) {
    const supply = document.supplies.find(({ id }) => id === drive.supply);
    return { value: supply?.currentA ?? 0, unit: 'A' };
  }
  const driven = parts.filter((part) => drive.parts.includes(part.id));
  return { value: driven.reduce((sum, part) => sum + part.heatW, 0), unit: 'W' };
}

/** A ceiling in the drive’s unit; `null` where there is none within range. */
function inDriveUnit(ceiling: CeilingAnswer, drive: { value: number; unit: 'A' | 'W' }): number | null {
  if (ceiling.status === 'no-limit-within-range') return null;
  if (ceiling.status === 'exceeded-at-zero') return 0;
  return drive.unit === 'A' ? (ceiling.currentA ?? ceiling.scale * drive.value) : ceiling.scale * drive.value;
}

function headroom(ceiling: CeilingAnswer, drive: number): number | null {
  if (ceiling.status === 'no-limit-within-range' || drive === 0) return null;
  return ceiling.status === 'exceeded-at-zero' ? -1 : ceiling.scale - 1;
}

/** Solves one scenario, with its limits, its nominal and its guarded ceiling. */
export function estimateScenario(
  assembly: ResolvedAssembly,
  scenario: ResolvedScenario,
  rules: RuleSet,
): ScenarioEstimate {
  const compiled = compileAssembly(assembly, scenario, rules);
  const { network, answer } = solveWith(compiled.network, { compare: true });
  const ceiling = findCeiling(compiled.network, compiled.drive, { near: network });
  const bands = bandsOf(hasBand(assembly));
  const networks = bands.map((band) =>
    band === 'mid' ? compiled.network : compileAssembly(assembly, scenario, rules, { band }).network,
  );
  const guarded = guardedCeiling(networks, compiled.limits, compiled.drive, network);
  const drive = presentDrive(assembly);
  const lines = limitLines(compiled.limits, answer, ceiling, drive.value);
  const binding = bindingLine(lines);
  const verdict: Verdict = {
    scenario: scenario.id,
    scenarioName: scenario.name,
    state: worstState(lines),
    binds: binding?.id ?? null,
    bindsLabel: binding?.label ?? 'no limit',
    margin: binding?.margin ?? null,
    marginUnit: binding === undefined || binding.unit === '°C' ? 'K' : binding.unit,
    headroom: headroom(ceiling, drive.value),
    guardedHeadroom: headroom(guarded, drive.value),
    driveUnit: drive.unit,
    drive: drive.value,
    nominalCeiling: inDriveUnit(ceiling, drive),
    guardedCeiling: inDriveUnit(guarded, drive),
    guardedElectricalW: guarded.status === 'no-limit-within-range' ? null : guarded.electricalW,
    assumedCount: assembly.assumptions.length,
    engineVersion,
  };
  return { scenario, compiled, answer, network, ceiling, guarded, lines, verdict };
}
