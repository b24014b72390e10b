import type { Estimate } from '../../shared/schemas/estimate.js';
import type { z } from 'zod';
import type { redFlagSchema } from '../../shared/schemas/decision.js';

type RedFlag = z.infer<typeof redFlagSchema>;

/** An assumption is worth a flag from this share of the binding margin on. */
const assumedShare = 0.1;
/** A runaway within this multiple of the present drive is close. */
const runawayClose = 1.5;

function limitFlags(estimate: Estimate): RedFlag[] {
  const { scenarioName } = estimate.verdict;
  return estimate.limits.flatMap((limit) => {
    if (limit.state === 'holds') return [];
    const unit = limit.unit === '°C' ? 'K' : limit.unit === '1' ? 'of what is allowed' : limit.unit;
    const words =
      limit.state === 'exceeds'
        ? `${scenarioName}: ${limit.label} exceeds its limit by ${(-limit.margin).toFixed(2)} ${unit}`
        : `${scenarioName}: ${limit.label} is tight, ${limit.margin.toFixed(2)} ${unit} where ${limit.askedMargin.toFixed(2)} are asked`;
    return [{ id: `${limit.state}:${estimate.scenario}:${limit.id}`, words }];
  });
}

function inputFlags(estimate: Estimate): RedFlag[] {
  const binding = estimate.limits.find(({ id }) => id === estimate.verdict.binds);
  const margin = Math.abs(binding?.kind === 'temperature' ? binding.margin : Infinity);
  const assumed = estimate.assumed
    .filter(({ effectK }) => Math.abs(effectK) >= Math.min(assumedShare * margin, 1))
    .map((entry) => ({
      id: `assumed:${estimate.scenario}:${entry.path}`,
      words: `${estimate.verdict.scenarioName}: ${entry.label} is assumed; its typical value is worth ${entry.effectK.toFixed(1)} K`,
    }));
  if (binding?.basis.standing !== 'from-memory') return assumed;
  const words = `${estimate.verdict.scenarioName}: the limit that binds, ${binding.label}, rests on a value from memory`;
  return [...assumed, { id: `from-memory:${estimate.scenario}:${binding.id}`, words }];
}

function methodFlags(estimate: Estimate): RedFlag[] {
  const flags: RedFlag[] = estimate.warnings
    .filter(({ code }) => code === 'not-stable' || code.endsWith('not-checked') || code.startsWith('no-'))
    .map(({ code, node, message }) => ({ id: `${code}:${estimate.scenario}:${node ?? ''}`, words: message }));
  const runaway = estimate.ceiling.runaway;
  if (runaway && runaway.scale < runawayClose) {
    flags.push({
      id: `runaway:${estimate.scenario}`,
      words: `${estimate.verdict.scenarioName}: runaway is close, at ${runaway.scale.toFixed(2)} times the present drive`,
    });
  }
  return flags;
}

/** Names of what holds a value from memory, and how many values that are. */
function fromMemory(part: unknown, name: string, found: Map<string, number>): void {
  if (typeof part !== 'object' || part === null) return;
  const own = 'slug' in part && 'name' in part && typeof part.name === 'string' ? part.name : name;
  if ('standing' in part && part.standing === 'from-memory') found.set(own, (found.get(own) ?? 0) + 1);
  for (const entry of Object.values(part)) fromMemory(entry, own, found);
}

/** One flag for all values of the materials, finishes, part types and rules in use that are still to be verified. */
function memoryFlags(basis: unknown): RedFlag[] {
  const found = new Map<string, number>();
  fromMemory(basis, 'the assembly', found);
  if (found.size === 0) return [];
  const total = [...found.values()].reduce((sum, count) => sum + count, 0);
  const names = [...found].map(([name, count]) => `${name} (${String(count)})`).join(', ');
  const words = `${String(total)} values in use are from memory, to be verified: ${names}`;
  return [{ id: 'from-memory:values', words }];
}

/**
 * What a reviewer must look at before accepting: limits exceeded or tight, assumptions that matter, values from memory,
 * what could not be checked, runaway close. Worst first; each once.
 *
 * @param basis document with its values in place, and the rule set
 */
export function redFlags(estimates: readonly Estimate[], basis: unknown): RedFlag[] {
  const must = estimates.filter(({ scenario, scenarios }) =>
    scenarios.some((s) => s.scenario === scenario && s.mustHold),
  );
  const all = [
    ...must.flatMap(limitFlags),
    ...must.flatMap(inputFlags),
    ...must.flatMap(methodFlags),
    ...memoryFlags(basis),
  ];
  const exceeded = (flag: RedFlag) => (flag.id.startsWith('exceeds:') ? 0 : 1);
  return [...new Map(all.map((flag) => [flag.id, flag])).values()].sort((a, b) => exceeded(a) - exceeded(b));
}
