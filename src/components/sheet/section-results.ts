import type { AssemblyDocumentInput } from '../../../shared/schemas/assembly.js';
import type { Assembly } from '../../../shared/schemas/assembly-records.js';
import type { Estimate } from '../../../shared/schemas/estimate.js';
import { figures, figuresBelow, kelvins } from '../../composables/numbers.js';
import { worstScenario } from './verdict-facts.js';

export const sections = [
  { key: 'housing', number: 1, title: 'Housing' },
  { key: 'parts', number: 2, title: 'Parts and heat paths' },
  { key: 'scenarios', number: 3, title: 'Scenarios' },
  { key: 'temperatures', number: 4, title: 'Temperatures' },
  { key: 'ceiling', number: 5, title: 'Drive ceiling' },
  { key: 'record', number: 9, title: 'Record' },
] as const;
export type SectionKey = (typeof sections)[number]['key'];

/** The section that holds the field of a pointer. */
export function sectionOf(pointer: string): SectionKey {
  if (/^\/(parts|carriers|supplies|leads|drive)/.test(pointer)) return 'parts';
  if (pointer.startsWith('/scenarios')) return 'scenarios';
  return pointer.startsWith('/limits') ? 'temperatures' : 'housing';
}

function housing(document: AssemblyDocumentInput, estimate: Estimate | null): string {
  if (document.housing === null) return 'open assembly, no housing';
  const size = document.housing.outerM
    .map((side) => (typeof side === 'number' ? figures(side * 1000) : '?'))
    .join(' × ');
  const outside = (estimate?.nodes ?? []).filter(({ id }) => /^face\.\w+\.outer$/.test(id));
  const hottest = [...outside].sort((a, b) => b.temperatureC - a.temperatureC)[0];
  const face = hottest ? `; hottest face ${hottest.id.split('.')[1] ?? ''} ${kelvins(hottest.temperatureC)} °C` : '';
  return `${size} mm${face}`;
}

function parts(document: AssemblyDocumentInput, estimate: Estimate | null): string {
  const count = document.parts.length;
  const heat = estimate ? `, ${figures(estimate.heatBalance.inW)} W of heat` : '';
  return `${String(count)} ${count === 1 ? 'part' : 'parts'}${heat}`;
}

function scenarios(document: AssemblyDocumentInput, estimate: Estimate | null): string {
  const must = document.scenarios.filter(({ mustHold }) => mustHold ?? true).length;
  const worst = estimate ? worstScenario(estimate.scenarios) : undefined;
  return `${String(must)} of ${String(document.scenarios.length)} must hold${worst ? `; least headroom: ${worst.scenarioName}` : ''}`;
}

function temperatures(estimate: Estimate | null): string {
  const checked = (estimate?.limits ?? []).filter(({ kind }) => kind === 'temperature');
  const tightest = [...checked].sort((a, b) => a.margin - b.margin)[0];
  if (!tightest) return '';
  const margin =
    tightest.margin < 0 ? `${kelvins(-tightest.margin)} K over its limit` : `${kelvins(tightest.margin)} K to limit`;
  return `hottest against its limit: ${tightest.label} ${kelvins(tightest.value)} °C, ${margin}`;
}

function ceiling(estimate: Estimate | null): string {
  const verdict = estimate ? worstScenario(estimate.scenarios) : undefined;
  if (!verdict) return '';
  if (verdict.guardedCeiling === null) return 'no limit is met within range';
  const watts =
    verdict.driveUnit === 'A' && verdict.guardedElectricalW !== null
      ? `, ${figuresBelow(verdict.guardedElectricalW)} W`
      : '';
  return `guarded ${figuresBelow(verdict.guardedCeiling)} ${verdict.driveUnit}${watts}`;
}

function recordLine(record: Assembly | null): string {
  if (!record) return '';
  const revision = record.revision === null ? 'no revision yet' : `revision ${String(record.revision)}`;
  return record.decision ? `${revision}; decision ${record.decision.state.replaceAll('-', ' ')}` : revision;
}

/** The one line at the right of each section’s head. */
export function sectionResults(
  document: AssemblyDocumentInput,
  estimate: Estimate | null,
  record: Assembly | null,
): Record<SectionKey, string> {
  return {
    housing: housing(document, estimate),
    parts: parts(document, estimate),
    scenarios: scenarios(document, estimate),
    temperatures: temperatures(estimate),
    ceiling: ceiling(estimate),
    record: recordLine(record),
  };
}
